import fc from 'fast-check';
import { makeRotation, makeStar, rotate, stretch, type Corners, type Point } from './shapes';

/** Rotations by any angles. */
export const anyRotation = fc.tuple(fc.double({ min: 0, max: 6.28, noNaN: true }), fc.double({ min: 0, max: 6.28, noNaN: true }), fc.double({ min: 0, max: 6.28, noNaN: true })).map((angles) => makeRotation(...angles));

/** Closed meshes of some dozen facets: dented balls, stretched by up to a thousand and turned. */
export const anyMesh: fc.Arbitrary<Corners> = fc
  .record({
    segments: fc.integer({ min: 3, max: 9 }),
    radii: fc.array(fc.double({ min: 0.5, max: 2, noNaN: true }), { minLength: 50, maxLength: 50 }),
    factors: fc.tuple(fc.integer({ min: -5, max: 5 }), fc.integer({ min: -5, max: 5 }), fc.integer({ min: -5, max: 5 })),
    rotation: anyRotation,
  })
  .map(({ segments, radii, factors, rotation }) => {
    const star = makeStar(segments, (i, j) => radii[(9 * i + j) % radii.length] ?? 1);
    return rotate(stretch(star, factors.map((power) => 2 ** power) as unknown as Point), rotation);
  });

/** The same with coordinates on a grid of 2⁻²⁰, so that moving and doubling them is exact. */
export const anyGridMesh: fc.Arbitrary<Corners> = anyMesh.map((corners) => Float64Array.from(corners, (coordinate) => Math.round(coordinate * 2 ** 20) / 2 ** 20));
