import { productRest } from './double-double';

const exactPowers = [1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22] as const;
const largestExactPower = exactPowers.length - 1;

const isDigit = (code: number | undefined): boolean => code !== undefined && code >= 48 && code <= 57;

/** 2⁻¹⁰⁰ and 2⁻⁵⁰ with room: bounds on the relative errors of a quotient's two parts. */
const quotientError = 1e-30;
const remainderError = 1e-15;

/**
 * The binary64 number nearest to a decimal one written in bytes[start, end), to the last bit; undefined where no number is written there.
 * Up to 15 digits with a power of ten up to 22 are exact operands, so that one multiplication or division rounds correctly
 * (Clinger 1990, "How to read floating point numbers accurately"). Up to 19 digits go through two-part arithmetic, which decides unless the number
 * lies next to the middle between two others; what is left goes through the engine, whose conversion is exact by standard.
 */
export function parseDecimal(bytes: Uint8Array, start: number, end: number): number | undefined {
  let at = start;
  const sign = bytes[at];
  const negative = sign === 45;
  if (negative || sign === 43) at += 1;

  // The first 15 significant digits, and up to four more.
  let mantissa = 0;
  let tail = 0;
  let significant = 0;
  let digits = 0;
  let scale = 0;
  let pointSeen = false;
  for (; at < end; at++) {
    const code = bytes[at] ?? 0;
    if (code === 46 && !pointSeen) {
      pointSeen = true;
      continue;
    }
    if (code < 48 || code > 57) break;
    digits += 1;
    if (pointSeen) scale -= 1;
    if (significant > 0 || code !== 48) significant += 1;
    if (significant <= 15) mantissa = mantissa * 10 + (code - 48);
    else if (significant <= 19) tail = tail * 10 + (code - 48);
  }
  if (digits === 0) return undefined;

  if (at < end) {
    const exponent = parseExponent(bytes, at, end);
    if (exponent === undefined) return undefined;
    scale += exponent;
  }
  if (significant > 19 || scale > largestExactPower || scale < -largestExactPower) return parseByEngine(bytes, start, end);
  if (significant > 15) {
    const size = scaleLong(mantissa, tail, significant - 15, scale);
    if (size === undefined) return parseByEngine(bytes, start, end);
    return negative ? -size : size;
  }
  const size = scale >= 0 ? mantissa * (exactPowers[scale] ?? 1) : mantissa / (exactPowers[-scale] ?? 1);
  return negative ? -size : size;
}

/** (mantissa · 10^tailDigits + tail) · 10^scale, or undefined where two-part arithmetic cannot tell how it rounds. */
function scaleLong(mantissa: number, tail: number, tailDigits: number, scale: number): number | undefined {
  const shift = exactPowers[tailDigits] ?? 1;
  const high = mantissa * shift;
  // Exact: the digits are fewer than two parts can hold. |high| ≥ tail, so that the sum's rest needs no test.
  let low = productRest(mantissa, shift, high);
  const whole = high + tail;
  low += tail - (whole - high);
  const power = exactPowers[Math.abs(scale)] ?? 1;
  let first: number;
  let second: number;
  if (scale < 0) {
    first = whole / power;
    const product = first * power;
    second = (whole - product - productRest(first, power, product) + low) / power;
  } else {
    first = whole * power;
    second = productRest(whole, power, first) + low * power;
  }
  const error = quotientError * first + remainderError * Math.abs(second);
  const least = first + (second - error);
  return least === first + (second + error) ? least : undefined;
}

/** The `e-05` of a number; undefined where it is something else. */
function parseExponent(bytes: Uint8Array, start: number, end: number): number | undefined {
  let at = start;
  if (((bytes[at] ?? 0) | 32) !== 101) return undefined;
  at += 1;
  const negative = bytes[at] === 45;
  if (negative || bytes[at] === 43) at += 1;
  if (at >= end) return undefined;
  let exponent = 0;
  for (; at < end; at++) {
    const code = bytes[at];
    if (!isDigit(code)) return undefined;
    // Beyond any power of binary64; more digits could only overflow the counter.
    if (exponent < 100_000) exponent = exponent * 10 + ((code ?? 48) - 48);
  }
  return negative ? -exponent : exponent;
}

function parseByEngine(bytes: Uint8Array, start: number, end: number): number {
  return Number(String.fromCharCode(...bytes.subarray(start, end)));
}

/** Whether bytes[start, end) writes "not a number" or an infinity in one of the ways that C libraries print them. */
export function isNonFiniteWord(bytes: Uint8Array, start: number, end: number): boolean {
  const word = String.fromCharCode(...bytes.subarray(start, end)).toLowerCase();
  return /^[+-]?(nan|inf|infinity|nan\(\w*\)|1\.?#\w+)$/.test(word);
}
