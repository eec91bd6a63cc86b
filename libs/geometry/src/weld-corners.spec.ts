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
