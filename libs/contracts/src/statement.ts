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

/**
 * A number for each figure of a record, under the figure's own key and in its unit: how much it changes, or how much of a change is whose. Null where the record has no
 * such figure; the area's is also null where what changes it can't be told.
 */
export const figureChanges = z.object({
  volumeM3: z.number(),
  areaM2: z.number().nullable(),
  massKg: z.number().nullable(),
  centreOfMassM: vector3,
  inertiaAtCentreOfMassKgM2: symmetric3.nullable(),
  principalMomentsKgM2: vector3.nullable(),
  radiiOfGyrationM: vector3.nullable(),
  aboutAxis: z.object({ inertiaKgM2: z.number(), radiusOfGyrationM: z.number() }).nullable(),
});
export type FigureChanges = z.infer<typeof figureChanges>;

/**
 * What the doubt of a figure is made of.
 * density: the stated spread. weighing: the scale's uncertainty, where a weighing sets the density. facets: what the prediction of the curved surfaces leaves open.
 * as-made: the stated tolerance. gap: volume that hairline openings may have lost. polygons: how polygons that are not flat were cut.
 * file-rounding: the digits of the file's coordinates. arithmetic: our own rounding.
 */
export const uncertaintyTermName = z.enum(['density', 'weighing', 'facets', 'as-made', 'gap', 'polygons', 'file-rounding', 'arithmetic']);
export type UncertaintyTermName = z.infer<typeof uncertaintyTermName>;

/** Expanded uncertainties, k = 2, and the terms that they are made of, the largest in mass first: of each figure the term's share of the sum of squares, from 0 to 1. */
export const uncertainty = figureChanges.extend({
  k: z.literal(2),
  terms: z.array(z.object({ name: uncertaintyTermName, shares: figureChanges })),
});
export type Uncertainty = z.infer<typeof uncertainty>;

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
  /**
   * What the smooth body behind the facets is predicted to have more than the mesh, in each figure; never part of the figures themselves. A figure x with the correction b
   * and the uncertainty U lies from x + min(0, b) - U to x + max(0, b) + U. Null where there are no figures, or the facets were not examined.
   */
  correction: figureChanges.nullable(),
  /** Null where there are no figures. */
  uncertainty: uncertainty.nullable(),
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
