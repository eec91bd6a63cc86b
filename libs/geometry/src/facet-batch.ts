/**
 * Facets handed on together. A batch is full but for the last, so where one ends depends on the facets alone and never
 * on how the bytes arrived; a multiple of the integrator's block.
 */
export const batchFacets = 4096;

export interface FacetBatch {
  /** Nine coordinates a facet: x, y, z of its three corners. */
  readonly corners: Float64Array;
  /** Three numbers a facet as the file has them; NaN is possible. */
  readonly normals: Float64Array;
  /** How many facets are filled. */
  count: number;
  /** Index of the first one in the file. */
  first: number;
}

export type FacetSink = (batch: FacetBatch) => void;

export function createFacetBatch(): FacetBatch {
  return { corners: new Float64Array(9 * batchFacets), normals: new Float64Array(3 * batchFacets), count: 0, first: 0 };
}

/** Hands the batch on and empties it. The sink must not keep it. */
export function flushFacets(batch: FacetBatch, sink: FacetSink): void {
  if (batch.count === 0) return;
  sink(batch);
  batch.first += batch.count;
  batch.count = 0;
}
