import type { LengthUnit } from '@masswright/units';

/** The six units of a mesh in words; `means` is what a length of 100 in the file is then, `usual` where such files come from. */
export const unitTexts: Record<LengthUnit, { name: string; plural: string; means: string; usual: string }> = {
  micron: { name: 'micrometre', plural: 'micrometres', means: '0.1 mm', usual: 'micro-parts, scans of small things' },
  mm: { name: 'millimetre', plural: 'millimetres', means: '100 mm', usual: 'most machine parts and prints' },
  cm: { name: 'centimetre', plural: 'centimetres', means: '1 m', usual: 'some modelling programs' },
  m: { name: 'metre', plural: 'metres', means: '100 m', usual: 'robot descriptions, buildings' },
  inch: { name: 'inch', plural: 'inches', means: '2.54 m', usual: 'drawings in inches' },
  foot: { name: 'foot', plural: 'feet', means: '30.48 m', usual: 'site plans' },
};
