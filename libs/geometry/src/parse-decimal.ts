const exactPowers = [1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22] as const;
const largestExactPower = exactPowers.length - 1;

const isDigit = (code: number | undefined): boolean => code !== undefined && code >= 48 && code <= 57;

/**
 * The binary64 number nearest to a decimal one written in bytes[start, end), to the last bit; undefined where no number is written there.
 * Up to 15 digits with a power of ten up to 22 are exact operands, so that one multiplication or division rounds correctly
 * (Clinger 1990, "How to read floating point numbers accurately"); the rest goes through the engine, whose conversion is exact by standard.
 */
export function parseDecimal(bytes: Uint8Array, start: number, end: number): number | undefined {
  let at = start;
  const sign = bytes[at];
  const negative = sign === 45;
  if (negative || sign === 43) at += 1;

  let mantissa = 0;
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
  }
  if (digits === 0) return undefined;

  if (at < end) {
    const exponent = parseExponent(bytes, at, end);
    if (exponent === undefined) return undefined;
    scale += exponent;
  }
  if (significant > 15 || scale > largestExactPower || scale < -largestExactPower) return parseByEngine(bytes, start, end);
  const size = scale >= 0 ? mantissa * (exactPowers[scale] ?? 1) : mantissa / (exactPowers[-scale] ?? 1);
  return negative ? -size : size;
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
