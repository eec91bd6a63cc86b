/**
 * Half the difference of volume between the fan from a polygon's first corner and the one from its second: what the volume of the mesh hangs on where the
 * corners do not lie in one plane. Neither fan is more right than the other. The difference is that of two surfaces with the same rim, so that it does
 * not depend on where it is told from; from the first corner the first fan has none.
 *
 * @param vertices three coordinates a vertex
 * @param corners vertex numbers, of which the first `count` are the polygon's
 * @returns volume in the mesh's own unit, cubed; never negative
 */
export function measurePolygonDoubt(vertices: ArrayLike<number>, corners: ArrayLike<number>, count: number): number {
  const coordinate = (corner: number, k: number): number => (vertices[3 * (corners[corner] ?? 0) + k] ?? 0) - (vertices[3 * (corners[0] ?? 0) + k] ?? 0);
  const ax = coordinate(1, 0), ay = coordinate(1, 1), az = coordinate(1, 2);
  let bx = coordinate(2, 0), by = coordinate(2, 1), bz = coordinate(2, 2);
  let sixfold = 0;
  for (let corner = 3; corner < count; corner++) {
    const cx = coordinate(corner, 0), cy = coordinate(corner, 1), cz = coordinate(corner, 2);
    sixfold += ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx);
    bx = cx;
    by = cy;
    bz = cz;
  }
  return Math.abs(sixfold) / 12;
}
