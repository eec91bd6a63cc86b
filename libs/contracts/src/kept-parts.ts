import type { Upload } from './upload';

type StoredPart = Upload['storedParts'][number];

/**
 * Of the parts that the storage has, those that need not be sent again: the SHA-256 against which the storage checked them is that of the file's own part.
 * One that it took without a hash is not trusted.
 */
export async function choosePartsToKeep(stored: readonly StoredPart[], hashPart: (partNumber: number) => Promise<string>): Promise<(StoredPart & { sha256: string })[]> {
  const kept: (StoredPart & { sha256: string })[] = [];
  // One after the other: each is read from the disk and held in memory while it is hashed.
  for (const part of stored) {
    const { sha256 } = part;
    if (sha256 !== null && sha256 === (await hashPart(part.partNumber))) kept.push({ ...part, sha256 });
  }
  return kept;
}
