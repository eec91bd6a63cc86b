import type { Setting, Weighing } from '@masswright/contracts';
import type { ReadField } from '../../../components/typed-field';
import { writePlain } from '../../../lib/material-words';
import { readSpread, writeSpread } from '../../../lib/typed-spread';
import { readDensity } from '../../../lib/density';

export interface Density {
  densityKgM3: number;
  densitySpreadKgM3: number | null;
}

/** A density, with its spread where a person states one. */
export function readTypedDensity(text: string): ReadField<Density> {
  if (text.trim() === '') return { value: null };
  if (!/±|\+\/?-/.test(text)) {
    const { densityKgM3, error } = readDensity(text);
    return error === undefined ? { value: densityKgM3 === null ? null : { densityKgM3, densitySpreadKgM3: null } } : { error };
  }
  const read = readSpread(text, 'density');
  if (read.error !== undefined) return { error: read.error };
  const { error } = readDensity(`${read.value} kg/m3`);
  if (error !== undefined) return { error };
  return read.spread !== null && read.spread > 1e6 ? { error: 'A spread is at most 1 000 000 kg/m³.' } : { value: { densityKgM3: read.value, densitySpreadKgM3: read.spread } };
}

export function writeTypedDensity(density: Density | null): string {
  return density ? writeSpread(density.densityKgM3, density.densitySpreadKgM3, 'kg/m³') : '';
}

/** The density of a setting as one thing. */
export function pickDensity({ densityKgM3, densitySpreadKgM3 }: Pick<Setting, 'densityKgM3' | 'densitySpreadKgM3'>): Density | null {
  return densityKgM3 === null ? null : { densityKgM3, densitySpreadKgM3 };
}

const isSameText = (one: string, other: string): boolean => one.replace(/\s|\^/g, '').replace('m3', 'm³') === other.replace(/\s/g, '');
const inOtherWords = (plain: string, text: string): string => (isSameText(text, plain) ? '' : `= ${plain}`);

export const describeTypedDensity = (density: Density, text: string): string =>
  // A percentage is said as what it comes to, too.
  isSameText(text, `${Number(density.densityKgM3.toPrecision(15))} kg/m³`) && density.densitySpreadKgM3 === null ? '' : inOtherWords(writeTypedDensity(density), text);

/** A weighed mass; how sure it is belongs to it. */
export function readTypedWeighing(text: string): ReadField<Weighing> {
  if (text.trim() === '') return { value: null };
  const read = readSpread(text, 'mass');
  if (read.error !== undefined) return { error: read.error };
  if (!(read.value > 0)) return { error: 'A mass is greater than 0.' };
  if (read.value > 1e9) return { error: 'A mass is at most 1 000 000 000 kg.' };
  if (read.spread === null) return { error: 'Say how sure the scale is (k = 2), as in 0.311 kg ± 0.002 kg.' };
  return { value: { massKg: read.value, uncertaintyKg: read.spread } };
}

export function writeTypedWeighing(weighing: Weighing | null): string {
  if (!weighing) return '';
  const inGrams = weighing.massKg < 1;
  return writeSpread(weighing.massKg, weighing.uncertaintyKg, inGrams ? 'g' : 'kg', inGrams ? 1e-3 : 1, 9);
}

/** Only a share is said in other words: what else was typed says the same already. */
export const describeTypedWeighing = (weighing: Weighing, text: string): string => (text.includes('%') ? inOtherWords(writeTypedWeighing(weighing), text) : '');

/** A difference of masses with its sign, and as a share of the one before. */
export function describeMassChange(fromKg: number, toKg: number): string {
  const difference = toKg - fromKg;
  const inGrams = Math.abs(difference) < 1;
  const sign = difference < 0 ? '-' : '+';
  const size = `${sign}${writePlain(Math.abs(inGrams ? difference * 1000 : difference), 3)} ${inGrams ? 'g' : 'kg'}`;
  return fromKg > 0 ? `${size}, ${sign}${writePlain((Math.abs(difference) / fromKg) * 100, 2)} %` : size;
}
