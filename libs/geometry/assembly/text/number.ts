import { countDigits, findNoDigits, joinDigits, pass } from './digits';
import { EXACT_POWERS, GREATEST_POWER, LEAST_POWER, LONGEST_WORD, POWERS, TENS } from './layout';

/** What is taken for a coordinate: see src/mesh-words.ts. */
const largest: f64 = 3.4028234663852886e38;

/**
 * Reads a decimal number to the last bit and stores it. Gives the place after it; 0 where there is none, or one that is not decided here: more than 19 digits,
 * powers beyond the table, numbers too large for a coordinate.
 */
@inline export function readNumber(at: usize, target: usize): usize {
  const code: u32 = load<u8>(at);
  // Without branches where chance would decide them. 43 and 45 are plus and minus.
  const negative = <u64>(code == 45);
  const first = at + <usize>negative + <usize>(code == 43);
  // What C programs print most, `1.234567e+01`: the point of the first eight bytes is left out, and all is looked at together.
  const bytes = load<u64>(first), end = load<u64>(first, 8);
  const digits = ((bytes & 0xff) << 8) | (bytes & 0xffffffffffff0000) | 0x30;
  const sign = (end >> 8) & 0xff;
  const power = ((end >> 16) & 0xffff) ^ 0x3030;
  const other = findNoDigits(digits) | findNoDigits(power ^ 0x3030303030303030) | (((bytes >> 8) & 0xff) ^ 46) | (((end | 32) & 0xff) ^ 101) | ((sign - 43) & ~2) | <u64>(((end >> 32) & 0xff) > 32);
  if (other != 0) return readAnyNumber(at, first, negative, target);
  const scale = <i32>(44 - sign) * <i32>(10 * (power & 0xff) + (power >> 8)) - 6;
  // Seven digits are exact, and so is such a power of ten: one operation rounds correctly (Clinger 1990).
  if (scale > 0 || scale < -22) return readAnyNumber(at, first, negative, target);
  const size = <f64><i64>joinDigits(digits, 8) / load<f64>(EXACT_POWERS - (<usize>scale << 3));
  store<u64>(target, reinterpret<u64>(size) | (negative << 63));
  return first + 12;
}

function readAnyNumber(at: usize, first: usize, negative: u64, target: usize): usize {
  let p = first;
  let bytes = load<u64>(p);
  let count = countDigits(bytes);
  let mantissa: u64 = count == 0 ? 0 : joinDigits(bytes, count);
  p = pass(p, count);
  let code: u32 = load<u8>(p);
  if (count == 8) {
    while (code >= 48 && code <= 57) {
      mantissa = mantissa * 10 + code - 48;
      p += 1;
      code = load<u8>(p);
    }
  }
  let digits = <i32>(p - first);
  // Of more digits the mantissa may have run over to 0.
  let significant = mantissa == 0 && digits <= 19 ? 0 : digits;
  let scale = 0;
  if (code == 46) {
    p += 1;
    const fraction = p;
    bytes = load<u64>(p);
    count = countDigits(bytes);
    while (count == 8) {
      mantissa = mantissa * 100000000 + joinDigits(bytes, 8);
      p += 8;
      bytes = load<u64>(p);
      count = countDigits(bytes);
    }
    if (count > 0) {
      mantissa = mantissa * load<u64>(TENS + (<usize>count << 3)) + joinDigits(bytes, count);
      p = pass(p, count);
    }
    scale = -<i32>(p - fraction);
    digits -= scale;
    significant -= scale;
    code = load<u8>(p);
  }
  if (digits == 0) return 0;
  // Zeros in front are no digits of the number; what ran over was only more of those.
  if (significant > 19 && significant - countLeadingZeros(first) > 19) return 0;
  // 101 is e; 43 and 45 are plus and minus.
  if ((code | 32) == 101) {
    const sign: u32 = load<u8>(p, 1);
    const ten = <u32>load<u8>(p, 2) - 48, one = <u32>load<u8>(p, 3) - 48;
    if ((<u32>(((sign - 43) & ~2) == 0) & <u32>(ten < 10) & <u32>(one < 10) & <u32>(load<u8>(p, 4) <= 32)) != 0) {
      scale += (44 - <i32>sign) * <i32>(10 * ten + one);
      p += 4;
    } else {
      p = readExponent(p);
      if (p == 0) return 0;
      scale += exponent;
    }
  }
  if (p - at > LONGEST_WORD) return 0;
  const size = scaleNumber(mantissa, scale);
  store<u64>(target, reinterpret<u64>(size) | (negative << 63));
  return size <= largest ? p : 0;
}

/** mantissa · 10^scale, rounded to nearest; NaN where that is not decided here. */
@inline function scaleNumber(mantissa: u64, scale: i32): f64 {
  if (mantissa > 9007199254740992 || scale < -22 || scale > 22) return scaleLong(mantissa, scale);
  // Both operands are exact, so one operation rounds correctly (Clinger 1990).
  const power = load<f64>(EXACT_POWERS + (<usize>abs(scale) << 3));
  return scale < 0 ? <f64><i64>mantissa / power : <f64><i64>mantissa * power;
}

let exponent: i32 = 0;

/** Reads the `e-5` of a number into `exponent`; gives the place after it, or 0 where it is something else or has more than four digits. */
function readExponent(at: usize): usize {
  let p = at + 1;
  let code: u32 = load<u8>(p);
  const below = code == 45;
  if (below || code == 43) p += 1;
  const begin = p;
  let value = 0;
  code = <u32>load<u8>(p) - 48;
  while (code < 10) {
    value = value * 10 + code;
    p += 1;
    code = <u32>load<u8>(p) - 48;
  }
  exponent = below ? -value : value;
  return p == begin || p - begin > 4 ? 0 : p;
}

/** Zeros from here to the first other digit, the point aside. */
function countLeadingZeros(at: usize): i32 {
  let zeros = 0;
  // A whole part of zeros alone was not counted as significant, however long.
  let p = at;
  while (load<u8>(p) == 48) p += 1;
  if (load<u8>(p) != 46) return 0;
  p += 1;
  while (load<u8>(p) == 48) {
    zeros += 1;
    p += 1;
  }
  return zeros;
}

/** The upper 64 bits of a product of two of 64. */
@inline function multiplyHigh(a: u64, b: u64): u64 {
  const a0 = a & 0xffffffff, a1 = a >> 32, b0 = b & 0xffffffff, b1 = b >> 32;
  const middle = a1 * b0 + ((a0 * b0) >> 32);
  const rest = a0 * b1 + (middle & 0xffffffff);
  return a1 * b1 + (middle >> 32) + (rest >> 32);
}

/**
 * mantissa · 10^scale, rounded to nearest by the method of D. Lemire, "Number parsing at a gigabyte per second" (Software: Practice and Experience 51, 2021): the
 * mantissa, shifted up, times the first 64 bits of the power of five, and the next 64 where those don't decide. NaN where it is not decided, too
 * small for a normal number, or beyond the table.
 */
function scaleLong(mantissa: u64, scale: i32): f64 {
  if (mantissa == 0) return 0;
  if (scale < LEAST_POWER || scale > GREATEST_POWER) return NaN;
  const shift = clz<u64>(mantissa);
  const shifted = mantissa << shift;
  const place = POWERS + (<usize>(scale - LEAST_POWER) << 4);
  const power = load<u64>(place);
  let high = multiplyHigh(shifted, power);
  let low = shifted * power;
  if ((high & 0x1ff) == 0x1ff) {
    const more = multiplyHigh(shifted, load<u64>(place, 8));
    low += more;
    if (more > low) high += 1;
    // Even 128 bits of the power may leave it open.
    if (low == 0xffffffffffffffff && (scale < -27 || scale > 55)) return NaN;
  }
  const upper = high >> 63;
  let bits = high >> (upper + 9);
  // 217706 / 2^16 is the binary logarithm of ten.
  let exponent = ((217706 * scale) >> 16) + 63 + <i32>upper - <i32>shift + 1023;
  if (exponent <= 0) return NaN;
  // Half-way between two numbers: to the even one. Only a power of five that fits into 64 bits gives that.
  if (low <= 1 && scale >= -4 && scale <= 23 && (bits & 3) == 1 && (bits << (upper + 9)) == high) bits &= ~<u64>1;
  bits = (bits + (bits & 1)) >> 1;
  if (bits >= <u64>1 << 53) {
    bits = <u64>1 << 52;
    exponent += 1;
  }
  if (exponent >= 2047) return NaN;
  return reinterpret<f64>((bits & 0xfffffffffffff) | (<u64>exponent << 52));
}
