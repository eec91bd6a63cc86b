import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Integrals } from './measurement';
import { measureMesh } from './measurer';
import { anyMesh } from './testing/arbitrary-meshes';
import { compareExactly, compareSurfaceExactly, type Errors } from './testing/compare-exactly';
import * as shapes from './testing/shapes';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

const tilt = shapes.makeRotation(0.3, 0.7, 1.1);
const plate = shapes.makeBlock([0, 0, 0], [1000, 1000, 0.001]);
const needle = shapes.makeCylinder(0.5, 1e5, 24);
const torus = shapes.makeTorus(5, 1, 40);
const diagonal = Math.hypot(12, 12, 2);
const shell = (gap: number): shapes.Corners => shapes.makeThickShell(10, 10 - gap, 32);

const meshes: Record<string, shapes.Corners> = {
  'a sphere': shapes.makeSphere(10, 60),
  'a tilted torus': shapes.rotate(torus, tilt),
  'a torus 1e5 diagonals away': shapes.move(torus, [1e5 * diagonal, -1e5 * diagonal, 1e5 * diagonal]),
  'a torus 1e6 diagonals away': shapes.move(torus, [1e6 * diagonal, 3, 0]),
  'a thin plate': plate,
  'a tilted thin plate': shapes.rotate(plate, tilt),
  'a needle': needle,
  'a tilted needle': shapes.rotate(needle, tilt),
  'a shell with a gap of 1e-4': shell(1e-3),
  'a shell with a gap of 2e-6': shell(2e-5),
  'a tilted shell with a gap of 2e-6, far away': shapes.move(shapes.rotate(shell(2e-5), tilt), [1e6, 1e6, -1e6]),
  'a thin-walled tube': shapes.rotate(shapes.makeTube(5, 4.99, 100, 48), tilt),
  'a mesh of 1e-9': shapes.stretch(torus, [1e-9, 1e-9, 1e-9]),
  'a mesh of 1e12': shapes.stretch(torus, [1e12, 1e12, 1e12]),
  'a mesh inside out': shapes.turn(shapes.makeFrustum(5, 3, 10, 30)),
  'the two-box housing': shapes.makeHousing(),
};

/** The largest error is within a tolerance, and within what the measurement itself says of it. */
function expectWithin(errors: Errors, tolerance: number, stated: Integrals | null): void {
  const largest = Math.max(errors.volume, errors.centre, errors.second);
  expect(largest).toBeLessThan(tolerance);
  expect(largest).toBeLessThanOrEqual(stated?.errorBound ?? NaN);
}

describe('integrals against exact rational arithmetic', () => {
  it.each(Object.entries(meshes))('%s with binary64 coordinates: body within 1e-14, surface within 1e-12, both within their own bounds', (_name, corners) => {
    const measurement = measureMesh(writeAsciiStl(corners));
    expectWithin(compareExactly(measurement, corners), 1e-14, measurement.volume);
    expectWithin(compareSurfaceExactly(measurement, corners), 1e-12, measurement.surface);
  });

  // Far away binary32 has no digits left for the shape, so those stay with binary64.
  it.each(Object.entries(meshes).filter(([name]) => !/away|2e-6/.test(name)))('%s with binary32 coordinates: body within 1e-14, surface within 1e-12, both within their own bounds', (_name, corners) => {
    const rounded = shapes.roundToBinary32(corners);
    const measurement = measureMesh(writeBinaryStl(corners));
    expectWithin(compareExactly(measurement, rounded), 1e-14, measurement.volume);
    expectWithin(compareSurfaceExactly(measurement, rounded), 1e-12, measurement.surface);
  });

  it('an open sheet of facets whose corners are all but on a line: surface within 1e-12', () => {
    const flat = shapes.join(...Array.from({ length: 9 }, (_, k) => Float64Array.of(k, 0, 0, k + 2, 0, 1, k + 1, 1e-8 * (k + 1), 0.5)));
    const sheet = shapes.rotate(flat, tilt);
    const measurement = measureMesh(writeAsciiStl(sheet));
    expect(measurement.soundness).toMatchObject({ closed: false, degenerateFacets: 0 });
    expectWithin(compareSurfaceExactly(measurement, sheet), 1e-12, measurement.surface);
  });

  it('any dented ball, stretched and turned, near and far: body within 1e-14, surface within 1e-12, both within their own bounds', () => {
    fc.assert(
      fc.property(anyMesh, fc.integer({ min: -30, max: 30 }), fc.boolean(), (mesh, far, inBinary32) => {
        const moved = shapes.move(mesh, [2 ** far, -(2 ** far), 0]);
        const corners = inBinary32 ? shapes.roundToBinary32(moved) : moved;
        const measurement = measureMesh(inBinary32 ? writeBinaryStl(corners) : writeAsciiStl(corners));
        if (measurement.volume === null) return;
        expectWithin(compareExactly(measurement, corners), 1e-14, measurement.volume);
        expectWithin(compareSurfaceExactly(measurement, corners), 1e-12, measurement.surface);
      }),
      { numRuns: 150 },
    );
  });
});
