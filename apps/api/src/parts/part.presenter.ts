import { measuringErrorCodes, type FailedRecord, type Measurement, type MeasuringError, type MeasuringRun, type Part, type PartRow, type StatementRecord } from '@masswright/contracts';
import { presentMeasurement, readSetting, readStoredSetting, readSummarySource, type listRevisions, type listSameBytes, type StoredPart } from '@masswright/drizzle';
import { computeStatement, summarisePart } from '@masswright/mechanics';
import type { Actor } from '../platform/work';
import { mayEdit } from '../projects/project.policy';

/** 1 is A, 26 is Z, 27 is AA. */
export function revisionLetter(ordinal: number): string {
  let letters = '';
  for (let rest = ordinal; rest > 0; rest = Math.floor((rest - 1) / 26)) {
    letters = String.fromCharCode(65 + ((rest - 1) % 26)) + letters;
  }
  return letters;
}

function presentError(run: StoredPart['run']): MeasuringError | null {
  const code = measuringErrorCodes.find((known) => known === run.errorCode);
  if (run.state !== 'failed' || code === undefined) return null;
  const at = { ...(run.errorByte === null ? {} : { byte: run.errorByte }), ...(run.errorLine === null ? {} : { line: run.errorLine }) };
  return { code, message: run.errorMessage ?? '', at: Object.keys(at).length === 0 ? null : at };
}

function presentRun(run: StoredPart['run']): MeasuringRun {
  const durationMs = run.startedAt === null || run.finishedAt === null ? null : Math.max(0, run.finishedAt.getTime() - run.startedAt.getTime());
  return {
    state: run.state,
    stage: run.stage,
    progress: run.progress,
    error: presentError(run),
    finishedAt: run.finishedAt?.toISOString() ?? null,
    durationMs,
  };
}

function presentRevisionHead(stored: StoredPart): PartRow['revision'] {
  return {
    id: stored.revision.id,
    letter: revisionLetter(stored.revision.ordinal),
    fileName: stored.upload.fileName,
    folder: stored.upload.folder,
    sizeBytes: stored.upload.sizeBytes,
    reason: stored.revision.reason,
    createdAt: stored.revision.createdAt.toISOString(),
    createdBy: stored.createdByName,
    run: presentRun(stored.run),
    setting: readStoredSetting(stored),
  };
}

function computeRecord(stored: StoredPart): StatementRecord | undefined {
  const { sha256 } = stored.upload;
  if (stored.measurement === null || sha256 === null) return undefined;
  return computeStatement(presentMeasurement(stored.measurement), readSetting(stored.setting), {
    file: stored.upload.fileName,
    sha256: sha256.toString('hex'),
  });
}

/** @param sameBytes by SHA-256: how many revisions have those bytes (`countSameBytes`) */
export function presentPartRow(stored: StoredPart, sameBytes: ReadonlyMap<string, number>): PartRow {
  const { measurement, part, upload } = stored;
  const { state, figures, unitDoubt } = summarisePart(readSummarySource(stored));
  const withTheseBytes = upload.sha256 === null ? 0 : (sameBytes.get(upload.sha256.toString('hex')) ?? 0);
  return {
    id: part.id,
    projectId: part.projectId,
    number: part.number,
    name: part.name,
    state,
    deletedAt: part.deletedAt?.toISOString() ?? null,
    revision: presentRevisionHead(stored),
    soundness:
      measurement === null
        ? null
        : {
            defensible: measurement.defensible,
            closed: measurement.closed,
            oriented: measurement.oriented,
            turned: measurement.turned,
            selfIntersections: measurement.selfIntersections,
            overlapping: measurement.findings.some(({ kind }) => kind === 'overlapping-shells'),
            examined: measurement.examined,
          },
    sizeM: figures.sizeM,
    volumeM3: figures.volumeM3,
    massKg: figures.massKg,
    balance: figures.balance,
    principalMomentsKgM2: figures.principalMomentsKgM2,
    unitDoubt,
    // A deleted part's own revision is not among those that are counted.
    sameBytes: Math.max(0, withTheseBytes - (part.deletedAt === null ? 1 : 0)),
  };
}

export interface PartSurroundings {
  revisions: Awaited<ReturnType<typeof listRevisions>>;
  sameBytes: Awaited<ReturnType<typeof listSameBytes>>;
  measuredBefore: Measurement | undefined;
  actor: Pick<Actor, 'role'>;
}

export function presentPart(stored: StoredPart, { revisions, sameBytes, measuredBefore, actor }: PartSurroundings): Part {
  const { measurement, part, upload } = stored;
  const { state, unitDoubt } = summarisePart(readSummarySource(stored));
  return {
    id: part.id,
    projectId: part.projectId,
    projectName: part.projectName,
    number: part.number,
    name: part.name,
    state,
    deletedAt: part.deletedAt?.toISOString() ?? null,
    revision: {
      ...presentRevisionHead(stored),
      sha256: upload.sha256?.toString('hex') ?? null,
      format: measurement?.format ?? null,
      compression: measurement?.compression ?? null,
      measurement: measurement === null ? null : presentMeasurement(measurement),
      measuredBefore: measuredBefore ?? null,
    },
    revisions: revisions.map(({ id, ordinal, fileName, reason, createdAt, createdByName }) => ({
      id,
      letter: revisionLetter(ordinal),
      fileName,
      reason,
      createdAt: createdAt.toISOString(),
      createdBy: createdByName,
    })),
    unitDoubt,
    sameBytes: sameBytes.map(({ projectId, projectName, partId, number, name, ordinal }) => ({ projectId, projectName, partId, number, name, letter: revisionLetter(ordinal) })),
    can: { edit: mayEdit(actor) && part.deletedAt === null },
  };
}

/** The record of a part, or why its file has none; undefined while the file is not measured or its unit not stated. */
export function presentStatement(stored: StoredPart): StatementRecord | FailedRecord | undefined {
  const error = presentError(stored.run);
  return error === null ? computeRecord(stored) : { file: stored.upload.fileName, error };
}
