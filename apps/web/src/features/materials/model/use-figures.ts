import type { MaterialUse } from '@masswright/contracts';

/** What the present density would move of a part's mass; null where nothing would be, or nothing is known. */
export interface MassMove {
  differenceKg: number;
  share: number;
}

export function computeMove({ massKg, massAtPresentDensityKg }: MaterialUse): MassMove | null {
  if (massKg === null || massAtPresentDensityKg === null || !(massKg > 0)) return null;
  return { differenceKg: massAtPresentDensityKg - massKg, share: (massAtPresentDensityKg - massKg) / massKg };
}

/** A part whose setting was made with another density than the material has now. */
export const isBehind = (use: MaterialUse, presentKgM3: number): boolean => use.densityKgM3 !== presentKgM3;
