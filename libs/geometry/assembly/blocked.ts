import { add, sub, mul, abs } from './lanes';
import { FACETS, HIGH, LOW, ORIGIN, SIZES } from './layout';

/** Facets of a block, as in src/integrate-blocked.ts, which is the reference: the expressions here are associated as they are there. */
const BLOCK: i32 = 16;

/** Bytes of a facet in a binary STL file, and of nine binary64 coordinates. */
const STL_FACET: usize = 50;
const FACET: usize = 72;

/** The x, or y …, of the facets in both lanes: binary64 numbers at a place of either. */
@inline function pair(even: usize, odd: usize): v128 {
  return v128.load64_lane(odd, v128.load64_zero(even), 1);
}
@inline function low(a: v128, b: v128): v128 {
  return v128.shuffle<i32>(a, b, 0, 4, 1, 5);
}
@inline function high(a: v128, b: v128): v128 {
  return v128.shuffle<i32>(a, b, 2, 6, 3, 7);
}
@inline function upper(a: v128): v128 {
  return v128.shuffle<i32>(a, a, 2, 3, 2, 3);
}
@inline function widen(a: v128): v128 {
  return f64x2.promote_low_f32x4(a);
}

/** Knuth's two-sum of a lane into a compensated sum. */
@inline function fold(place: usize, value: f64): void {
  const before = load<f64>(HIGH + place);
  const after = before + value;
  const part = after - before;
  store<f64>(HIGH + place, after);
  store<f64>(LOW + place, load<f64>(LOW + place) + (before - (after - part) + (value - part)));
}
@inline function foldLanes(place: usize, lanes: v128): void {
  fold(place, f64x2.extract_lane(lanes, 0));
  fold(place, f64x2.extract_lane(lanes, 1));
}
@inline function addSize(place: usize, lanes: v128): void {
  store<f64>(SIZES + place, load<f64>(SIZES + place) + (f64x2.extract_lane(lanes, 0) + f64x2.extract_lane(lanes, 1)));
}

/** Adds facets to the sums; their number is even. */
@inline function integrate(count: i32, packed: bool): void {
  const ox = v128.load64_splat(ORIGIN), oy = v128.load64_splat(ORIGIN, 8), oz = v128.load64_splat(ORIGIN, 16);
  const zero = f64x2.splat(0);
  let at = FACETS;
  for (let begin = 0; begin < count; begin += BLOCK) {
    const end = min(begin + BLOCK, count);
    let v = zero, vx = zero, vy = zero, vz = zero, vxx = zero, vyy = zero, vzz = zero, vxy = zero, vyz = zero, vzx = zero;
    let s = zero, sx = zero, sy = zero, sz = zero, sxx = zero, syy = zero, szz = zero, sxy = zero, syz = zero, szx = zero;
    let determinant = zero, determinantSecond = zero, cross = zero, crossSecond = zero;
    for (let facet = begin; facet < end; facet += 2) {
      let px: v128, py: v128, pz: v128, qx: v128, qy: v128, qz: v128, rx: v128, ry: v128, rz: v128;
      if (packed) {
        const e0 = v128.load(at, 12), e1 = v128.load(at, 28), e2 = v128.load32_zero(at, 44);
        const o0 = v128.load(at, 62), o1 = v128.load(at, 78), o2 = v128.load32_zero(at, 94);
        const l0 = low(e0, o0), h0 = high(e0, o0), l1 = low(e1, o1), h1 = high(e1, o1);
        px = widen(l0); py = widen(upper(l0)); pz = widen(h0);
        qx = widen(upper(h0)); qy = widen(l1); qz = widen(upper(l1));
        rx = widen(h1); ry = widen(upper(h1)); rz = widen(low(e2, o2));
        at += 2 * STL_FACET;
      } else {
        const odd = at + FACET;
        px = pair(at, odd); py = pair(at + 8, odd + 8); pz = pair(at + 16, odd + 16);
        qx = pair(at + 24, odd + 24); qy = pair(at + 32, odd + 32); qz = pair(at + 40, odd + 40);
        rx = pair(at + 48, odd + 48); ry = pair(at + 56, odd + 56); rz = pair(at + 64, odd + 64);
        at += 2 * FACET;
      }
      const ax = sub(px, ox), ay = sub(py, oy), az = sub(pz, oz);
      const bx = sub(qx, ox), by = sub(qy, oy), bz = sub(qz, oz);
      const cx = sub(rx, ox), cy = sub(ry, oy), cz = sub(rz, oz);
      const ex = sub(qx, px), ey = sub(qy, py), ez = sub(qz, pz);
      const fx = sub(rx, px), fy = sub(ry, py), fz = sub(rz, pz);
      const p1 = mul(ey, fz), q1 = mul(ez, fy), p2 = mul(ez, fx), q2 = mul(ex, fz), p3 = mul(ex, fy), q3 = mul(ey, fx);
      const nx = sub(p1, q1), ny = sub(p2, q2), nz = sub(p3, q3);
      const size1 = add(abs(p1), abs(q1)), size2 = add(abs(p2), abs(q2)), size3 = add(abs(p3), abs(q3));
      const dSize = add(add(mul(abs(ax), size1), mul(abs(ay), size2)), mul(abs(az), size3));
      const lSize = add(add(size1, size2), size3);
      const d = add(add(mul(ax, nx), mul(ay, ny)), mul(az, nz));
      const l = f64x2.sqrt(add(add(mul(nx, nx), mul(ny, ny)), mul(nz, nz)));
      const tx = add(add(ax, bx), cx), ty = add(add(ay, by), cy), tz = add(add(az, bz), cz);
      const xx = add(add(mul(tx, tx), mul(ax, ax)), add(mul(bx, bx), mul(cx, cx)));
      const yy = add(add(mul(ty, ty), mul(ay, ay)), add(mul(by, by), mul(cy, cy)));
      const zz = add(add(mul(tz, tz), mul(az, az)), add(mul(bz, bz), mul(cz, cz)));
      const xy = add(add(mul(tx, ty), mul(ax, ay)), add(mul(bx, by), mul(cx, cy)));
      const yz = add(add(mul(ty, tz), mul(ay, az)), add(mul(by, bz), mul(cy, cz)));
      const zx = add(add(mul(tz, tx), mul(az, ax)), add(mul(bz, bx), mul(cz, cx)));
      const trace = add(add(xx, yy), zz);
      v = add(v, d); vx = add(vx, mul(d, tx)); vy = add(vy, mul(d, ty)); vz = add(vz, mul(d, tz));
      vxx = add(vxx, mul(d, xx)); vyy = add(vyy, mul(d, yy)); vzz = add(vzz, mul(d, zz));
      vxy = add(vxy, mul(d, xy)); vyz = add(vyz, mul(d, yz)); vzx = add(vzx, mul(d, zx));
      s = add(s, l); sx = add(sx, mul(l, tx)); sy = add(sy, mul(l, ty)); sz = add(sz, mul(l, tz));
      sxx = add(sxx, mul(l, xx)); syy = add(syy, mul(l, yy)); szz = add(szz, mul(l, zz));
      sxy = add(sxy, mul(l, xy)); syz = add(syz, mul(l, yz)); szx = add(szx, mul(l, zx));
      determinant = add(determinant, dSize); determinantSecond = add(determinantSecond, mul(dSize, trace));
      cross = add(cross, lSize); crossSecond = add(crossSecond, mul(lSize, trace));
    }
    foldLanes(0, v); foldLanes(8, vx); foldLanes(16, vy); foldLanes(24, vz);
    foldLanes(32, vxx); foldLanes(40, vyy); foldLanes(48, vzz); foldLanes(56, vxy); foldLanes(64, vyz); foldLanes(72, vzx);
    foldLanes(80, s); foldLanes(88, sx); foldLanes(96, sy); foldLanes(104, sz);
    foldLanes(112, sxx); foldLanes(120, syy); foldLanes(128, szz); foldLanes(136, sxy); foldLanes(144, syz); foldLanes(152, szx);
    addSize(0, determinant); addSize(8, determinantSecond); addSize(16, cross); addSize(24, crossSecond);
  }
}

/** Facets as a binary STL file has them, 50 bytes each, at FACETS. */
export function integrateStl(count: i32): void {
  integrate(count, true);
}

/** Facets of nine binary64 coordinates at FACETS. */
export function integrateCorners(count: i32): void {
  integrate(count, false);
}
