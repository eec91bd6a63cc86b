import type { Integrals, Vector3 } from '../measurement';

/**
 * The judge of the integrals: exact rational arithmetic on the exact values of the coordinates, by a formulation of its own. Where the measurer sums
 * edge-form determinants about a local origin, this one takes the cofactor determinants of the corners about the true origin
 * and integrates monomials over tetrahedra by their barycentric moments. Nothing is rounded before the end.
 */
export interface ExactIntegrals {
  /** All are numerators over `scale` to the power of the dimension, times a constant: V = volume / 6, … */
  volume6: bigint;
  first24: [bigint, bigint, bigint];
  second120: { xx: bigint; yy: bigint; zz: bigint; xy: bigint; yz: bigint; zx: bigint };
  /** One unit of length in units of the integers. */
  scale: bigint;
}

/** Bits behind the point to which areas are taken, beyond those of the coordinates. */
const areaBits = 200n;

function findRoot(square: bigint): bigint {
  if (square < 2n) return square;
  let root = 1n << BigInt(Math.ceil(square.toString(2).length / 2));
  for (;;) {
    const next = (root + square / root) >> 1n;
    if (next >= root) return root;
    root = next;
  }
}

/** Area, centroid less `origin` and second moments of a surface: every root to 200 bits, the rest exact. */
export function integrateSurfaceExactly(corners: ArrayLike<number>, origin: Vector3): Omit<Integrals, 'errorBound'> {
  const exponent = findCommonExponent([...Array.from(corners), ...origin]);
  const o = origin.map((coordinate) => toInteger(coordinate, exponent)) as [bigint, bigint, bigint];
  let content = 0n;
  const first: [bigint, bigint, bigint] = [0n, 0n, 0n];
  const second = { xx: 0n, yy: 0n, zz: 0n, xy: 0n, yz: 0n, zx: 0n };
  for (let at = 0; at + 9 <= corners.length; at += 9) {
    const p = Array.from({ length: 9 }, (_, k) => toInteger(corners[at + k] ?? 0, exponent) - (o[k % 3] ?? 0n));
    const [x1 = 0n, y1 = 0n, z1 = 0n, x2 = 0n, y2 = 0n, z2 = 0n, x3 = 0n, y3 = 0n, z3 = 0n] = p;
    const n = [(y1 - y2) * (z1 - z3) - (z1 - z2) * (y1 - y3), (z1 - z2) * (x1 - x3) - (x1 - x2) * (z1 - z3), (x1 - x2) * (y1 - y3) - (y1 - y2) * (x1 - x3)];
    const twice = findRoot(n.reduce((sum, c) => sum + c * c, 0n) << (2n * areaBits));
    content += twice;
    first[0] += twice * (x1 + x2 + x3);
    first[1] += twice * (y1 + y2 + y3);
    first[2] += twice * (z1 + z2 + z3);
    second.xx += twice * mixed(x1, x2, x3, x1, x2, x3);
    second.yy += twice * mixed(y1, y2, y3, y1, y2, y3);
    second.zz += twice * mixed(z1, z2, z3, z1, z2, z3);
    second.xy += twice * mixed(x1, x2, x3, y1, y2, y3);
    second.yz += twice * mixed(y1, y2, y3, z1, z2, z3);
    second.zx += twice * mixed(z1, z2, z3, x1, x2, x3);
  }
  const scale = 1n << BigInt(exponent);
  const extra = 1n << areaBits;
  // ∫uv - (∫u)(∫v)/A = second/24 - (first_u/6)(first_v/6)/(content/2) = second/24 - first_u first_v/(18 content)
  const about = (sum: bigint, u: bigint, v: bigint): number => toNumber(18n * sum * content - 24n * u * v, 24n * 18n * content * extra * scale ** 4n);
  const [x, y, z] = first;
  return {
    content: toNumber(content, 2n * extra * scale * scale),
    centreFromOrigin: first.map((sum) => toNumber(sum, 3n * content * scale)) as Vector3,
    second: { xx: about(second.xx, x, x), yy: about(second.yy, y, y), zz: about(second.zz, z, z), xy: about(second.xy, x, y), yz: about(second.yz, y, z), zx: about(second.zx, z, x) },
  };
}

/** A binary64 number is an integer times a power of two; finds the greatest power that all of them are multiples of. */
function findCommonExponent(values: ArrayLike<number>): number {
  let least = 0;
  for (let k = 0; k < values.length; k++) {
    let value = values[k] ?? 0;
    let exponent = 0;
    while (!Number.isInteger(value)) {
      value *= 2;
      exponent += 1;
    }
    if (exponent > least) least = exponent;
  }
  return least;
}

function toInteger(value: number, exponent: number): bigint {
  let scaled = value;
  let left = exponent;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    left -= 1;
  }
  return BigInt(scaled) << BigInt(left);
}

/** @param corners nine coordinates a facet */
export function integrateExactly(corners: ArrayLike<number>): ExactIntegrals {
  const exponent = findCommonExponent(corners);
  const sums = { volume6: 0n, x: 0n, y: 0n, z: 0n, xx: 0n, yy: 0n, zz: 0n, xy: 0n, yz: 0n, zx: 0n };
  for (let at = 0; at + 9 <= corners.length; at += 9) {
    const p = Array.from({ length: 9 }, (_, k) => toInteger(corners[at + k] ?? 0, exponent));
    const [x1 = 0n, y1 = 0n, z1 = 0n, x2 = 0n, y2 = 0n, z2 = 0n, x3 = 0n, y3 = 0n, z3 = 0n] = p;
    const det = x1 * y2 * z3 + x2 * y3 * z1 + x3 * y1 * z2 - x3 * y2 * z1 - x1 * y3 * z2 - x2 * y1 * z3;
    sums.volume6 += det;
    sums.x += det * (x1 + x2 + x3);
    sums.y += det * (y1 + y2 + y3);
    sums.z += det * (z1 + z2 + z3);
    sums.xx += det * 2n * (x1 * x1 + x2 * x2 + x3 * x3 + x1 * x2 + x2 * x3 + x3 * x1);
    sums.yy += det * 2n * (y1 * y1 + y2 * y2 + y3 * y3 + y1 * y2 + y2 * y3 + y3 * y1);
    sums.zz += det * 2n * (z1 * z1 + z2 * z2 + z3 * z3 + z1 * z2 + z2 * z3 + z3 * z1);
    sums.xy += det * mixed(x1, x2, x3, y1, y2, y3);
    sums.yz += det * mixed(y1, y2, y3, z1, z2, z3);
    sums.zx += det * mixed(z1, z2, z3, x1, x2, x3);
  }
  return {
    volume6: sums.volume6,
    first24: [sums.x, sums.y, sums.z],
    second120: { xx: sums.xx, yy: sums.yy, zz: sums.zz, xy: sums.xy, yz: sums.yz, zx: sums.zx },
    scale: 1n << BigInt(exponent),
  };
}

/** 120 times ∫uv over a tetrahedron with one corner at the origin, by its determinant: a corner with itself counts twice. */
function mixed(u1: bigint, u2: bigint, u3: bigint, v1: bigint, v2: bigint, v3: bigint): bigint {
  return 2n * (u1 * v1 + u2 * v2 + u3 * v3) + u1 * v2 + u2 * v1 + u2 * v3 + u3 * v2 + u3 * v1 + u1 * v3;
}

/** A rational number as binary64, to far more digits than it has. */
export function toNumber(numerator: bigint, denominator: bigint): number {
  if (numerator === 0n) return 0;
  const negative = numerator < 0n !== denominator < 0n;
  const n = numerator < 0n ? -numerator : numerator;
  const d = denominator < 0n ? -denominator : denominator;
  const shift = d.toString(2).length - n.toString(2).length + 80;
  const quotient = shift >= 0 ? (n << BigInt(shift)) / d : n / (d << BigInt(-shift));
  // In two steps, since a power of two beyond 1074 is out of range where the value itself is not.
  const half = Math.trunc(shift / 2);
  const value = Number(quotient) * 2 ** -half * 2 ** (half - shift);
  return negative ? -value : value;
}

/** Volume, centroid less `origin`, second moments about the centroid: as the measurer gives them, each rounded once. */
export function finishExactly({ volume6, first24, second120, scale }: ExactIntegrals, origin: Vector3) {
  const s3 = scale * scale * scale;
  const s5 = s3 * scale * scale;
  const originAt = origin.map((coordinate) => findFraction(coordinate));
  const centre = first24.map((first, k) => {
    // first/24 ÷ volume/6 - origin, over one denominator.
    const o = originAt[k] ?? { numerator: 0n, denominator: 1n };
    const denominator = 4n * volume6 * scale;
    return toNumber(first * o.denominator - o.numerator * denominator, denominator * o.denominator);
  }) as Vector3;
  // ∫uv - (∫u)(∫v)/V = second/120 - (first_u first_v / 576) · 6/volume6
  const about = (second: bigint, u: bigint, v: bigint): number => toNumber(second * 96n * volume6 - 120n * u * v, 120n * 96n * volume6 * s5);
  const [x, y, z] = first24;
  return {
    content: toNumber(volume6, 6n * s3),
    centreFromOrigin: centre,
    second: {
      xx: about(second120.xx, x, x),
      yy: about(second120.yy, y, y),
      zz: about(second120.zz, z, z),
      xy: about(second120.xy, x, y),
      yz: about(second120.yz, y, z),
      zx: about(second120.zx, z, x),
    },
  };
}

function findFraction(value: number): { numerator: bigint; denominator: bigint } {
  const exponent = findCommonExponent([value]);
  return { numerator: toInteger(value, exponent), denominator: 1n << BigInt(exponent) };
}
