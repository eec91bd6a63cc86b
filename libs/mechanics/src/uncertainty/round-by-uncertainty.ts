/** A value as it can sensibly be shown. */
export interface RoundedFigure {
  value: number;
  uncertainty: number;
  /** Digits after the decimal point of both; negative where digits before it are rounded away. */
  decimals: number;
}

/**
 * An expanded uncertainty to two significant digits, and the value to the same place (GUM 7.2.6). Decimal rounding, to the nearest. Where the uncertainty is 0 or no
 * number, the value stays as it is, to 15 digits.
 */
export function roundByUncertainty(value: number, uncertainty: number): RoundedFigure {
  if (!(uncertainty > 0) || !Number.isFinite(uncertainty)) return { value: Number(value.toPrecision(15)), uncertainty: 0, decimals: countDecimals(value, 15) };
  const decimals = countDecimals(uncertainty, 2);
  return { value: roundTo(value, decimals), uncertainty: Number(uncertainty.toPrecision(2)), decimals };
}

/** Digits after the point of a number that is rounded to so many significant ones. */
function countDecimals(value: number, digits: number): number {
  const exponent = Number(value.toExponential(digits - 1).split('e')[1] ?? 0);
  return digits - 1 - exponent;
}

function roundTo(value: number, decimals: number): number {
  if (value === 0) return 0;
  const exponent = Number(value.toExponential(15).split('e')[1] ?? 0);
  const digits = exponent + decimals + 1;
  // All of it lies below the place, or begins just there.
  if (digits < 0) return 0;
  if (digits === 0) return Number(`${Math.round(shiftPoint(value, decimals))}e${-decimals}`) + 0;
  return Number(value.toPrecision(Math.min(digits, 17)));
}

/** A number times a power of ten, by its decimal digits: nothing is rounded on the way. */
function shiftPoint(value: number, places: number): number {
  const [digits = '0', exponent = '0'] = String(value).split('e');
  return Number(`${digits}e${Number(exponent) + places}`);
}
