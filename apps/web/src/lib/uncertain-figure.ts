import { roundByUncertainty } from '@masswright/mechanics';
import { formatFigure } from '@masswright/units';
import { formatDecimals, needsPowerOfTen } from './fixed-figure';

/** A figure and its ±, written to the same place. */
export interface UncertainText {
  value: string;
  /** Null where nothing is known of it; `<0.001` where it is less than the last place that is shown. */
  spread: string | null;
  /** `×10⁻⁶` or nothing; it belongs to both. */
  power: string;
}

export interface UncertainOptions {
  /** Places that are not shown even where the uncertainty would allow them. */
  mostDecimals?: number;
}

/** More digits than these nobody reads; the record has them all. */
const mostDigits = 9;
const plainDigits = 6;

const powerOf = (value: number): number => (value === 0 ? Number.NEGATIVE_INFINITY : Number(Math.abs(value).toExponential(mostDigits - 1).split('e')[1]));

/** A number times a power of ten, by its digits: a product would round. */
function shift(number: number, power: number): number {
  const [mantissa = '0', exponent = '0'] = number.toExponential().split('e');
  return Number(`${mantissa}e${Number(exponent) + power}`);
}

/** Decimals to which a value with this expanded uncertainty is written; negative where places before the point are rounded away. */
export function countDecimals(value: number, uncertainty: number): number {
  const { decimals } = roundByUncertainty(value, uncertainty);
  const most = mostDigits - 1 - powerOf(value);
  return uncertainty > 0 ? Math.min(decimals, most) : Math.min(most, plainDigits - 1 - powerOf(value));
}

/** A value rounded by its expanded uncertainty, and that to two digits. Without one, six significant digits of the value. */
export function writeUncertain(value: number, uncertainty: number | null, { mostDecimals = Number.POSITIVE_INFINITY }: UncertainOptions = {}): UncertainText {
  if (uncertainty === null || !Number.isFinite(value)) return { value: Number.isFinite(value) ? formatFigure(value, { digits: plainDigits }) : '—', spread: null, power: '' };
  const decimals = Math.min(countDecimals(value, uncertainty), mostDecimals);
  const largest = Math.max(Math.abs(value), uncertainty);
  if (mostDecimals === Number.POSITIVE_INFINITY && largest > 0 && needsPowerOfTen(largest, plainDigits)) {
    const power = powerOf(largest);
    return { ...writeTo(shift(value, -power), shift(uncertainty, -power), decimals + power), power: formatFigure(shift(1, power), { digits: 1 }).replace(/^1/, '') };
  }
  return { ...writeTo(value, uncertainty, Number.isFinite(decimals) ? decimals : 0), power: '' };
}

function writeTo(value: number, uncertainty: number, decimals: number): { value: string; spread: string } {
  const places = Math.min(100, Math.max(0, decimals));
  const round = (number: number): number => (decimals < 0 ? shift(Math.round(shift(number, decimals)), -decimals) : number);
  const last = shift(1, -places);
  const isLess = uncertainty > 0 && decimals >= 0 && uncertainty < last;
  return { value: formatDecimals(round(value), places), spread: isLess ? `<${formatDecimals(last, places)}` : formatDecimals(round(uncertainty), places) };
}

/** In one text, for a sentence or a caption. */
export function sayUncertain(value: number, uncertainty: number | null, unit: string): string {
  const { value: text, spread, power } = writeUncertain(value, uncertainty);
  const both = spread === null ? text : `${text} ± ${spread}`;
  return `${power === '' ? both : `(${both})${power}`} ${unit}`;
}
