/**
 * How far a corner may stand off the plane of its polygon: a ten-thousandth of the polygon's extent, and the rounding of coordinates that were
 * written with six digits (half a unit of the sixth is at most 5e-6 of the number). A polygon within that is flat to its own figures.
 */
const flatness = 1e-4;
const writtenDigits = 5e-6;
/** A fan whose triangles overlap by more than this share of the polygon folds back on itself; less is rounding along straight edges. */
const overlap = 1e-6;

export interface PolygonShape {
  /** The corners lie in one plane. */
  planar: boolean;
  /** The fan of triangles from the first corner covers some of the plane twice: the polygon is not convex, and its fan has too large an area. */
  folded: boolean;
  /** Twice the vector area, which does not depend on how the polygon is cut into triangles. */
  normal: readonly [number, number, number];
}

/**
 * The shape of a polygon in space. Its plane is the one through its first corner and square to its vector area; one without area has no plane, and
 * is taken as flat and not folded.
 *
 * @param vertices three coordinates a vertex
 * @param corners vertex numbers, of which the first `count` are the polygon's
 */
export function findPolygonShape(vertices: ArrayLike<number>, corners: ArrayLike<number>, count: number): PolygonShape {
  const origin = 3 * (corners[0] ?? 0);
  const ox = vertices[origin] ?? 0, oy = vertices[origin + 1] ?? 0, oz = vertices[origin + 2] ?? 0;
  let nx = 0, ny = 0, nz = 0;
  let px = 0, py = 0, pz = 0;
  let reach = 0;
  let largest = Math.max(Math.abs(ox), Math.abs(oy), Math.abs(oz));
  for (let k = 1; k < count; k++) {
    const at = 3 * (corners[k] ?? 0);
    const x = vertices[at] ?? 0, y = vertices[at + 1] ?? 0, z = vertices[at + 2] ?? 0;
    const qx = x - ox, qy = y - oy, qz = z - oz;
    nx += py * qz - pz * qy;
    ny += pz * qx - px * qz;
    nz += px * qy - py * qx;
    reach = Math.max(reach, Math.abs(qx), Math.abs(qy), Math.abs(qz));
    largest = Math.max(largest, Math.abs(x), Math.abs(y), Math.abs(z));
    px = qx;
    py = qy;
    pz = qz;
  }
  const square = nx * nx + ny * ny + nz * nz;
  if (!(square > 0)) return { planar: true, folded: false, normal: [nx, ny, nz] };
  const tolerance = (flatness * reach + writtenDigits * largest) * Math.sqrt(square);
  let planar = true;
  let turnedBack = 0;
  px = py = pz = 0;
  for (let k = 1; k < count; k++) {
    const at = 3 * (corners[k] ?? 0);
    const qx = (vertices[at] ?? 0) - ox, qy = (vertices[at + 1] ?? 0) - oy, qz = (vertices[at + 2] ?? 0) - oz;
    const height = qx * nx + qy * ny + qz * nz;
    if (height > tolerance || height < -tolerance) planar = false;
    turnedBack += Math.min(0, (py * qz - pz * qy) * nx + (pz * qx - px * qz) * ny + (px * qy - py * qx) * nz);
    px = qx;
    py = qy;
    pz = qz;
  }
  return { planar, folded: turnedBack < -overlap * square, normal: [nx, ny, nz] };
}
