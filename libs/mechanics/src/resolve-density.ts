import type { Setting, StatementRecord } from '@masswright/contracts';

export interface ResolvedDensity {
  densityKgM3: number | null;
  /** How the weighing stands; null where there is none, or no volume to hold it against. */
  weighing: StatementRecord['weighing'];
}

/**
 * The density that a statement counts with. A weighed mass sets it (mass over volume) while that agrees with the named material: the difference of the
 * two densities is then at most √(spread² + U²), the material's half-width and the weighing's expanded uncertainty over the volume, taken as independent.
 * Without a named material the weighing sets it unchecked. Where it disagrees the part is not a uniform body of the material (hollow, filled, another
 * material); its tensor can't be scaled from the weight, so the material's density stays and the verdict says so.
 *
 * @param volumeM3 null where the mesh has no volume that can be defended; nothing is then said of the weighing
 */
export function resolveDensity(volumeM3: number | null, setting: Pick<Setting, 'densityKgM3' | 'densitySpreadKgM3' | 'material' | 'weighing'>): ResolvedDensity {
  const { densityKgM3, densitySpreadKgM3, material, weighing } = setting;
  if (weighing === null || volumeM3 === null || !(volumeM3 > 0)) return { densityKgM3, weighing: null };
  const impliedDensityKgM3 = weighing.massKg / volumeM3;
  const state = (verdict: NonNullable<ResolvedDensity['weighing']>['verdict']): ResolvedDensity => ({
    densityKgM3: verdict === 'disagrees' ? densityKgM3 : impliedDensityKgM3,
    weighing: { ...weighing, impliedDensityKgM3, verdict },
  });
  if (material === null || densityKgM3 === null) return state('unchecked');
  const uncertainty = weighing.uncertaintyKg / volumeM3;
  const spread = densitySpreadKgM3 ?? 0;
  const tolerance = Math.sqrt(spread * spread + uncertainty * uncertainty);
  return state(Math.abs(impliedDensityKgM3 - densityKgM3) <= tolerance ? 'agrees' : 'disagrees');
}
