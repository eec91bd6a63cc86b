import type { SettingsChange } from '@masswright/contracts';
import type { CurrentSetting, HeldPart, listSettingsChangeItems, SettingBefore } from '@masswright/drizzle';
import { requirePresent } from '../parts/stored-part';
import { AppError } from '../platform/app-error';

export type LeftPart = SettingsChange['left'][number];

const leave = ({ id, number, name }: HeldPart, changedBy: string): LeftPart => ({ partId: id, number, name, changedBy });

/** Of parts that are to be changed, those that are there, and those that somebody has deleted meanwhile. @throws AppError conflict where none is there */
export function separateDeleted(held: readonly HeldPart[]): { present: HeldPart[]; deleted: LeftPart[] } {
  const present = held.filter(({ deletedAt }) => deletedAt === null);
  if (present.length === 0) held.forEach(requirePresent);
  const deleted = held.filter(({ deletedAt }) => deletedAt !== null).sort((one, other) => one.number - other.number);
  return { present, deleted: deleted.map((part) => leave(part, '')) };
}

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
    else left.push(leave(part, part.deletedAt === null ? current.changedByName : ''));
  }
  return { restorable, left };
}

const mostSaid = 3;

/** Nothing of a change can be put back: said with the first of the parts, and the change can still be taken back when theirs are. */
export function nothingToRestore(left: readonly LeftPart[]): AppError {
  const said = left.slice(0, mostSaid).map(({ name, changedBy }) => (changedBy === '' ? `${name} (deleted)` : `${name} (${changedBy})`));
  const more = left.length > mostSaid ? ` and ${left.length - mostSaid} more` : '';
  return new AppError('conflict', `Nothing was put back, because everything was changed or deleted meanwhile: ${said.join(', ')}${more}.`);
}
