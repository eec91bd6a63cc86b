import rapier from '@dimforge/rapier3d-compat';
import createManifold from 'manifold-3d';
import { beforeAll, describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { findDiagonal } from './testing/compare-exactly';
import * as shapes from './testing/shapes';
import { writeBinaryStl } from './write-stl';

const tilt = shapes.makeRotation(0.4, 1.2, 2.3);
const meshes: [name: string, corners: shapes.Corners][] = [
  ['a tilted block', shapes.rotate(shapes.makeBlock([1, 2, 3], [3, 5, 4]), tilt)],
  ['a torus', shapes.rotate(shapes.makeTorus(5, 1, 48), tilt)],
  ['a frustum', shapes.rotate(shapes.makeFrustum(5, 3, 10, 48), tilt)],
  ['a dented ball', shapes.makeStar(24, (i, j) => 1 + 0.3 * Math.sin(3 * i + 5 * j))],
  ['a hemisphere', shapes.move(shapes.makeHemisphere(2, 48), [1, 1, 1])],
];

/** Corners with the same coordinates as one vertex, as those programs want it. */
function weld(corners: shapes.Corners): { vertices: Float32Array; indices: Uint32Array } {
  const numbers = new Map<string, number>();
  const vertices: number[] = [];
  const indices = Array.from({ length: corners.length / 3 }, (_, corner) => {
    const point = Array.from(corners.subarray(3 * corner, 3 * corner + 3));
    const key = point.map((coordinate) => coordinate + 0).join();
    const known = numbers.get(key);
    if (known !== undefined) return known;
    numbers.set(key, numbers.size);
    vertices.push(...point);
    return numbers.size - 1;
  });
  return { vertices: Float32Array.from(vertices), indices: Uint32Array.from(indices) };
}

beforeAll(async () => {
  await rapier.init();
});

describe('a physics engine, in binary32 (rapier)', () => {
  it.each(meshes)('%s: mass, centre and tensor agree to its digits', (_name, corners) => {
    const { volume, origin, boundingBox } = measureMesh(writeBinaryStl(corners));
    if (volume === null) throw new Error('The mesh has no volume.');
    const { vertices, indices } = weld(shapes.roundToBinary32(corners));
    const world = new rapier.World({ x: 0, y: 0, z: 0 });
    const body = world.createRigidBody(rapier.RigidBodyDesc.dynamic());
    world.createCollider(rapier.ColliderDesc.trimesh(vertices, indices, rapier.TriMeshFlags.ORIENTED).setDensity(1), body);
    world.step();

    expect(Math.abs(body.mass() / volume.content - 1)).toBeLessThan(2e-5);
    const com = body.localCom();
    const diagonal = findDiagonal(boundingBox);
    for (const [k, centre] of [com.x, com.y, com.z].entries()) expect(Math.abs(centre - (origin[k] ?? 0) - (volume.centreFromOrigin[k] ?? 0)) / diagonal).toBeLessThan(2e-5);

    // It gives principal moments and the rotation of their axes; put together they are the tensor.
    const { x, y, z } = body.principalInertia();
    const q = body.principalInertiaLocalFrame();
    const rows = [
      [1 - 2 * (q.y * q.y + q.z * q.z), 2 * (q.x * q.y - q.z * q.w), 2 * (q.x * q.z + q.y * q.w)],
      [2 * (q.x * q.y + q.z * q.w), 1 - 2 * (q.x * q.x + q.z * q.z), 2 * (q.y * q.z - q.x * q.w)],
      [2 * (q.x * q.z - q.y * q.w), 2 * (q.y * q.z + q.x * q.w), 1 - 2 * (q.x * q.x + q.y * q.y)],
    ];
    const tensor = (i: number, j: number): number => [x, y, z].reduce((sum, moment, k) => sum + moment * (rows[i]?.[k] ?? NaN) * (rows[j]?.[k] ?? NaN), 0);
    const { xx, yy, zz, xy, yz, zx } = volume.second;
    const own = [[yy + zz, -xy, -zx], [-xy, zz + xx, -yz], [-zx, -yz, xx + yy]];
    const scale = volume.content * diagonal * diagonal;
    for (const i of [0, 1, 2]) for (const j of [0, 1, 2]) expect(Math.abs(tensor(i, j) - (own[i]?.[j] ?? NaN)) / scale).toBeLessThan(2e-5);
    world.free();
  });
});

describe('a modelling kernel, in binary64 (manifold)', () => {
  it.each(meshes)('%s: volume and area agree', async (_name, corners) => {
    const { Manifold, Mesh } = await loadManifold();
    const { volume, surface } = measureMesh(writeBinaryStl(corners));
    const { vertices, indices } = weld(shapes.roundToBinary32(corners));
    const body = new Manifold(new Mesh({ numProp: 3, vertProperties: vertices, triVerts: indices }));
    expect(Math.abs(body.volume() / (volume?.content ?? NaN) - 1)).toBeLessThan(1e-12);
    expect(Math.abs(body.surfaceArea() / surface.content - 1)).toBeLessThan(1e-12);
    body.delete();
  });

  it('what is left of a block after a ball and a rod are cut from it: volume and area agree', async () => {
    const { Manifold } = await loadManifold();
    const body = Manifold.cube([4, 3, 2], true).subtract(Manifold.sphere(1.2, 48)).subtract(Manifold.cylinder(5, 0.3, 0.3, 32, true).rotate([20, 35, 0]));
    const { triVerts, vertProperties, numProp } = body.getMesh();
    const corners = Float64Array.from(Array.from(triVerts).flatMap((vertex) => Array.from(vertProperties.subarray(vertex * numProp, vertex * numProp + 3))));
    const { volume, surface, soundness } = measureMesh(writeBinaryStl(corners));
    expect(soundness).toMatchObject({ closed: true, oriented: true, outward: true, defensible: true });
    // Its own coordinates are binary64; those of its mesh are rounded to binary32.
    expect(Math.abs(body.volume() / (volume?.content ?? NaN) - 1)).toBeLessThan(1e-6);
    expect(Math.abs(body.surfaceArea() / surface.content - 1)).toBeLessThan(1e-6);
    body.delete();
  });
});

async function loadManifold() {
  const manifold = await createManifold();
  manifold.setup();
  return manifold;
}
