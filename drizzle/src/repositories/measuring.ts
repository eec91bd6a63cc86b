import { sql } from 'drizzle-orm';
import { and, desc, eq, inArray, isNull, ne, or } from 'drizzle-orm';
import type { Measurement, MeasuringError, MeasuringRun } from '@masswright/contracts';
import { measurements, measuringRuns, parts, revisions, uploads } from '../schema';
import type { Transaction } from '../tenancy/database';
import { isOfThisOrganisation } from '../tenancy/of-this-organisation';
import { examinedOf, presentMeasurement, rowOf } from './measurement-rows';

/** A run that this worker has taken up: what to read, and the fence that its writes must still match. */
export interface TakenRun {
  runId: string;
  fence: number;
  unendedTakeUps: number;
  revisionId: string;
  projectId: string;
  partId: string;
  uploadId: string;
  objectKey: string;
  sizeBytes: number;
  /** Known from an earlier take-up of the run; null where it must be found out. */
  sha256: Buffer | null;
  /** Another stored file of the organisation has as many bytes: this one may be known, so its hash is found out before it is measured. */
  hashFirst: boolean;
}

/** Held until the transaction ends by whoever decides about files of one size: two of the same bytes must not both be measured. */
async function holdFileSize(tx: Transaction, sizeBytes: number): Promise<void> {
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended('files of ' || current_organisation_id()::text || ' of ' || ${String(sizeBytes)}, 0))`);
}

/** Takes up a run that isn't finished and raises its fence, which shuts out whoever had it before. Undefined when it is finished. */
export async function takeRun(tx: Transaction, runId: string): Promise<TakenRun | undefined> {
  const [found] = await tx
    .select({
      revisionId: revisions.id,
      projectId: parts.projectId,
      partId: parts.id,
      uploadId: uploads.id,
      objectKey: uploads.objectKey,
      sizeBytes: uploads.sizeBytes,
      sha256: uploads.sha256,
    })
    .from(measuringRuns)
    .innerJoin(revisions, and(eq(revisions.organisationId, measuringRuns.organisationId), eq(revisions.id, measuringRuns.revisionId)))
    .innerJoin(parts, and(eq(parts.organisationId, revisions.organisationId), eq(parts.id, revisions.partId)))
    .innerJoin(uploads, and(eq(uploads.organisationId, revisions.organisationId), eq(uploads.id, revisions.uploadId)))
    .where(eq(measuringRuns.id, runId));
  if (found === undefined) return undefined;
  await holdFileSize(tx, found.sizeBytes);
  const hashFirst = await isSizeShared(tx, found.uploadId, found.sizeBytes);
  const [taken] = await tx
    .update(measuringRuns)
    .set({
      fence: sql`${measuringRuns.fence} + 1`,
      unendedTakeUps: sql`${measuringRuns.unendedTakeUps} + 1`,
      state: 'running',
      stage: hashFirst ? 'hashing' : 'reading',
      progress: 0,
      startedAt: sql`now()`,
    })
    .where(and(eq(measuringRuns.id, runId), inArray(measuringRuns.state, ['queued', 'running'])))
    .returning({ fence: measuringRuns.fence, unendedTakeUps: measuringRuns.unendedTakeUps });
  return taken === undefined ? undefined : { runId, ...taken, ...found, hashFirst };
}

/** Whether another stored file of the organisation has as many bytes. */
async function isSizeShared(tx: Transaction, uploadId: string, sizeBytes: number): Promise<boolean> {
  const rows = await tx
    .select({ id: uploads.id })
    .from(uploads)
    .where(and(isOfThisOrganisation(uploads), eq(uploads.sizeBytes, sizeBytes), eq(uploads.state, 'stored'), ne(uploads.id, uploadId)))
    .limit(1);
  return rows.length > 0;
}

/** known: the measurement that the organisation has of these bytes. claimed: this run may measure them. wait: another is about to. lost: another worker has this run. */
export type MeasuringClaim = { kind: 'known'; measurementId: string } | { kind: 'claimed' | 'wait' | 'lost' };

/** Notes the hash of a run's file and decides who measures these bytes: in an organisation, nothing is measured twice. */
export async function claimMeasuring(tx: Transaction, run: TakenRun, sha256: Buffer, measuringVersion: string): Promise<MeasuringClaim> {
  await holdFileSize(tx, run.sizeBytes);
  await tx.update(uploads).set({ sha256 }).where(eq(uploads.id, run.uploadId));
  const measurementId = await findWholeMeasurement(tx, sha256, measuringVersion);
  if (measurementId !== undefined) return { kind: 'known', measurementId };
  if (await isBeingMeasured(tx, run, sha256)) return { kind: 'wait' };
  const claimed = await tx.update(measuringRuns).set({ stage: 'measuring' }).where(held(run)).returning({ id: measuringRuns.id });
  return { kind: claimed.length > 0 ? 'claimed' : 'lost' };
}

/** Whether a run that is past its hashing has the same bytes, or bytes that are not known yet. */
async function isBeingMeasured(tx: Transaction, run: TakenRun, sha256: Buffer): Promise<boolean> {
  const rows = await tx
    .select({ id: measuringRuns.id })
    .from(measuringRuns)
    .innerJoin(revisions, and(eq(revisions.organisationId, measuringRuns.organisationId), eq(revisions.id, measuringRuns.revisionId)))
    .innerJoin(uploads, and(eq(uploads.organisationId, revisions.organisationId), eq(uploads.id, revisions.uploadId)))
    .where(
      and(
        isOfThisOrganisation(uploads),
        ne(measuringRuns.id, run.runId),
        eq(measuringRuns.state, 'running'),
        ne(measuringRuns.stage, 'hashing'),
        eq(uploads.sizeBytes, run.sizeBytes),
        or(isNull(uploads.sha256), eq(uploads.sha256, sha256)),
      ),
    )
    .limit(1);
  return rows.length > 0;
}

const held = (run: Pick<TakenRun, 'runId' | 'fence'>) =>
  and(eq(measuringRuns.id, run.runId), eq(measuringRuns.fence, run.fence), eq(measuringRuns.state, 'running'));

/** Notes how far a run is; false when another worker has taken it up since. */
export async function noteProgress(
  tx: Transaction,
  run: Pick<TakenRun, 'runId' | 'fence'>,
  progress: Pick<MeasuringRun, 'stage' | 'progress'>,
): Promise<boolean> {
  const rows = await tx.update(measuringRuns).set(progress).where(held(run)).returning({ id: measuringRuns.id });
  return rows.length > 0;
}

/** Puts a run back to wait, for a worker that shuts down or can't go on just now; false when another has it. */
export async function handBackRun(tx: Transaction, run: Pick<TakenRun, 'runId' | 'fence'>): Promise<boolean> {
  const rows = await tx
    .update(measuringRuns)
    .set({ state: 'queued', stage: 'waiting', progress: 0, startedAt: null, unendedTakeUps: 0 })
    .where(held(run))
    .returning({ id: measuringRuns.id });
  return rows.length > 0;
}

/**
 * Keeps a measurement, once an organisation, file and measuring version; gives the id of the one that is kept. One of which only the integrals stood
 * gives way to one that was examined; after that nothing of it changes.
 */
export async function keepMeasurement(
  tx: Transaction,
  kept: { organisationId: string; sha256: Buffer; measurement: Measurement },
): Promise<string> {
  const { organisationId, sha256, measurement } = kept;
  const [inserted] = await tx
    .insert(measurements)
    .values({ organisationId, sha256, ...rowOf(measurement) })
    .onConflictDoNothing({ target: [measurements.organisationId, measurements.sha256, measurements.measuringVersion] })
    .returning({ id: measurements.id });
  if (inserted !== undefined) return inserted.id;
  const id = await findMeasurement(tx, sha256, measurement.measuringVersion);
  if (id === undefined) throw new Error('A measurement conflicts with one that cannot be seen.');
  if (measurement.examined !== 'integrals') await tx.update(measurements).set(examinedOf(measurement)).where(and(eq(measurements.id, id), eq(measurements.examined, 'integrals')));
  return id;
}

/** Puts a run that has ended, or waits, at the beginning again: its file is to be read anew. Gives its id. */
export async function restartRun(tx: Transaction, revisionId: string): Promise<string> {
  const rows = await tx
    .update(measuringRuns)
    .set({ state: 'queued', stage: 'waiting', progress: 0, fence: sql`${measuringRuns.fence} + 1`, unendedTakeUps: 0, measurementId: null, errorCode: null, errorMessage: null, errorByte: null, errorLine: null, startedAt: null, finishedAt: null })
    .where(eq(measuringRuns.revisionId, revisionId))
    .returning({ id: measuringRuns.id });
  const [run] = rows;
  if (run === undefined) throw new Error('A revision has no run.');
  return run.id;
}

/** The id of the organisation's measurement of a file, if there is one. */
async function findMeasurement(tx: Transaction, sha256: Buffer, measuringVersion: string): Promise<string | undefined> {
  const [row] = await tx
    .select({ id: measurements.id })
    .from(measurements)
    .where(and(eq(measurements.sha256, sha256), eq(measurements.measuringVersion, measuringVersion)));
  return row?.id;
}

/** What the organisation knows of a file by another measuring version, the latest of them. */
export async function findMeasuredByOtherVersion(tx: Transaction, sha256: Buffer, version: string): Promise<Measurement | undefined> {
  const [row] = await tx
    .select()
    .from(measurements)
    .where(and(eq(measurements.sha256, sha256), ne(measurements.measuringVersion, version)))
    .orderBy(desc(measurements.createdAt))
    .limit(1);
  return row && presentMeasurement(row);
}

/** The id of the organisation's measurement of a file that nothing remains to be examined of. */
async function findWholeMeasurement(tx: Transaction, sha256: Buffer, measuringVersion: string): Promise<string | undefined> {
  const [row] = await tx
    .select({ id: measurements.id })
    .from(measurements)
    .where(and(eq(measurements.sha256, sha256), eq(measurements.measuringVersion, measuringVersion), ne(measurements.examined, 'integrals')));
  return row?.id;
}

/** Gives a run the measurement whose integrals stand, while the rest is examined; false when another worker has taken it up since. */
export async function showFigures(tx: Transaction, run: Pick<TakenRun, 'runId' | 'fence'>, measurementId: string): Promise<boolean> {
  const rows = await tx.update(measuringRuns).set({ stage: 'examining', measurementId }).where(held(run)).returning({ id: measuringRuns.id });
  return rows.length > 0;
}

/** Ends a run with its measurement; false when another worker has taken it up since, and then nothing may be committed. */
export async function finishRun(tx: Transaction, run: Pick<TakenRun, 'runId' | 'fence'>, measurementId: string): Promise<boolean> {
  const rows = await tx
    .update(measuringRuns)
    .set({ state: 'done', stage: 'storing', progress: 1, measurementId, finishedAt: sql`now()` })
    .where(held(run))
    .returning({ id: measuringRuns.id });
  return rows.length > 0;
}

/** Ends a run with the reason why the file can't be measured; false as above. */
export async function failRun(tx: Transaction, run: Pick<TakenRun, 'runId' | 'fence'>, error: MeasuringError): Promise<boolean> {
  const rows = await tx
    .update(measuringRuns)
    .set({
      state: 'failed',
      measurementId: null,
      errorCode: error.code,
      errorMessage: error.message,
      errorByte: error.at?.byte ?? null,
      errorLine: error.at?.line ?? null,
      finishedAt: sql`now()`,
    })
    .where(held(run))
    .returning({ id: measuringRuns.id });
  return rows.length > 0;
}
