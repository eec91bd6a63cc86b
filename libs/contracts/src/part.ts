import { z } from 'zod';
import { id, keptText, timestamp, vector3 } from './common';
import { lengthUnit, setting, settingChange } from './setting';
import { meshCompression, measurement, measuringError, meshFormat } from './measurement';

export const partName = keptText().trim().min(1, 'Give the part a name.').max(200, 'A name has at most 200 characters.');
export const revisionReason = keptText().trim().max(500, 'A reason has at most 500 characters.');

/** How far the worker is with a file. `progress` runs from 0 to 1 within the whole run. hashing: finding out whether its bytes were measured before. */
export const measuringRun = z.object({
  state: z.enum(['queued', 'running', 'done', 'failed']),
  stage: z.enum(['waiting', 'hashing', 'reading', 'measuring', 'examining', 'storing']),
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
  /** When and by whom the unit was stated for this very file; null where it is not stated or was taken over from the revision before. */
  unitStated: z.object({ at: timestamp, by: z.string() }).nullable(),
});
export type StoredSetting = z.infer<typeof storedSetting>;

/**
 * How a weighed mass stands to the named material. agrees: it sets the density. unchecked: it sets the density, but no material is named that it
 * could be held against. disagrees: the part is not a uniform body of that material, and the tensor can't be scaled from the weight.
 */
export const weighingVerdict = z.enum(['agrees', 'unchecked', 'disagrees']);

/**
 * What a part wants next; the first that holds, in this order. measuring: queued or running. failed: its file can't be measured.
 * not-defensible: no inside. unit-missing, density-missing: not stated. unit-doubt: taken over from the revision before, to whose volume it does not fit.
 * weight-disagrees: the weighed mass contradicts the material. ready: nothing.
 */
export const partStates = ['measuring', 'failed', 'not-defensible', 'unit-missing', 'unit-doubt', 'density-missing', 'weight-disagrees', 'ready'] as const;
export const partState = z.enum(partStates);
export type PartState = z.infer<typeof partState>;

/** The volumes of two revisions stand as the cubes of two units do. */
export const unitDoubt = z.object({
  /** The unit that brings the two volumes together; null where none of the six does. */
  lengthUnit: lengthUnit.nullable(),
  /** Volume of this revision over that of the one before, each in the unit that is stated for it. */
  volumeRatio: z.number(),
});
export type UnitDoubt = z.infer<typeof unitDoubt>;

const revisionHead = z.object({
  id,
  /** A, B, C … in the order in which they came. */
  letter: z.string(),
  fileName: z.string(),
  /** Where in the dropped folder the file lay; '' at its top. */
  folder: z.string(),
  sizeBytes: z.number().int().nonnegative(),
  /** Why there is a new revision; '' for the first. */
  reason: z.string(),
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
  state: partState,
  deletedAt: timestamp.nullable(),
  revision: revisionHead,
  /** Null until the file is measured. */
  soundness: z
    .object({
      defensible: z.boolean(),
      closed: z.boolean().nullable(),
      oriented: z.boolean(),
      turned: z.boolean(),
      selfIntersections: z.number().int().nonnegative().nullable(),
      /** Some of the shells pass through each other, or add to a body that they lie within. */
      overlapping: z.boolean(),
      examined: measurement.shape.examined,
    })
    .nullable(),
  /** Null where the unit is not stated or the file is not measured. */
  sizeM: vector3.nullable(),
  volumeM3: z.number().nullable(),
  massKg: z.number().nullable(),
  /** Where the centre of mass lies in the bounding box along x, y, z: 0 at its least, 1 at its greatest coordinate. */
  balance: vector3.nullable(),
  principalMomentsKgM2: vector3.nullable(),
  unitDoubt: unitDoubt.nullable(),
  /** How many other revisions of the organisation have the same bytes. */
  sameBytes: z.number().int().nonnegative(),
});
export type PartRow = z.infer<typeof partRow>;

export const part = z.object({
  id,
  projectId: id,
  projectName: z.string(),
  number: z.number().int().positive(),
  name: z.string(),
  state: partState,
  deletedAt: timestamp.nullable(),
  revision: revisionHead.extend({
    sha256: z.string().nullable(),
    format: meshFormat.nullable(),
    compression: meshCompression.nullable(),
    measurement: measurement.nullable(),
    /** What an earlier measuring version found in the same bytes, where there is that: the latest of them. Its differences to `measurement` are those of the versions. */
    measuredBefore: measurement.nullable(),
  }),
  /** All revisions, the latest first. */
  revisions: z.array(revisionHead.pick({ id: true, letter: true, fileName: true, reason: true, createdAt: true, createdBy: true })),
  unitDoubt: unitDoubt.nullable(),
  /** Where else the same bytes are in the organisation, at most 20. */
  sameBytes: z.array(z.object({ projectId: id, projectName: z.string(), partId: id, number: z.number().int(), name: z.string(), letter: z.string() })),
  can: z.object({ edit: z.boolean() }),
});
export type Part = z.infer<typeof part>;

export const renamePartRequest = z.object({ name: partName });
export type RenamePartRequest = z.infer<typeof renamePartRequest>;

/** A change of some fields of a setting; `version` is the one that the change was made on. */
export const changeSettingRequest = settingChange.extend({ version: z.number().int().positive() });
export type ChangeSettingRequest = z.infer<typeof changeSettingRequest>;
