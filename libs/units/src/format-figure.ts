/** Sets off thousands; never breaks a line and is told from a word space. */
export const thinSpace = '\u2009';

const raisedDigits = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** The parts of a figure as it is shown, for columns that align on the decimal point. */
export interface FigureParts {
  /** `-` or nothing. */
  sign: string;
  /** Digits before the point, thousands set off. */
  integer: string;
  /** Digits after the point; empty where there is none. */
  fraction: string;
  /** `×10⁻⁶` or nothing. */
  exponent: string;
}

export interface FigureOptions {
  /** Significant digits, 1 to 17. Digits before the point are never replaced by zeros. */
  digits?: number;
}

/** A smaller figure would begin with more than three zeros, a larger one could not be taken in at a glance: these get a power of ten. */
const plainFrom = 1e-4;
const plainBelow = 1e9;

/**
 * Cuts a number into what is shown before and after the decimal point. Rounding is decimal and exact (to the nearest, as `toPrecision` does).
 * Zero has no sign.
 */
export function splitFigure(value: number, { digits = 6 }: FigureOptions = {}): FigureParts {
  if (!Number.isFinite(value)) throw new RangeError('Only a finite number can be shown as a figure.');
  const size = Math.abs(value);
  const sign = value < 0 ? '-' : '';
  if (size === 0) return { sign: '', integer: '0', fraction: '', exponent: '' };

  const [mantissa = '', powerText = '0'] = size.toExponential(digits - 1).split('e');
  const power = Number(powerText);
  const rounded = Number(`${mantissa}e${powerText}`);
  if (rounded < plainFrom || size >= plainBelow) {
    const [integer = '', fraction = ''] = mantissa.split('.');
    return { sign, integer, fraction, exponent: power === 0 ? '' : `×10${raise(power)}` };
  }
  const [integer = '', fraction = ''] = size.toFixed(Math.max(0, Math.min(100, digits - 1 - power))).split('.');
  return { sign, integer: groupThousands(integer), fraction, exponent: '' };
}

/**
 * A number for the eye: decimal point, thousands by a thin space, a power of ten only below 0.0001 and from a thousand million on.
 * The minus is the hyphen-minus and not U+2212: figures are copied out of the page, and spreadsheets and programs read only that one.
 */
export function formatFigure(value: number, options: FigureOptions = {}): string {
  const { sign, integer, fraction, exponent } = splitFigure(value, options);
  return `${sign}${integer}${fraction === '' ? '' : `.${fraction}`}${exponent}`;
}

/** A whole number with its thousands set off. */
export function formatCount(count: number): string {
  return `${count < 0 ? '-' : ''}${groupThousands(Math.abs(count).toFixed(0))}`;
}

/** A number for machines: all its digits, no spaces, the shortest text that reads back to the same bits. */
export function writeFigure(value: number): string {
  return String(value);
}

function groupThousands(digits: string): string {
  return digits.replace(/\B(?=(\d{3})+$)/g, thinSpace);
}

function raise(power: number): string {
  return `${power < 0 ? '⁻' : ''}${String(Math.abs(power)).replace(/\d/g, (digit) => raisedDigits[Number(digit)] ?? digit)}`;
}
