import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { batchFacets, createFacetBatch } from './facet-batch';
import { createWelder, type WeldedMesh } from './weld-corners';

function weld(corners: ArrayLike<number>): WeldedMesh {
  const facets = Math.floor(corners.length / 9);
  const welder = createWelder(facets);
  const batch = createFacetBatch();
  for (let first = 0; first < facets; first += batchFacets) {
    batch.count = Math.min(batchFacets, facets - first);
    for (let k = 0; k < 9 * batch.count; k++) batch.corners[k] = corners[9 * first + k] ?? 0;
    welder.add(batch);
  }
  return welder.finish();
}

describe('welding corners by their bits', () => {
  it('tells points apart that differ in one coordinate only, thousands of them', () => {
    for (const axis of [0, 1, 2]) {
      const corners = Float64Array.from({ length: 9 * 10_000 }, (_, k) => (k % 3 === axis ? Math.floor(k / 3) / 7 : 0.5));
      expect(weld(corners).vertexCount).toBe(30_000);
      expect(weld(corners.map(Math.fround)).vertexCount).toBe(30_000);
    }
  });
  it('is as quick where the bits of the coordinates were chosen to be the same when folded, a quarter of a million times', () => {
    // The upper half of each number undoes what the lower one adds: to a hash without secrets all of these are one, and finding each would pass by all before.
    const fold = (k: number): number => {
      const view = new DataView(new ArrayBuffer(8));
      view.setUint32(0, 0x3ff00000 ^ (k << 3));
      view.setUint32(4, k);
      return view.getFloat64(0);
    };
    const points = 3 * 87_381;
    const corners = Float64Array.from({ length: 3 * points }, (_, at) => fold(at % 3 === 0 ? Math.floor(at / 3) % 65_536 : at % 3 === 1 ? Math.floor(at / 3 / 65_536) : 0));
    expect(weld(corners).vertexCount).toBe(points);
  });
  it('gives back every corner, with as many vertices as there are different points', () => {
    const coordinate = fc.oneof(fc.constantFrom(0, -0, 1, -1, 0.1), fc.double({ noNaN: true, noDefaultInfinity: true }));
    fc.assert(
      fc.property(fc.array(fc.tuple(coordinate, coordinate, coordinate), { minLength: 3, maxLength: 300 }), (points) => {
        const corners = points.slice(0, points.length - (points.length % 3)).flat();
        const mesh = weld(corners);
        for (let k = 0; k < corners.length; k++) expect(mesh.coordinates[3 * (mesh.corners[Math.floor(k / 3)] ?? NaN) + (k % 3)]).toBe((corners[k] ?? NaN) + 0);
        const different = new Set(Array.from({ length: corners.length / 3 }, (_, k) => corners.slice(3 * k, 3 * k + 3).map((c) => c + 0).join()));
        expect(mesh.vertexCount).toBe(different.size);
      }),
    );
  });
});
