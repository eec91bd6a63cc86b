import type { Part } from '@masswright/contracts';
import { findMeasuredByOtherVersion, findPart, holdParts, listRevisions, listSameBytes, type StoredPart, type Transaction } from '@masswright/drizzle';
import { AppError, notFound } from '../platform/app-error';
import type { Actor } from '../platform/work';
import { presentPart } from './part.presenter';

export async function getStoredPart(tx: Transaction, partId: string): Promise<StoredPart> {
  const stored = await findPart(tx, partId);
  if (stored === undefined) throw notFound('part');
  return stored;
}

/** Refuses to change what is deleted. @throws AppError saying how to go on */
export function requirePresent({ deletedAt }: { deletedAt: Date | null }): void {
  if (deletedAt !== null) throw new AppError('conflict', 'This part is deleted. Restore it first, then change it.');
}

/**
 * A part that is to be changed, held for the rest of the transaction before anything of it is: whoever changes many parts at once holds them first too,
 * so that two never wait for each other.
 *
 * @throws AppError where there is none, or where it is deleted
 */
export async function getPresentPart(tx: Transaction, partId: string): Promise<StoredPart> {
  await holdParts(tx, [partId]);
  const stored = await getStoredPart(tx, partId);
  requirePresent(stored.part);
  return stored;
}

/** A part as it leaves the api, as the transaction sees it now. */
export async function readPart(tx: Transaction, partId: string, actor: Pick<Actor, 'role'>): Promise<Part> {
  const stored = await getStoredPart(tx, partId);
  const { sha256 } = stored.upload;
  return presentPart(stored, {
    revisions: await listRevisions(tx, partId),
    sameBytes: sha256 === null ? [] : await listSameBytes(tx, sha256, stored.revision.id),
    measuredBefore: sha256 === null || stored.measurement === null ? undefined : await findMeasuredByOtherVersion(tx, sha256, stored.measurement.measuringVersion),
    actor,
  });
}
