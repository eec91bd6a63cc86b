import createManifold, { type Manifold, type ManifoldToplevel } from 'manifold-3d';
import { beforeAll, describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { compareExactly } from './testing/compare-exactly';
import { createDraw, type Draw } from './testing/draw';
import * as shapes from './testing/shapes';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

/** Of the natural scale; what rounding may do at most, and what is reported at most, whatever the mesh. */
const tolerance = 1e-14;
const placements = 64;

let manifold: ManifoldToplevel;
beforeAll(async () => {
  manifold = await createManifold();
  manifold.setup();
});

function readCorners(body: Manifold): shapes.Corners {
  const { triVerts, vertProperties, numProp } = body.getMesh();
  return Float64Array.from({ length: 3 * triVerts.length }, (_, at) => vertProperties[numProp * (triVerts[Math.floor(at / 3)] ?? 0) + (at % 3)] ?? NaN);
}

function place(corners: shapes.Corners, { next }: Draw): shapes.Corners {
  const turned = shapes.rotate(corners, shapes.makeRotation(6 * next(), 6 * next(), 6 * next()));
  const far = 10 ** (6 * next());
  return shapes.move(turned, [far * (next() - 0.5), far * (next() - 0.5), far * (next() - 0.5)]);
}

/** The largest error against exact arithmetic, and the bound that is reported for it. */
function judge(corners: shapes.Corners, file: Uint8Array): { error: number; bound: number } {
  const measurement = measureMesh(file);
  const { volume, centre, second } = compareExactly(measurement, corners);
  return { error: Math.max(volume, centre, second), bound: measurement.volume?.errorBound ?? NaN };
}

function expectSound(corners: shapes.Corners, file = writeAsciiStl(corners)): void {
  const { error, bound } = judge(corners, file);
  expect(error).toBeLessThanOrEqual(bound);
  expect(bound).toBeLessThanOrEqual(tolerance);
}

describe('the integrals against exact rational arithmetic', () => {
  it.each([
    ['a torus', shapes.makeTorus(5, 1, 16)],
    ['a thin plate', shapes.makeBlock([0, 0, 0], [1000, 1000, 0.001])],
    ['a needle of 1e5 : 1', shapes.makeCylinder(0.5, 1e5, 12)],
    ['a shell with a gap of 2e-6', shapes.makeThickShell(10, 10 - 2e-5, 12)],
  ])('%s in 64 seeded placements: no error beyond the bound, no bound beyond 1e-14', (_name, corners) => {
    const random = createDraw(20_261_201);
    for (let turn = 0; turn < placements; turn++) expectSound(place(corners, random));
  });

  it('random polyhedra, hulls of a few points, near and far', () => {
    const random = createDraw(64);
    for (let turn = 0; turn < 60; turn++) {
      const points = Array.from({ length: 5 + Math.floor(40 * random.next()) }, (): [number, number, number] => [random.next(), 3 * random.next(), 0.2 * random.next()]);
      const hull = manifold.Manifold.hull(points);
      expectSound(place(readCorners(hull), random));
      hull.delete();
    }
  });

  it('random differences, unions and intersections of solids', () => {
    const random = createDraw(3);
    const { Manifold: Solid } = manifold;
    for (let turn = 0; turn < 30; turn++) {
      const block = Solid.cube([2, 2, 2], true);
      const tool = (turn % 2 === 0 ? Solid.sphere(0.5 + random.next(), 16) : Solid.cylinder(3, 0.3 + random.next() / 2, 0.2, 20, true)).rotate([360 * random.next(), 360 * random.next(), 0]).translate([random.next() - 0.5, random.next() - 0.5, random.next() - 0.5]);
      const body = [block.subtract(tool), block.add(tool), block.intersect(tool)][turn % 3];
      if (body !== undefined && !body.isEmpty()) expectSound(place(readCorners(body), random));
    }
  });

  it('a sphere of a million facets, in binary32', () => {
    const corners = shapes.roundToBinary32(shapes.rotate(shapes.makeSphere(10, 1000), shapes.makeRotation(0.3, 0.7, 1.1)));
    expect(corners.length / 9).toBeGreaterThan(990_000);
    expectSound(corners, writeBinaryStl(corners));
  }, 240_000);
});
