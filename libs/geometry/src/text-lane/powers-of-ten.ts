import { laneLayout } from './lane-memory';

const leastPower = -64;
const greatestPower = 63;

/** A power of a whole number, exactly. */
function raise(base: bigint, power: number): bigint {
  let result = 1n;
  for (let k = 0; k < power; k++) result *= base;
  return result;
}

/**
 * The first 128 bits of a power of five, the uppermost of them 1: rounded down for the powers that are whole, and up for their inverses, as the method that
 * reads them wants it.
 */
function findFirstBits(power: number): bigint {
  const whole = raise(5n, Math.abs(power));
  const length = whole.toString(2).length;
  if (power >= 0) return length <= 128 ? whole << BigInt(128 - length) : whole >> BigInt(length - 128);
  // 2^(length - 1) ≤ whole < 2^length, and whole is no power of two.
  return (1n << BigInt(127 + length)) / whole + 1n;
}

/** Writes the tables that the lane reads numbers with. */
export function writePowers(buffer: ArrayBuffer): void {
  const words = new BigUint64Array(buffer);
  for (let power = 0; power < 20; power++) words[(laneLayout.TENS >> 3) + power] = raise(10n, power);
  const exact = new Float64Array(buffer, laneLayout.EXACT_POWERS, 23);
  for (let power = 0; power < exact.length; power++) exact[power] = Number(raise(10n, power));
  for (let power = leastPower; power <= greatestPower; power++) {
    const bits = findFirstBits(power);
    const at = (laneLayout.POWERS >> 3) + 2 * (power - leastPower);
    words[at] = bits >> 64n;
    words[at + 1] = BigInt.asUintN(64, bits);
  }
}
