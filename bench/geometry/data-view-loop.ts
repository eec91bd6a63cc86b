const headerBytes = 84;
const facetBytes = 50;

/** The loop that one would write: twenty integrals and four sizes over the facets of a binary STL file, number by number through a DataView, each summed plainly. */
export function integrateByDataView(bytes: Uint8Array): number[] {
  const view = new DataView(bytes.buffer, bytes.byteOffset);
  const read = (at: number): number => view.getFloat32(at, true);
  const [ox, oy, oz] = [read(96), read(100), read(104)];
  let v = 0, vx = 0, vy = 0, vz = 0, vxx = 0, vyy = 0, vzz = 0, vxy = 0, vyz = 0, vzx = 0;
  let s = 0, sx = 0, sy = 0, sz = 0, sxx = 0, syy = 0, szz = 0, sxy = 0, syz = 0, szx = 0;
  let determinant = 0, determinantSecond = 0, cross = 0, crossSecond = 0;
  for (let at = headerBytes + 12; at < bytes.length; at += facetBytes) {
    const ax = read(at) - ox, ay = read(at + 4) - oy, az = read(at + 8) - oz;
    const bx = read(at + 12) - ox, by = read(at + 16) - oy, bz = read(at + 20) - oz;
    const cx = read(at + 24) - ox, cy = read(at + 28) - oy, cz = read(at + 32) - oz;
    const ex = bx - ax, ey = by - ay, ez = bz - az, fx = cx - ax, fy = cy - ay, fz = cz - az;
    const p1 = ey * fz, q1 = ez * fy, p2 = ez * fx, q2 = ex * fz, p3 = ex * fy, q3 = ey * fx;
    const nx = p1 - q1, ny = p2 - q2, nz = p3 - q3;
    const size1 = Math.abs(p1) + Math.abs(q1), size2 = Math.abs(p2) + Math.abs(q2), size3 = Math.abs(p3) + Math.abs(q3);
    const dSize = Math.abs(ax) * size1 + Math.abs(ay) * size2 + Math.abs(az) * size3;
    const lSize = size1 + size2 + size3;
    const d = ax * nx + ay * ny + az * nz;
    const l = Math.sqrt(nx * nx + ny * ny + nz * nz);
    const tx = ax + bx + cx, ty = ay + by + cy, tz = az + bz + cz;
    const xx = tx * tx + ax * ax + bx * bx + cx * cx, yy = ty * ty + ay * ay + by * by + cy * cy, zz = tz * tz + az * az + bz * bz + cz * cz;
    const xy = tx * ty + ax * ay + bx * by + cx * cy, yz = ty * tz + ay * az + by * bz + cy * cz, zx = tz * tx + az * ax + bz * bx + cz * cx;
    v += d; vx += d * tx; vy += d * ty; vz += d * tz;
    vxx += d * xx; vyy += d * yy; vzz += d * zz; vxy += d * xy; vyz += d * yz; vzx += d * zx;
    s += l; sx += l * tx; sy += l * ty; sz += l * tz;
    sxx += l * xx; syy += l * yy; szz += l * zz; sxy += l * xy; syz += l * yz; szx += l * zx;
    determinant += dSize; determinantSecond += dSize * (xx + yy + zz);
    cross += lSize; crossSecond += lSize * (xx + yy + zz);
  }
  return [v, vx, vy, vz, vxx, vyy, vzz, vxy, vyz, vzx, s, sx, sy, sz, sxx, syy, szz, sxy, syz, szx, determinant, determinantSecond, cross, crossSecond];
}
