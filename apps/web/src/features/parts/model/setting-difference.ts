import type { Axis, Drive, Setting } from '@masswright/contracts';

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

export function pickSetting({ lengthUnit, densityKgM3, axis, drive }: Setting): Setting {
  return { lengthUnit, densityKgM3, axis, drive };
}

/** The fields of `wanted` that are not so in `known`; empty where both say the same. */
export function computeDifference(wanted: Setting, known: Setting): Partial<Setting> {
  const difference: Partial<Setting> = {};
  if (wanted.lengthUnit !== known.lengthUnit) difference.lengthUnit = wanted.lengthUnit;
  if (wanted.densityKgM3 !== known.densityKgM3) difference.densityKgM3 = wanted.densityKgM3;
  if (!isSameAxis(wanted.axis, known.axis)) difference.axis = wanted.axis;
  if (!isSameDrive(wanted.drive, known.drive)) difference.drive = wanted.drive;
  return difference;
}

export function isSameSetting(one: Setting, other: Setting): boolean {
  return Object.keys(computeDifference(one, other)).length === 0;
}
