import { cleanFolder } from '@masswright/contracts';
import pLimit from 'p-limit';
import { hashBlob } from '../../../lib/file-hash';
import type { NameMatch } from './upload-entry';

/** A larger file is not held in memory as a whole to be hashed: the person is asked about it instead. */
const largestBytes = 500_000_000;

type FindPresence = (file: File, folder: string, matches: readonly NameMatch[]) => Promise<NameMatch | undefined>;

/**
 * Finds the part that has this very file already: by name and folder, size and SHA-256. Only where the first three agree is the file read for the last.
 * A file that can't be read now is nobody's; sending it will say why.
 */
export function createPresenceCheck(hash: (blob: Blob) => Promise<string> = hashBlob): FindPresence {
  // One after the other: each is held in memory while it is hashed.
  const hashing = pLimit(1);
  return async (file, folder, matches) => {
    const candidates = matches.filter((match) => match.sha256 !== null && match.sameCase && match.sizeBytes === file.size && match.folder === cleanFolder(folder));
    if (candidates.length === 0 || file.size > largestBytes) return undefined;
    const own = await hashing(() => hash(file)).catch(() => undefined);
    return candidates.find(({ sha256 }) => sha256 === own);
  };
}
