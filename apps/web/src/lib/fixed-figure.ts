import { splitFigure, thinSpace } from '@masswright/units';

/** With `decimals` after the point, thousands set off; what rounds to nothing has no sign. */
export function formatDecimals(value: number, decimals: number): string {
  const text = Math.abs(value).toFixed(decimals);
  const [integer = '0', fraction] = text.split('.');
  const grouped = integer.replace(/\B(?=(\d{3})+$)/g, thinSpace);
  const sign = value < 0 && Number(text) !== 0 ? '-' : '';
  return fraction === undefined ? `${sign}${grouped}` : `${sign}${grouped}.${fraction}`;
}

/** As many decimals as give the largest of some figures `digits` significant ones: those of one matrix or one beam then align. */
export function chooseDecimals(values: readonly number[], digits: number, most = 9): number {
  const largest = Math.max(0, ...values.map(Math.abs));
  if (largest === 0) return 0;
  const power = Number(largest.toExponential(digits - 1).split('e')[1]);
  return Math.min(most, Math.max(0, digits - 1 - power));
}

/** True where a figure is outside of what is read without a power of ten, so that a column of fixed decimals can't show it. */
export function needsPowerOfTen(value: number, digits: number): boolean {
  return splitFigure(value, { digits }).exponent !== '';
}

/** One way to write all figures of a group: the same decimals, or each with its power of ten where the group needs one. */
export function createGroupFormat(values: readonly number[], digits: number): (value: number) => string {
  const largest = Math.max(0, ...values.map(Math.abs));
  if (largest > 0 && needsPowerOfTen(largest, digits)) {
    return (value) => {
      const { sign, integer, fraction, exponent } = splitFigure(value, { digits });
      return `${sign}${integer}${fraction ? `.${fraction}` : ''}${exponent}`;
    };
  }
  const decimals = chooseDecimals(values, digits);
  return (value) => formatDecimals(value, decimals);
}
