import type { Symmetric3, Vector3 } from '../../measurement';
import type { Corners, Point } from '../../testing/shapes';

/** Area of a mesh, and volume, first and second moments of its body about a point, by plain sums of tetrahedra with an apex there. */
export function sumMesh(corners: Corners, [ox, oy, oz]: Point): { volume: number; area: number; first: Vector3; second: Symmetric3 } {
  let volume = 0, area = 0, x = 0, y = 0, z = 0, xx = 0, yy = 0, zz = 0, xy = 0, yz = 0, zx = 0;
  for (let at = 0; at < corners.length; at += 9) {
    const at3 = (k: number): number => (corners[at + k] ?? NaN) - (k % 3 === 0 ? ox : k % 3 === 1 ? oy : oz);
    const ax = at3(0), ay = at3(1), az = at3(2), bx = at3(3), by = at3(4), bz = at3(5), cx = at3(6), cy = at3(7), cz = at3(8);
    const nx = (by - ay) * (cz - az) - (bz - az) * (cy - ay), ny = (bz - az) * (cx - ax) - (bx - ax) * (cz - az), nz = (bx - ax) * (cy - ay) - (by - ay) * (cx - ax);
    const d = ax * nx + ay * ny + az * nz;
    const sx = ax + bx + cx, sy = ay + by + cy, sz = az + bz + cz;
    volume += d / 6;
    area += Math.sqrt(nx * nx + ny * ny + nz * nz) / 2;
    x += (d * sx) / 24;
    y += (d * sy) / 24;
    z += (d * sz) / 24;
    xx += (d * (sx * sx + ax * ax + bx * bx + cx * cx)) / 120;
    yy += (d * (sy * sy + ay * ay + by * by + cy * cy)) / 120;
    zz += (d * (sz * sz + az * az + bz * bz + cz * cz)) / 120;
    xy += (d * (sx * sy + ax * ay + bx * by + cx * cy)) / 120;
    yz += (d * (sy * sz + ay * az + by * bz + cy * cz)) / 120;
    zx += (d * (sz * sx + az * ax + bz * bx + cz * cx)) / 120;
  }
  return { volume, area, first: [x, y, z], second: { xx, yy, zz, xy, yz, zx } };
}
