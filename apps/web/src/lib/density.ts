import { formatFigure, parseQuantity } from '@masswright/units';

/** The contract's own limit; nothing on Earth comes near it. */
const greatestKgM3 = 1e6;

export type TypedDensity = { densityKgM3: number | null; error?: undefined } | { densityKgM3?: undefined; error: string };

/** What a person typed as a density. Nothing typed is an answer too: it is stated later. */
export function readDensity(text: string): TypedDensity {
  if (text.trim() === '') return { densityKgM3: null };
  const parsed = parseQuantity(text, 'density');
  if ('error' in parsed) return { error: parsed.error };
  if (!(parsed.value > 0)) return { error: 'A density is greater than 0.' };
  if (parsed.value < 1e-6) return { error: 'A density is at least 0.000001 kg/m³.' };
  if (parsed.value > greatestKgM3) return { error: `A density of ${formatFigure(parsed.value, { digits: 4 })} kg/m³ is more than any material has. Check the unit.` };
  return { densityKgM3: parsed.value };
}

const withUnit = (densityKgM3: number, digits: number): string => `${Number(densityKgM3.toPrecision(digits))} kg/m³`;
const isSameText = (one: string, other: string): boolean => one.replace(/\s|\^/g, '').replace('m3', 'm³') === other.replace(/\s/g, '');

/** What was understood; nothing where the text says it in the same words already. */
export function describeDensity(densityKgM3: number, text: string): string {
  const plain = writeDensity(densityKgM3);
  if (isSameText(text, plain) || isSameText(text, withUnit(densityKgM3, 15))) return '';
  return `= ${plain}`;
}

/** A density for the eye: six digits, since those of a conversion go on for ever. What is stored stays as it is. */
export function writeDensity(densityKgM3: number | null): string {
  return densityKgM3 === null ? '' : withUnit(densityKgM3, 6);
}
