import {
  axis,
  measuringErrorCodes,
  type FailedRecord,
  type MeasuringError,
  type MeasuringRun,
  type Part,
  type PartRow,
  type Setting,
  type StatementRecord,
  type StoredSetting,
} from '@masswright/contracts';
import { presentMeasurement, type StoredPart } from '@masswright/drizzle';
import { computeStatement } from '@masswright/mechanics';
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

export function readSetting(row: StoredPart['setting']): Setting {
  const { driveSpeedRadPerS: speedRadPerS, driveTimeS: timeS } = row;
  return {
    lengthUnit: row.lengthUnit,
    densityKgM3: row.densityKgM3,
    axis: axis.parse(row.axis),
    drive: speedRadPerS === null || timeS === null ? null : { speedRadPerS, timeS },
  };
}

function presentSetting(stored: StoredPart): StoredSetting {
  return {
    ...readSetting(stored.setting),
    version: stored.setting.version,
    changedAt: stored.setting.changedAt.toISOString(),
    changedBy: stored.settingChangedByName,
  };
}

function presentRevisionHead(stored: StoredPart): PartRow['revision'] {
  return {
    id: stored.revision.id,
    letter: revisionLetter(stored.revision.ordinal),
    fileName: stored.upload.fileName,
    sizeBytes: stored.upload.sizeBytes,
    createdAt: stored.revision.createdAt.toISOString(),
    createdBy: stored.createdByName,
    run: presentRun(stored.run),
    setting: presentSetting(stored),
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

export function presentPartRow(stored: StoredPart): PartRow {
  const { measurement } = stored;
  const record = computeRecord(stored);
  const box = record?.boundingBoxM;
  return {
    id: stored.part.id,
    projectId: stored.part.projectId,
    number: stored.part.number,
    name: stored.part.name,
    revision: presentRevisionHead(stored),
    soundness:
      measurement === null
        ? null
        : { defensible: measurement.defensible, closed: measurement.closed, oriented: measurement.oriented, turned: measurement.turned },
    sizeM: box === undefined ? null : [box.max[0] - box.min[0], box.max[1] - box.min[1], box.max[2] - box.min[2]],
    massKg: record?.massKg ?? null,
    principalMomentsKgM2: record?.principalMomentsKgM2 ?? null,
  };
}

export function presentPart(stored: StoredPart, actor: Pick<Actor, 'role'>): Part {
  const { measurement, upload } = stored;
  return {
    id: stored.part.id,
    projectId: stored.part.projectId,
    projectName: stored.part.projectName,
    number: stored.part.number,
    name: stored.part.name,
    revision: {
      ...presentRevisionHead(stored),
      sha256: upload.sha256?.toString('hex') ?? null,
      format: measurement?.format ?? null,
      measurement: measurement === null ? null : presentMeasurement(measurement),
    },
    can: { edit: mayEdit(actor) },
  };
}

/** The record of a part, or why there is none; undefined while the file is not measured or its unit not stated. */
export function presentStatement(stored: StoredPart): StatementRecord | FailedRecord | undefined {
  const error = presentError(stored.run);
  return error === null ? computeRecord(stored) : { file: stored.upload.fileName, error };
}
