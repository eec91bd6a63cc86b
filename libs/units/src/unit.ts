/**
 * A unit of one quantity: a value in SI is value · numerator / denominator. Both are exact binary64 numbers wherever the unit is
 * defined by a rational number, so that a conversion rounds twice and no more.
 */
export interface Unit {
  readonly symbol: string;
  readonly numerator: number;
  readonly denominator: number;
  /** Other ways in which people write it; case and the signs between factors are taken care of elsewhere. */
  readonly spellings: readonly string[];
}

export function toSi(value: number, unit: Unit): number {
  return (value * unit.numerator) / unit.denominator;
}

export function fromSi(valueSi: number, unit: Unit): number {
  return (valueSi * unit.denominator) / unit.numerator;
}

export function findUnit(units: readonly Unit[], symbol: string): Unit | undefined {
  return units.find((unit) => unit.symbol === symbol);
}

export function getUnit(units: readonly Unit[], symbol: string): Unit {
  const unit = findUnit(units, symbol);
  if (unit === undefined) throw new RangeError(`There is no unit ${symbol} among ${units.map((other) => other.symbol).join(', ')}.`);
  return unit;
}

/** The factor of a unit to a power, by repeated multiplication. */
export function raiseFactor(unit: Unit, power: number): { numerator: number; denominator: number } {
  let numerator = 1;
  let denominator = 1;
  for (let k = 0; k < power; k++) {
    numerator *= unit.numerator;
    denominator *= unit.denominator;
  }
  return { numerator, denominator };
}
