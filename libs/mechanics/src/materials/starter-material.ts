import type { Material } from '@masswright/contracts';

/** A material that every installation has. Densities and spreads in kg/m³. */
export type StarterMaterial = Pick<Material, 'id' | 'name' | 'group' | 'densityKgM3' | 'densitySpreadKgM3' | 'spreadBasis' | 'source'>;

/** Where the densities of the starter library come from. */
export const sources = {
  nist: 'NIST material list, as shipped with Geant4',
  handbook: 'Room-temperature handbook list',
  tpsx: 'NASA TPSX materials database',
  physics: 'OpenStax, University Physics',
  memory: 'From memory, no source at hand',
} as const;

/**
 * Half-widths in per cent of the density, by what makes the material. None of the sources states a spread, so all of them are judgement: a pure metal
 * varies by its pores alone; wrought metal by the limits of its alloy; a casting by its pores and its carbon or silicon; a polymer by grade, filler,
 * moisture and, printed, by voids; what grows or is mixed on site by much more.
 */
const percentOf = { pure: 0.5, steel: 1, wrought: 1, cast: 3, polymer: 2, blend: 3, elastomer: 5, composite: 5, glass: 2, stone: 3, mixed: 5, wood: 15, cork: 15, foam: 10 } as const;

/** A spread as a kind of material (see above), or as kg/m³ where a range is known. */
export type Spread = keyof typeof percentOf | number;

/** A material of the library; the spread has at most four digits. */
export function starter(id: string, name: string, group: StarterMaterial['group'], densityKgM3: number, spread: Spread, source: keyof typeof sources): StarterMaterial {
  const densitySpreadKgM3 = typeof spread === 'number' ? spread : Number(((densityKgM3 * percentOf[spread]) / 100).toPrecision(4));
  return { id, name, group, densityKgM3, densitySpreadKgM3, spreadBasis: 'judgement', source: sources[source] };
}
