/**
 * How far a corner may stand off the plane of its polygon: a ten-thousandth of the polygon's extent, and the rounding of coordinates that were
 * written with six digits (half a unit of the sixth is at most 5e-6 of the number). A polygon within that is flat to its own figures.
 */
const flatness = 1e-4;
const writtenDigits = 5e-6;

/**
 * Whether the corners of a polygon lie in one plane: the one through its first corner and square to its vector area, which does not depend on
 * how it is cut into triangles. One without area has no plane and is taken as flat.
 *
 * @param vertices three coordinates a vertex
 * @param corners vertex numbers, of which the first `count` are the polygon's
 */
export function isPlanar(vertices: ArrayLike<number>, corners: ArrayLike<number>, count: number): boolean {
  if (count <= 3) return true;
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
  const length = Math.sqrt(nx * nx + ny * ny + nz * nz);
  if (!(length > 0)) return true;
  const tolerance = (flatness * reach + writtenDigits * largest) * length;
  for (let k = 1; k < count; k++) {
    const at = 3 * (corners[k] ?? 0);
    const height = ((vertices[at] ?? 0) - ox) * nx + ((vertices[at + 1] ?? 0) - oy) * ny + ((vertices[at + 2] ?? 0) - oz) * nz;
    if (height > tolerance || height < -tolerance) return false;
  }
  return true;
}
