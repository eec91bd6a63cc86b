import { cleanFolder } from '@masswright/contracts';
import type { NameMatch, UploadEntry } from './upload-entry';

/** The likeliest part first: whose file lay in the same folder, then whose file's name has the same letter case; among equals as they came. */
export function orderMatches(matches: readonly NameMatch[], folder: string): NameMatch[] {
  const own = cleanFolder(folder);
  const rank = (match: NameMatch): number => (match.folder === own ? 0 : 2) + (match.sameCase ? 0 : 1);
  return [...matches].sort((one, other) => rank(one) - rank(other));
}

/**
 * By file, the part of which it is to be the next revision when that is said of all at once. No part is taken for two files: where several have its name,
 * the one from its folder has it, and the others are left for the person to decide one by one.
 */
export function proposeParts(entries: readonly Pick<UploadEntry, 'key' | 'folder' | 'matches'>[]): Map<string, string> {
  const proposed = new Map<string, string>();
  const taken = new Set<string>();
  const likeliest = entries.flatMap(({ key, folder, matches }) => {
    const [match] = matches ?? [];
    return match ? [{ key, partId: match.partId, isOfFolder: match.folder === cleanFolder(folder) }] : [];
  });
  for (const { key, partId } of [...likeliest].sort((one, other) => Number(other.isOfFolder) - Number(one.isOfFolder))) {
    if (taken.has(partId)) continue;
    taken.add(partId);
    proposed.set(key, partId);
  }
  return proposed;
}
