/** So many looks at a corner that points inwards are allowed for each corner: enough for some two hundred of those, and the time stays in proportion to the file. */
const looksPerCorner = 256;

/**
 * Cuts a flat polygon that is not convex into triangles that do not overlap, by clipping ears (Meisters 1975, "Polygons have ears"): a corner that
 * points outwards is cut off where no corner that points inwards lies in its triangle. Every corner is used, so that the edges stay those of the polygon.
 *
 * @param vertices three coordinates a vertex
 * @param corners vertex numbers, of which the first `count` are the polygon's
 * @param normal the side from which the polygon runs counter-clockwise
 * @returns vertex numbers, three a triangle; undefined where no ear is left, as in some polygons that cross themselves, or the looks are used up
 */
export function cutPolygon(vertices: ArrayLike<number>, corners: ArrayLike<number>, count: number, normal: readonly [number, number, number]): Uint32Array | undefined {
  const { u, v } = project(vertices, corners, count, normal);
  const before = Int32Array.from({ length: count }, (_, k) => (k === 0 ? count - 1 : k - 1));
  const after = Int32Array.from({ length: count }, (_, k) => (k === count - 1 ? 0 : k + 1));
  const turn = (i: number, j: number, k: number): number => ((u[j] ?? 0) - (u[i] ?? 0)) * ((v[k] ?? 0) - (v[i] ?? 0)) - ((v[j] ?? 0) - (v[i] ?? 0)) * ((u[k] ?? 0) - (u[i] ?? 0));
  const turnAt = (k: number): number => turn(before[k] ?? 0, k, after[k] ?? 0);
  // Corners only ever change from pointing inwards to pointing outwards; those that did, and those cut off, are passed over.
  const inward = Array.from({ length: count }, (_, k) => k).filter((k) => turnAt(k) < 0);
  const triangles = new Uint32Array(3 * (count - 2));
  let looks = looksPerCorner * count;

  function isEar(i: number, j: number, k: number): boolean {
    const iu = u[i] ?? 0, iv = v[i] ?? 0, ju = u[j] ?? 0, jv = v[j] ?? 0, ku = u[k] ?? 0, kv = v[k] ?? 0;
    const leastU = Math.min(iu, ju, ku), greatestU = Math.max(iu, ju, ku), leastV = Math.min(iv, jv, kv), greatestV = Math.max(iv, jv, kv);
    looks -= inward.length;
    for (const other of inward) {
      const ou = u[other] ?? 0, ov = v[other] ?? 0;
      if (ou < leastU || ou > greatestU || ov < leastV || ov > greatestV) continue;
      if ((ou === iu && ov === iv) || (ou === ju && ov === jv) || (ou === ku && ov === kv) || after[other] === -1) continue;
      if (turn(i, j, other) >= 0 && turn(j, k, other) >= 0 && turn(k, i, other) >= 0 && turnAt(other) < 0) return false;
    }
    return true;
  }

  let at = 0;
  let passed = 0;
  for (let cut = 0; cut < count - 2; ) {
    const i = before[at] ?? 0, k = after[at] ?? 0;
    const size = turn(i, at, k);
    if (size === 0 || (size > 0 && isEar(i, at, k))) {
      for (const [n, corner] of [i, at, k].entries()) triangles[3 * cut + n] = corners[corner] ?? 0;
      cut += 1;
      after[i] = k;
      before[k] = i;
      after[at] = -1;
      passed = 0;
      // On beyond the neighbour: clipping round and round gives better triangles than fanning from one corner.
      at = after[k] ?? 0;
    } else {
      at = k;
      passed += 1;
      if (passed > count - cut || looks < 0) return undefined;
    }
  }
  return triangles;
}

/** Two coordinates a corner, in the plane of the axes that the polygon faces least, so that it runs counter-clockwise. */
function project(vertices: ArrayLike<number>, corners: ArrayLike<number>, count: number, normal: readonly [number, number, number]): { u: Float64Array; v: Float64Array } {
  const [x, y, z] = normal.map(Math.abs) as [number, number, number];
  const dropped = z >= x && z >= y ? 2 : y >= x ? 1 : 0;
  let first = (dropped + 1) % 3;
  let second = (dropped + 2) % 3;
  if ((normal[dropped] ?? 0) < 0) [first, second] = [second, first];
  const u = new Float64Array(count), v = new Float64Array(count);
  for (let k = 0; k < count; k++) {
    u[k] = vertices[3 * (corners[k] ?? 0) + first] ?? 0;
    v[k] = vertices[3 * (corners[k] ?? 0) + second] ?? 0;
  }
  return { u, v };
}
