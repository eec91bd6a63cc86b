import type { Axis, DensityChoice, Drive, Setting, SettingChange } from '@masswright/contracts';

/** Equal in all their elements, in whatever order an object's fields were written. */
function isEqual(one: unknown, other: unknown): boolean {
  if (one === other) return true;
  if (typeof one !== 'object' || typeof other !== 'object' || one === null || other === null) return false;
  if (Array.isArray(one) !== Array.isArray(other)) return false;
  const entries = Object.entries(one);
  const others = new Map<string, unknown>(Object.entries(other));
  return entries.length === others.size && entries.every(([key, value]) => others.has(key) && isEqual(value, others.get(key)));
}

export const isSameAxis = (one: Axis, other: Axis): boolean => isEqual(one, other);
export const isSameDrive = (one: Drive | null, other: Drive | null): boolean => isEqual(one, other);

/** Settings from before there were tolerances and densities of shells have neither. */
export function pickSetting({ lengthUnit, densityKgM3, densitySpreadKgM3, material, weighing, axis, drive, asMade = null, shellDensities = [] }: Setting): Setting {
  return { lengthUnit, densityKgM3, densitySpreadKgM3, material, weighing, axis, drive, asMade, shellDensities };
}

/** The library may have given the material another name since: who it is stays the same. */
const isSameDensity = (one: Setting, other: Setting): boolean =>
  one.densityKgM3 === other.densityKgM3 && one.densitySpreadKgM3 === other.densitySpreadKgM3 && one.material?.id === other.material?.id;

/** Density, spread and name go together: with a name the density that is shown, which the library may not have any more. */
function writeDensityChoice({ densityKgM3, densitySpreadKgM3, material }: Setting): DensityChoice {
  return { densityKgM3, densitySpreadKgM3, ...(material && { material: { id: material.id } }) };
}

/** What must be changed of `known` to have `wanted`; empty where both say the same. */
export function computeDifference(wanted: Setting, known: Setting): SettingChange {
  const difference: SettingChange = isSameDensity(wanted, known) ? {} : writeDensityChoice(wanted);
  if (wanted.lengthUnit !== known.lengthUnit) difference.lengthUnit = wanted.lengthUnit;
  if (!isEqual(wanted.weighing, known.weighing)) difference.weighing = wanted.weighing;
  if (!isSameAxis(wanted.axis, known.axis)) difference.axis = wanted.axis;
  if (!isSameDrive(wanted.drive, known.drive)) difference.drive = wanted.drive;
  if (!isEqual(wanted.asMade ?? null, known.asMade ?? null)) difference.asMade = wanted.asMade ?? null;
  if (!isEqual(wanted.shellDensities ?? [], known.shellDensities ?? [])) difference.shellDensities = wanted.shellDensities ?? [];
  return difference;
}

export function isSameSetting(one: Setting, other: Setting): boolean {
  return Object.keys(computeDifference(one, other)).length === 0;
}
