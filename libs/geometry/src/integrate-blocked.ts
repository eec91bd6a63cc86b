import { sizes, sumsOfSurface, type FacetIntegrator, type FacetSums } from './facet-sums';

/** Facets summed plainly before the block is folded into the compensated sums, half of them in each lane. A batch is a multiple of it. */
export const blockFacets = 16;

/**
 * The usual kernel: binary64 with edge-form determinants, plain sums in blocks of 16 facets in two lanes (facets at even and at odd places of the block),
 * lanes folded by two-sum in the order of the file. It is the reference of the kernel in assembly/, which has to give the same bits: every expression
 * there is associated as it is here.
 */
export const integrateBlocked: FacetIntegrator = (sums, origin, corners, count) => {
  for (let begin = 0; begin < count; begin += blockFacets) {
    const end = Math.min(begin + blockFacets, count);
    addLane(begin, end, origin, corners, even);
    addLane(begin + 1, end, origin, corners, odd);
    foldLanes(sums);
  }
};

/** Plain sums of one lane: the twenty of FacetSums, then the four sizes. */
const even = new Float64Array(24);
const odd = new Float64Array(24);
const sizesAt = 20;

function addLane(begin: number, end: number, origin: ArrayLike<number>, corners: Float64Array, lane: Float64Array): void {
  const ox = origin[0] ?? 0;
  const oy = origin[1] ?? 0;
  const oz = origin[2] ?? 0;
  let v = 0, vx = 0, vy = 0, vz = 0, vxx = 0, vyy = 0, vzz = 0, vxy = 0, vyz = 0, vzx = 0;
  let s = 0, sx = 0, sy = 0, sz = 0, sxx = 0, syy = 0, szz = 0, sxy = 0, syz = 0, szx = 0;
  let determinant = 0, determinantSecond = 0, cross = 0, crossSecond = 0;
  for (let facet = begin; facet < end; facet += 2) {
    const at = 9 * facet;
    const px = corners[at] ?? 0, py = corners[at + 1] ?? 0, pz = corners[at + 2] ?? 0;
    const qx = corners[at + 3] ?? 0, qy = corners[at + 4] ?? 0, qz = corners[at + 5] ?? 0;
    const rx = corners[at + 6] ?? 0, ry = corners[at + 7] ?? 0, rz = corners[at + 8] ?? 0;
    const ax = px - ox, ay = py - oy, az = pz - oz;
    const bx = qx - ox, by = qy - oy, bz = qz - oz;
    const cx = rx - ox, cy = ry - oy, cz = rz - oz;
    // Edges of the coordinates themselves: between neighbours they are exact, however far the facet is from the origin.
    const ex = qx - px, ey = qy - py, ez = qz - pz;
    const fx = rx - px, fy = ry - py, fz = rz - pz;
    const p1 = ey * fz, q1 = ez * fy, p2 = ez * fx, q2 = ex * fz, p3 = ex * fy, q3 = ey * fx;
    const nx = p1 - q1, ny = p2 - q2, nz = p3 - q3;
    const size1 = Math.abs(p1) + Math.abs(q1), size2 = Math.abs(p2) + Math.abs(q2), size3 = Math.abs(p3) + Math.abs(q3);
    const dSize = Math.abs(ax) * size1 + Math.abs(ay) * size2 + Math.abs(az) * size3;
    const lSize = size1 + size2 + size3;
    const d = ax * nx + ay * ny + az * nz;
    const l = Math.sqrt(nx * nx + ny * ny + nz * nz);
    const tx = ax + bx + cx, ty = ay + by + cy, tz = az + bz + cz;
    const xx = tx * tx + ax * ax + (bx * bx + cx * cx);
    const yy = ty * ty + ay * ay + (by * by + cy * cy);
    const zz = tz * tz + az * az + (bz * bz + cz * cz);
    const xy = tx * ty + ax * ay + (bx * by + cx * cy);
    const yz = ty * tz + ay * az + (by * bz + cy * cz);
    const zx = tz * tx + az * ax + (bz * bx + cz * cx);
    const trace = xx + yy + zz;
    v += d; vx += d * tx; vy += d * ty; vz += d * tz;
    vxx += d * xx; vyy += d * yy; vzz += d * zz; vxy += d * xy; vyz += d * yz; vzx += d * zx;
    s += l; sx += l * tx; sy += l * ty; sz += l * tz;
    sxx += l * xx; syy += l * yy; szz += l * zz; sxy += l * xy; syz += l * yz; szx += l * zx;
    determinant += dSize; determinantSecond += dSize * trace;
    cross += lSize; crossSecond += lSize * trace;
  }
  lane[0] = v; lane[1] = vx; lane[2] = vy; lane[3] = vz; lane[4] = vxx; lane[5] = vyy; lane[6] = vzz; lane[7] = vxy; lane[8] = vyz; lane[9] = vzx;
  const o = sumsOfSurface;
  lane[o] = s; lane[o + 1] = sx; lane[o + 2] = sy; lane[o + 3] = sz; lane[o + 4] = sxx; lane[o + 5] = syy; lane[o + 6] = szz; lane[o + 7] = sxy; lane[o + 8] = syz; lane[o + 9] = szx;
  lane[sizesAt + sizes.determinant] = determinant; lane[sizesAt + sizes.determinantSecond] = determinantSecond;
  lane[sizesAt + sizes.cross] = cross; lane[sizesAt + sizes.crossSecond] = crossSecond;
}

function foldLanes(sums: FacetSums): void {
  const { high, low } = sums;
  for (let place = 0; place < high.length; place++) {
    fold(high, low, place, even[place] ?? 0);
    fold(high, low, place, odd[place] ?? 0);
  }
  for (let place = 0; place < sums.sizes.length; place++) {
    sums.sizes[place] = (sums.sizes[place] ?? 0) + ((even[sizesAt + place] ?? 0) + (odd[sizesAt + place] ?? 0));
  }
}

/** Adds a value to a sum and keeps what the rounding took away (Knuth's two-sum). */
function fold(high: Float64Array, low: Float64Array, place: number, value: number): void {
  const before = high[place] ?? 0;
  const after = before + value;
  const part = after - before;
  high[place] = after;
  low[place] = (low[place] ?? 0) + (before - (after - part) + (value - part));
}
