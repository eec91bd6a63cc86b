import { sumsOfSurface, type FacetIntegrator, type FacetSums } from './facet-sums';

/** Facets summed plainly before the block is folded into the compensated sums. A batch is a multiple of it. */
const blockFacets = 16;

/**
 * The usual kernel: binary64 with edge-form determinants, plain sums in blocks of 16 facets, blocks folded by two-sum in the order of the file.
 * The roundings of one facet and one block are within `blockedRoundings` · 2⁻⁵³ of `determinantSize` (and of `crossSize` for the surface).
 * This file is the whole of the kernel; another one must add to the same FacetSums.
 */
export const integrateBlocked: FacetIntegrator = (sums, origin, corners, count) => {
  for (let begin = 0; begin < count; begin += blockFacets) {
    addBlock(sums, origin, corners, begin, Math.min(begin + blockFacets, count));
  }
};

/** Block sum 16, edges 2, products, differences and sums of the determinant 6. */
export const blockedRoundings = blockFacets + 8;

function addBlock(sums: FacetSums, origin: ArrayLike<number>, corners: Float64Array, begin: number, end: number): void {
  const ox = origin[0] ?? 0;
  const oy = origin[1] ?? 0;
  const oz = origin[2] ?? 0;
  let v = 0, vx = 0, vy = 0, vz = 0, vxx = 0, vyy = 0, vzz = 0, vxy = 0, vyz = 0, vzx = 0;
  let s = 0, sx = 0, sy = 0, sz = 0, sxx = 0, syy = 0, szz = 0, sxy = 0, syz = 0, szx = 0;
  let determinantSize = 0;
  let crossSize = 0;
  for (let facet = begin, at = 9 * begin; facet < end; facet++, at += 9) {
    const ax = (corners[at] ?? 0) - ox, ay = (corners[at + 1] ?? 0) - oy, az = (corners[at + 2] ?? 0) - oz;
    const bx = (corners[at + 3] ?? 0) - ox, by = (corners[at + 4] ?? 0) - oy, bz = (corners[at + 5] ?? 0) - oz;
    const cx = (corners[at + 6] ?? 0) - ox, cy = (corners[at + 7] ?? 0) - oy, cz = (corners[at + 8] ?? 0) - oz;
    // Edges of the coordinates themselves: between neighbours they are exact, however far the facet is from the origin.
    const ex = (corners[at + 3] ?? 0) - (corners[at] ?? 0), ey = (corners[at + 4] ?? 0) - (corners[at + 1] ?? 0), ez = (corners[at + 5] ?? 0) - (corners[at + 2] ?? 0);
    const fx = (corners[at + 6] ?? 0) - (corners[at] ?? 0), fy = (corners[at + 7] ?? 0) - (corners[at + 1] ?? 0), fz = (corners[at + 8] ?? 0) - (corners[at + 2] ?? 0);
    const p1 = ey * fz, q1 = ez * fy, p2 = ez * fx, q2 = ex * fz, p3 = ex * fy, q3 = ey * fx;
    const nx = p1 - q1, ny = p2 - q2, nz = p3 - q3;
    const size1 = Math.abs(p1) + Math.abs(q1), size2 = Math.abs(p2) + Math.abs(q2), size3 = Math.abs(p3) + Math.abs(q3);
    determinantSize += Math.abs(ax) * size1 + Math.abs(ay) * size2 + Math.abs(az) * size3;
    crossSize += size1 + size2 + size3;

    const d = ax * nx + ay * ny + az * nz;
    const l = Math.sqrt(nx * nx + ny * ny + nz * nz);
    const tx = ax + bx + cx, ty = ay + by + cy, tz = az + bz + cz;
    const xx = tx * tx + ax * ax + bx * bx + cx * cx;
    const yy = ty * ty + ay * ay + by * by + cy * cy;
    const zz = tz * tz + az * az + bz * bz + cz * cz;
    const xy = tx * ty + ax * ay + bx * by + cx * cy;
    const yz = ty * tz + ay * az + by * bz + cy * cz;
    const zx = tz * tx + az * ax + bz * bx + cz * cx;
    v += d; vx += d * tx; vy += d * ty; vz += d * tz;
    vxx += d * xx; vyy += d * yy; vzz += d * zz; vxy += d * xy; vyz += d * yz; vzx += d * zx;
    s += l; sx += l * tx; sy += l * ty; sz += l * tz;
    sxx += l * xx; syy += l * yy; szz += l * zz; sxy += l * xy; syz += l * yz; szx += l * zx;
  }
  sums.determinantSize += determinantSize;
  sums.crossSize += crossSize;
  const { high, low } = sums;
  fold(high, low, 0, v); fold(high, low, 1, vx); fold(high, low, 2, vy); fold(high, low, 3, vz);
  fold(high, low, 4, vxx); fold(high, low, 5, vyy); fold(high, low, 6, vzz); fold(high, low, 7, vxy); fold(high, low, 8, vyz); fold(high, low, 9, vzx);
  const o = sumsOfSurface;
  fold(high, low, o, s); fold(high, low, o + 1, sx); fold(high, low, o + 2, sy); fold(high, low, o + 3, sz);
  fold(high, low, o + 4, sxx); fold(high, low, o + 5, syy); fold(high, low, o + 6, szz); fold(high, low, o + 7, sxy); fold(high, low, o + 8, syz); fold(high, low, o + 9, szx);
}

/** Adds a value to a sum and keeps what the rounding took away (Knuth's two-sum). */
function fold(high: Float64Array, low: Float64Array, place: number, value: number): void {
  const before = high[place] ?? 0;
  const after = before + value;
  const part = after - before;
  high[place] = after;
  low[place] = (low[place] ?? 0) + (before - (after - part) + (value - part));
}
