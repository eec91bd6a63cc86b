import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Integrals, Measurement, Symmetric3, Vector3 } from './measurement';
import { measureMesh } from './measurer';
import { anyGridMesh, anyMesh, anyRotation } from './testing/arbitrary-meshes';
import { findDiagonal, secondKeys } from './testing/compare-exactly';
import * as shapes from './testing/shapes';
import { writeAsciiStl } from './write-stl';

type Body = Measurement & { volume: Integrals };

function measure(corners: shapes.Corners): Body {
  const measurement = measureMesh(writeAsciiStl(corners));
  if (measurement.volume === null) throw new Error('The mesh has no volume.');
  return { ...measurement, volume: measurement.volume };
}

const toMatrix = ({ xx, yy, zz, xy, yz, zx }: Symmetric3): number[][] => [[xx, xy, zx], [xy, yy, yz], [zx, yz, zz]];
const centreOf = ({ origin, volume }: Body): Vector3 => origin.map((o, k) => o + (volume.centreFromOrigin[k] ?? 0)) as Vector3;
const inertiaScale = (body: Body): number => body.volume.content * findDiagonal(body.boundingBox) ** 2;
const roundings = 1e-13;

describe('what must not change, or must change along', () => {
  it('translation: not a bit changes but the origin', () => {
    fc.assert(
      fc.property(anyGridMesh, fc.integer({ min: -(2 ** 30), max: 2 ** 30 }), fc.integer({ min: -1000, max: 1000 }), (corners, dx, dz) => {
        const [at, moved] = [measure(corners), measure(shapes.move(corners, [dx, 0, dz]))];
        expect(moved.volume).toEqual(at.volume);
        expect(moved.surface).toEqual(at.surface);
        expect(moved.origin).toEqual([at.origin[0] + dx, at.origin[1], at.origin[2] + dz]);
      }),
    );
  });

  it('scaling by a power of two: every figure scales by its dimension to the bit', () => {
    fc.assert(
      fc.property(anyMesh, fc.integer({ min: -20, max: 20 }), (corners, power) => {
        const f = 2 ** power;
        const [at, scaled] = [measure(corners), measure(shapes.stretch(corners, [f, f, f]))];
        expect(scaled.volume.content).toBe(at.volume.content * f ** 3);
        expect(scaled.volume.centreFromOrigin).toEqual(at.volume.centreFromOrigin.map((offset) => offset * f));
        for (const key of secondKeys) expect(scaled.volume.second[key]).toBe(at.volume.second[key] * f ** 5);
        expect(scaled.surface.content).toBe(at.surface.content * f ** 2);
      }),
    );
  });

  it('rotation: volume and area stay, the second moments turn along (R J Rᵀ)', () => {
    fc.assert(
      fc.property(anyMesh, anyRotation, (corners, rows) => {
        const [at, turned] = [measure(corners), measure(shapes.rotate(corners, rows))];
        expect(Math.abs(turned.volume.content / at.volume.content - 1)).toBeLessThan(1e-11);
        expect(Math.abs(turned.surface.content / at.surface.content - 1)).toBeLessThan(1e-11);
        const J = toMatrix(at.volume.second);
        const expected = rows.map((row) => rows.map((other) => row.reduce((sum, u, i) => sum + other.reduce((inner, v, j) => inner + u * v * (J[i]?.[j] ?? NaN), 0), 0)));
        // The rotated coordinates are themselves rounded, and a stretched body magnifies that.
        for (const [i, row] of toMatrix(turned.volume.second).entries()) for (const [j, element] of row.entries()) expect(Math.abs(element - (expected[i]?.[j] ?? NaN)) / inertiaScale(at)).toBeLessThan(1e-11);
      }),
    );
  });

  it('the order of the facets and which corner comes first: only roundings', () => {
    fc.assert(
      fc.property(anyMesh.chain((corners) => fc.tuple(fc.constant(corners), fc.shuffledSubarray(Array.from({ length: corners.length / 9 }, (_, k) => k), { minLength: corners.length / 9 }))), ([corners, order]) => {
        const shuffled = Float64Array.from(
          order.flatMap((facet, k) => {
            const [a, b, c] = [0, 3, 6].map((corner) => Array.from(corners.subarray(9 * facet + corner, 9 * facet + corner + 3)));
            return [[a, b, c], [b, c, a], [c, a, b]][k % 3]?.flat() as number[];
          }),
        );
        const [one, other] = [measure(corners), measure(shuffled)];
        expect(Math.abs(other.volume.content / one.volume.content - 1)).toBeLessThan(roundings);
        for (const key of secondKeys) expect(Math.abs(other.volume.second[key] - one.volume.second[key]) / inertiaScale(one)).toBeLessThan(roundings);
        expect({ ...other.soundness, findings: [] }).toEqual({ ...one.soundness, findings: [] });
      }),
    );
  });

  it('a solid cut in two: volumes add up, first moments add up, second moments by the parallel-axis theorem', () => {
    const profile = fc.array(fc.record({ radius: fc.double({ min: 0.2, max: 3, noNaN: true }), step: fc.double({ min: 0.1, max: 1, noNaN: true }) }), { minLength: 2, maxLength: 8 });
    fc.assert(
      fc.property(profile, fc.integer({ min: 3, max: 24 }), fc.double({ min: 0.05, max: 0.95, noNaN: true }), anyRotation, (rings, segments, share, rows) => {
        let z = 0;
        const points = rings.map(({ radius, step }): [number, number] => [radius, (z += step)]);
        const [bottom, top] = [points[0]?.[1] ?? 0, points.at(-1)?.[1] ?? 0];
        const cut = bottom + share * (top - bottom);
        fc.pre(points.every(([, height]) => Math.abs(height - cut) > 1e-3));
        const upper = points.findIndex(([, height]) => height > cut);
        const [[r0, z0], [r1, z1]] = [points[upper - 1] ?? [0, 0], points[upper] ?? [0, 0]];
        const rim: [number, number] = [r0 + ((r1 - r0) * (cut - z0)) / (z1 - z0), cut];
        const make = (part: [number, number][]): Body => measure(shapes.rotate(shapes.revolve([[0, part[0]?.[1] ?? 0], ...part, [0, part.at(-1)?.[1] ?? 0]], segments), rows));
        const [whole, low, high] = [make(points), make([...points.slice(0, upper), rim]), make([rim, ...points.slice(upper)])];

        expect(Math.abs((low.volume.content + high.volume.content) / whole.volume.content - 1)).toBeLessThan(roundings);
        const centre = centreOf(whole);
        const [lowCentre, highCentre] = [centreOf(low), centreOf(high)];
        for (let k = 0; k < 3; k++) {
          const mixed = ((lowCentre[k] ?? 0) * low.volume.content + (highCentre[k] ?? 0) * high.volume.content) / whole.volume.content;
          expect(Math.abs(mixed - (centre[k] ?? 0)) / findDiagonal(whole.boundingBox)).toBeLessThan(roundings);
        }
        const shifted = (part: Body, at: Vector3): number[][] => toMatrix(part.volume.second).map((row, i) => row.map((element, j) => element + part.volume.content * ((at[i] ?? 0) - (centre[i] ?? 0)) * ((at[j] ?? 0) - (centre[j] ?? 0))));
        const [lowShifted, highShifted] = [shifted(low, lowCentre), shifted(high, highCentre)];
        for (const [i, row] of toMatrix(whole.volume.second).entries()) for (const [j, element] of row.entries()) expect(Math.abs((lowShifted[i]?.[j] ?? NaN) + (highShifted[i]?.[j] ?? NaN) - element) / inertiaScale(whole)).toBeLessThan(roundings);
      }),
    );
  });

  it('the same bytes give the same bits', () => {
    const bytes = writeAsciiStl(shapes.makeSphere(3, 40));
    expect(JSON.stringify(measureMesh(bytes))).toBe(JSON.stringify(measureMesh(bytes)));
  });
});
