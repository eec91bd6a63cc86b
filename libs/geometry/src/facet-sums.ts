/**
 * What is summed over facets, about a local origin o. For a facet with corners a, b, c less o, s = a + b + c, n = (b - a) × (c - a)
 * and d = a · n, the ten volume sums are of d, d s_i and d (s_i s_j + a_i a_j + b_i b_j + c_i c_j): 6, 24 and 120 times the integrals over the
 * tetrahedron (o, a, b, c), signed (Lien & Kajiya 1984; Tonon 2004). The ten surface sums are the same with |n| in place of d: 2, 6 and 24 times the
 * integrals over the triangle. Each sum is kept as a high and a low part.
 */
export interface FacetSums {
  readonly high: Float64Array;
  readonly low: Float64Array;
  /** What bounds the rounding of the sums; see `sizes`. */
  readonly sizes: Float64Array;
}

/** Places of the integrals: 0 is ∫1, then x, y, z, then the second moments. The surface's follow the body's. */
export const places = { x: 1, y: 2, z: 3, xx: 4, yy: 5, zz: 6, xy: 7, yz: 8, zx: 9 } as const;
export const sumsOfBody = 0;
export const sumsOfSurface = 10;
export const sumCount = 20;

/**
 * Places of the sizes. `determinant`: sum over facets of the sizes of the products that make up d; `determinantSecond`: the same, each times the trace of
 * its second moments. `cross` and `crossSecond`: the same for |n|.
 */
export const sizes = { determinant: 0, determinantSecond: 1, cross: 2, crossSecond: 3 } as const;
export const sizeCount = 4;

export function createFacetSums(): FacetSums {
  return { high: new Float64Array(sumCount), low: new Float64Array(sumCount), sizes: new Float64Array(sizeCount) };
}

/** Adds facets to the sums: nine coordinates each, in the mesh frame, less `origin` = [x, y, z]. The count is a multiple of 16 but for the last call. */
export type FacetIntegrator = (sums: FacetSums, origin: ArrayLike<number>, corners: Float64Array, count: number) => void;
