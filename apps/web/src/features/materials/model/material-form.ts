import type { CreateMaterialRequest, Material, MaterialGroup, SpreadBasis } from '@masswright/contracts';
import { readDensity, writeDensity } from '../../../lib/density';
import { writePlain } from '../../../lib/material-words';
import { readSpread } from '../../../lib/typed-spread';

/** What a person types to describe a material. */
export interface MaterialTexts {
  name: string;
  group: MaterialGroup;
  density: string;
  /** `1 %`, `27 kg/m3` or `0.03 g/cm3`. */
  spread: string;
  spreadBasis: SpreadBasis;
  source: string;
}

export type MaterialErrors = Partial<Record<'name' | 'density' | 'spread' | 'source', string>>;

export const emptyMaterial: MaterialTexts = { name: '', group: 'aluminium', density: '', spread: '', spreadBasis: 'judgement', source: '' };

export function writeMaterial({ name, group, densityKgM3, densitySpreadKgM3, spreadBasis, source }: Material): MaterialTexts {
  return { name, group, density: writeDensity(densityKgM3), spread: writeHalfWidth(densityKgM3, densitySpreadKgM3), spreadBasis, source };
}

/** As a share where it is a plain one, so that it goes with the density when that is changed. */
function writeHalfWidth(densityKgM3: number, spreadKgM3: number): string {
  const percent = Number(((spreadKgM3 / densityKgM3) * 100).toPrecision(2));
  return spreadKgM3 > 0 && (densityKgM3 * percent) / 100 === spreadKgM3 ? `${percent} %` : `${Number(spreadKgM3.toPrecision(12))} kg/m³`;
}

/** Half the width of the interval, from a share of the density or from a density itself. */
function readHalfWidth(text: string, densityKgM3: number): { value?: number; error?: string } {
  if (text.trim() === '') return { error: 'Say how far the density may be off, such as 1 %.' };
  const { spread, error } = readSpread(`${densityKgM3} kg/m3 ± ${text}`, 'density');
  if (error !== undefined) return { error: error.replace(/^Behind the ±: /, '') };
  if (spread === null) return { error: 'Say how far the density may be off, such as 1 %.' };
  // A bare number would be taken for kg/m³ here, and could have been meant in any unit.
  if (/^\s*[\d.]+(?:e-?\d+)?\s*$/i.test(text)) return { error: 'Write it with its unit or as a percentage: 27 kg/m3 or 1 %.' };
  return spread > densityKgM3 ? { error: 'It can’t be more than the density itself.' } : { value: spread };
}

/** What was typed, in the contract's terms, or what is wrong with which field. */
export function readMaterial(texts: MaterialTexts): { material?: CreateMaterialRequest; errors: MaterialErrors } {
  const errors: MaterialErrors = {};
  const name = texts.name.trim();
  if (name === '') errors.name = 'Give the material a name.';
  else if (name.length > 120) errors.name = 'A name has at most 120 characters.';
  if (texts.source.trim().length > 300) errors.source = 'A source has at most 300 characters.';
  const density = readDensity(texts.density);
  if (density.error !== undefined) errors.density = density.error;
  else if (density.densityKgM3 === null) errors.density = 'Type a density with its unit, such as 2.7 g/cm3.';
  const densityKgM3 = density.densityKgM3 ?? undefined;
  const half = readHalfWidth(texts.spread, densityKgM3 ?? 1);
  if (half.error !== undefined) errors.spread = half.error;
  if (Object.keys(errors).length > 0 || densityKgM3 === undefined || half.value === undefined) return { errors };
  return { material: { name, group: texts.group, densityKgM3, densitySpreadKgM3: half.value, spreadBasis: texts.spreadBasis, source: texts.source.trim() }, errors };
}

/** What a spread comes to: in kg/m³ and as a share. */
export function describeSpread({ densityKgM3, densitySpreadKgM3 }: Pick<Material, 'densityKgM3' | 'densitySpreadKgM3'>): string {
  return `${writePlain(densitySpreadKgM3, 3)} kg/m³, ${writePlain((densitySpreadKgM3 / densityKgM3) * 100, 2)} %`;
}

export const basisWords: Record<SpreadBasis, string> = { source: 'stated by the source', judgement: 'judgement' };
