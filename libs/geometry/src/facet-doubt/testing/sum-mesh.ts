import type { Symmetric3, Vector3 } from '../../measurement';
import type { Corners, Point } from '../../testing/shapes';

/** Area of a mesh, and volume, first and second moments of its body about a point, by plain sums of tetrahedra with an apex there. */
export function sumMesh(corners: Corners, about: Point): { volume: number; area: number; first: Vector3; second: Symmetric3 } {
  let volume = 0, area = 0;
  const first = [0, 0, 0], second = [0, 0, 0, 0, 0, 0];
  const pairs = [[0, 0], [1, 1], [2, 2], [0, 1], [1, 2], [2, 0]] as const;
  for (let at = 0; at < corners.length; at += 9) {
    const p = Array.from({ length: 9 }, (_, k) => (corners[at + k] ?? NaN) - (about[k % 3] ?? NaN)) as [number, number, number, number, number, number, number, number, number];
    const [ux, uy, uz, vx, vy, vz] = [p[3] - p[0], p[4] - p[1], p[5] - p[2], p[6] - p[0], p[7] - p[1], p[8] - p[2]];
    const [nx, ny, nz] = [uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx];
    const d = p[0] * nx + p[1] * ny + p[2] * nz;
    const s = [0, 1, 2].map((k) => (p[k] ?? NaN) + (p[k + 3] ?? NaN) + (p[k + 6] ?? NaN));
    volume += d / 6;
    area += Math.sqrt(nx * nx + ny * ny + nz * nz) / 2;
    for (const k of [0, 1, 2]) first[k] = (first[k] ?? 0) + (d * (s[k] ?? NaN)) / 24;
    for (const [k, [i, j]] of pairs.entries()) {
      const own = [0, 3, 6].reduce((sum, corner) => sum + (p[corner + i] ?? NaN) * (p[corner + j] ?? NaN), 0);
      second[k] = (second[k] ?? 0) + (d * ((s[i] ?? NaN) * (s[j] ?? NaN) + own)) / 120;
    }
  }
  const [xx = NaN, yy = NaN, zz = NaN, xy = NaN, yz = NaN, zx = NaN] = second;
  return { volume, area, first: first as Vector3, second: { xx, yy, zz, xy, yz, zx } };
}
