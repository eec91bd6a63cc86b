/** A linear map and a move: where the unit vectors along x, y and z go, three numbers each, and then the origin. */
export type Affine = readonly [number, number, number, number, number, number, number, number, number, number, number, number];

export const identity: Affine = [1, 0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0];

/** First `inner`, then `outer`. */
export function composeAffine(outer: Affine, inner: Affine): Affine {
  if (outer === identity) return inner;
  if (inner === identity) return outer;
  const column = (k: number): [number, number, number] => {
    const [x, y, z] = [inner[k] ?? 0, inner[k + 1] ?? 0, inner[k + 2] ?? 0];
    return [outer[0] * x + outer[3] * y + outer[6] * z, outer[1] * x + outer[4] * y + outer[7] * z, outer[2] * x + outer[5] * y + outer[8] * z];
  };
  const [x, y, z] = column(9);
  return [...column(0), ...column(3), ...column(6), x + outer[9], y + outer[10], z + outer[11]];
}

/** Negative where the map mirrors: a body keeps its volume only if its facets are read the other way round. */
export function findDeterminant([a, b, c, d, e, f, g, h, i]: Affine): number {
  return a * (e * i - f * h) + d * (h * c - b * i) + g * (b * f - e * c);
}

/** Maps three coordinates at `from` in one array to those at `to` in another. */
export function mapPoint(affine: Affine, source: ArrayLike<number>, from: number, target: Float64Array, to: number): void {
  const x = source[from] ?? 0, y = source[from + 1] ?? 0, z = source[from + 2] ?? 0;
  target[to] = affine[0] * x + affine[3] * y + affine[6] * z + affine[9];
  target[to + 1] = affine[1] * x + affine[4] * y + affine[7] * z + affine[10];
  target[to + 2] = affine[2] * x + affine[5] * y + affine[8] * z + affine[11];
}
