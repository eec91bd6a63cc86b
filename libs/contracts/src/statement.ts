import { z } from 'zod';
import { weighingVerdict } from './part';
import { lengthUnit } from './setting';
import { symmetric3, vector3 } from './common';
import { meshFormat, measuringError, measuringErrorCodes, soundness } from './measurement';

/** Elements of the inertia matrix: off-diagonals are -∫xy dm, said in the record itself. */
export const inertiaTensor = symmetric3.extend({ offDiagonals: z.literal('-∫xy dm') });
export type InertiaTensor = z.infer<typeof inertiaTensor>;

/** distinct: three axes. disc-like: I₁=I₂<I₃, axis 3 alone is unique. rod-like: I₁<I₂=I₃, axis 1 alone is unique. ball: none is. */
export const axesKind = z.enum(['distinct', 'disc-like', 'rod-like', 'ball']);
export type AxesKind = z.infer<typeof axesKind>;

/** The record of a statement: the same keys in the api, in exports and on the command line. SI throughout. */
export const statementRecord = z.object({
  schema: z.literal('masswright.statement/1'),
  file: z.string(),
  sha256: z.string(),
  format: meshFormat,
  lengthUnit,
  facets: z.number().int(),
  measuringVersion: z.string(),
  soundness,
  /** The named material's name; null where the density was typed or is not stated. */
  material: z.string().nullable(),
  densityKgM3: z.number().nullable(),
  /** A weighed mass, the density that it implies of a uniform body, and how that stands to the material. */
  weighing: z.object({ massKg: z.number(), uncertaintyKg: z.number(), impliedDensityKgM3: z.number(), verdict: weighingVerdict }).nullable(),
  volumeM3: z.number().nullable(),
  areaM2: z.number(),
  massKg: z.number().nullable(),
  boundingBoxM: z.object({ min: vector3, max: vector3 }),
  frame: z.literal('mesh'),
  centreOfMassM: vector3.nullable(),
  inertiaAtCentreOfMassKgM2: inertiaTensor.nullable(),
  principalMomentsKgM2: vector3.nullable(),
  principalAxes: z.tuple([vector3, vector3, vector3]).nullable(),
  axes: axesKind.nullable(),
  radiiOfGyrationM: vector3.nullable(),
  aboutAxis: z
    .object({ pointM: vector3, direction: vector3, inertiaKgM2: z.number(), radiusOfGyrationM: z.number() })
    .nullable(),
});
export type StatementRecord = z.infer<typeof statementRecord>;

/** What stands in the record's place for a file that could not be measured. */
export const failedRecord = z.object({
  file: z.string(),
  error: measuringError.extend({ code: z.enum([...measuringErrorCodes, 'not-measured-yet', 'unit-not-stated']) }),
});
export type FailedRecord = z.infer<typeof failedRecord>;

/** Of which part a record in an export is. */
const exportedPart = z.object({ number: z.number().int().positive(), name: z.string(), revision: z.string() });
/** An item of an export: the record with its own keys, or what stands in its place, and beside them one key more that says whose it is. */
export const exportedRecord = z.union([statementRecord.extend({ part: exportedPart }), failedRecord.extend({ part: exportedPart })]);
export type ExportedRecord = z.infer<typeof exportedRecord>;
