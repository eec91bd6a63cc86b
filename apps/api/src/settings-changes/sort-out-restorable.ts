import type { SettingsChange } from '@masswright/contracts';
import type { CurrentSetting, HeldPart, listSettingsChangeItems, SettingBefore } from '@masswright/drizzle';

export type LeftPart = SettingsChange['left'][number];
type Item = Awaited<ReturnType<typeof listSettingsChangeItems>>[number];

/**
 * Which settings of a change can be put back: those of parts that are there, whose latest revision is still the one that was changed and whose setting
 * has not been changed since. The others are named, in the order of their numbers.
 */
export function sortOutRestorable(items: readonly Item[], held: readonly HeldPart[], settings: readonly CurrentSetting[]): { restorable: { current: CurrentSetting; before: SettingBefore }[]; left: LeftPart[] } {
  const parts = new Map(held.map((part) => [part.id, part]));
  const currents = new Map(settings.map((current) => [current.partId, current]));
  const restorable: { current: CurrentSetting; before: SettingBefore }[] = [];
  const left: LeftPart[] = [];
  for (const { partId, revisionId, before, versionAfter } of items) {
    const part = parts.get(partId);
    const current = currents.get(partId);
    // Forgotten between the reading and the holding: there is nothing left to name.
    if (part === undefined || current === undefined) continue;
    if (part.deletedAt === null && current.revisionId === revisionId && current.version === versionAfter) restorable.push({ current, before });
    else left.push({ partId, number: part.number, name: part.name, changedBy: current.changedByName });
  }
  return { restorable, left };
}
