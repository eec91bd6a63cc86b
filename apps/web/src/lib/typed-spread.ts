import { parseQuantity, type Quantity } from '@masswright/units';

export type ReadSpread = { value: number; spread: number | null; error?: undefined } | { value?: undefined; spread?: undefined; error: string };

const unitPattern = /[^\d\s.,+\-−–eE][^±]*$/;

/**
 * A quantity with how far it may be off, as a person types it: `2.7 g/cm3 ± 1 %`, `2700 ± 27 kg/m³`, `0.311 kg +- 0.002 kg`. A unit that is
 * written once is meant for both. The spread is null where none is written. All in SI.
 */
export function readSpread(text: string, quantity: Quantity): ReadSpread {
  const [first = '', second, ...more] = text.split(/±|\+\/?-/);
  if (more.length > 0) return { error: 'Write one ± only.' };
  if (second === undefined) return readAlone(first, quantity);
  const percent = /^\s*([\d.]+(?:e-?\d+)?)\s*%\s*$/i.exec(second);
  const unit = percent ? '' : (unitPattern.exec(second)?.[0] ?? '');
  const value = readAlone(unitPattern.test(first) ? first : `${first.trim()} ${unit}`, quantity);
  if (value.error !== undefined) return value;
  if (percent) return { value: value.value, spread: (Math.abs(value.value) * Number(percent[1])) / 100 };
  if (second.trim() === '') return { error: 'Write how far it may be off behind the ±, as in ± 1 %.' };
  const spread = readAlone(unit === '' ? `${second.trim()} ${unitPattern.exec(first)?.[0] ?? ''}` : second, quantity);
  if (spread.error !== undefined) return { error: `Behind the ±: ${spread.error}` };
  return spread.value < 0 ? { error: 'What stands behind the ± is not negative.' } : { value: value.value, spread: spread.value };
}

function readAlone(text: string, quantity: Quantity): ReadSpread {
  const parsed = parseQuantity(text, quantity);
  return 'error' in parsed ? { error: parsed.error } : { value: parsed.value, spread: null };
}

/** The other way, in a unit of `factor` SI units: digits that a conversion made are left out. */
export function writeSpread(value: number, spread: number | null, symbol: string, factor = 1, digits = 6): string {
  const plain = (figure: number): string => String(Number((figure / factor).toPrecision(digits)));
  return spread === null ? `${plain(value)} ${symbol}` : `${plain(value)} ± ${plain(spread)} ${symbol}`;
}
