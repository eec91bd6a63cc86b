import { z } from 'zod';
import { id, timestamp, vector3 } from './common';
import { measurement, measuringError, meshFormat } from './measurement';
import { setting } from './setting';

export const partName = z.string().trim().min(1, 'Give the part a name.').max(200, 'A name has at most 200 characters.');

/** How far the worker is with a file. `progress` runs from 0 to 1 within the whole run. */
export const measuringRun = z.object({
  state: z.enum(['queued', 'running', 'done', 'failed']),
  stage: z.enum(['waiting', 'reading', 'measuring', 'storing']),
  progress: z.number().min(0).max(1),
  error: measuringError.nullable(),
  finishedAt: timestamp.nullable(),
  /** From taking the file up to its figures being stored; null until then. */
  durationMs: z.number().nullable(),
});
export type MeasuringRun = z.infer<typeof measuringRun>;

/** A setting as it is stored: `version` counts its changes and must be sent back with a change. */
export const storedSetting = setting.extend({
  version: z.number().int().positive(),
  changedAt: timestamp,
  changedBy: z.string(),
});
export type StoredSetting = z.infer<typeof storedSetting>;

const revisionHead = z.object({
  id,
  /** A, B, C … in the order in which they came. */
  letter: z.string(),
  fileName: z.string(),
  sizeBytes: z.number().int().nonnegative(),
  createdAt: timestamp,
  createdBy: z.string(),
  run: measuringRun,
  setting: storedSetting,
});

/** One row of a project's list of parts. */
export const partRow = z.object({
  id,
  projectId: id,
  number: z.number().int().positive(),
  name: z.string(),
  revision: revisionHead,
  /** Null until the file is measured. */
  soundness: z
    .object({ defensible: z.boolean(), closed: z.boolean(), oriented: z.boolean(), turned: z.boolean() })
    .nullable(),
  /** Null where the unit is not stated or the file is not measured. */
  sizeM: vector3.nullable(),
  massKg: z.number().nullable(),
  principalMomentsKgM2: vector3.nullable(),
});
export type PartRow = z.infer<typeof partRow>;

export const part = z.object({
  id,
  projectId: id,
  projectName: z.string(),
  number: z.number().int().positive(),
  name: z.string(),
  revision: revisionHead.extend({
    sha256: z.string().nullable(),
    format: meshFormat.nullable(),
    measurement: measurement.nullable(),
  }),
  can: z.object({ edit: z.boolean() }),
});
export type Part = z.infer<typeof part>;

export const renamePartRequest = z.object({ name: partName });
export type RenamePartRequest = z.infer<typeof renamePartRequest>;

/** A change of some fields of a setting; `version` is the one that the change was made on. */
export const changeSettingRequest = setting.partial().extend({ version: z.number().int().positive() });
export type ChangeSettingRequest = z.infer<typeof changeSettingRequest>;
