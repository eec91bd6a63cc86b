import { z } from 'zod';
import { lengthUnits } from '@masswright/units';
import { keptText } from './common';

export const lengthUnit = z.enum(lengthUnits);

const notZero = (direction: readonly number[]): boolean => direction.some((element) => Math.abs(element) >= 1e-9);
/** Beyond these, products of what people type leave the range of numbers; no part is so large or so quick. */
const coordinateM = z.number().min(-1e6, 'A coordinate lies within a million metres.').max(1e6, 'A coordinate lies within a million metres.');
const element = z.number().min(-1e9).max(1e9);

/**
 * About which axis the moment is asked for. mesh: through the centre of mass along x, y or z of the mesh frame.
 * principal: principal axis 1, 2 or 3, through the centre of mass. typed: through `pointM` (metres, mesh frame) along `direction` (any length but 0).
 */
export const axis = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('mesh'), along: z.enum(['x', 'y', 'z']) }),
  z.object({ kind: z.literal('principal'), number: z.union([z.literal(1), z.literal(2), z.literal(3)]) }),
  z.object({
    kind: z.literal('typed'),
    pointM: z.tuple([coordinateM, coordinateM, coordinateM]),
    direction: z.tuple([element, element, element]).refine(notZero, 'A direction needs at least one element other than 0.'),
  }),
]);
export type Axis = z.infer<typeof axis>;

/** How fast the part is to turn and in what time, for the torque and the stored energy. */
export const drive = z.object({
  speedRadPerS: z.number().min(-1e6).max(1e6),
  timeS: z.number().min(1e-6, 'A time is at least a microsecond.').max(1e9),
});
export type Drive = z.infer<typeof drive>;

export const densityKgM3 = z.number().min(1e-6, 'A density is at least 0.000001 kg/m³.').max(1e6, 'A density is at most 1 000 000 kg/m³.');
/** Half the width of the interval within which a density lies, every value in it as likely as any other. */
export const densitySpreadKgM3 = z.number().min(0, 'A spread is not negative.').max(1e6, 'A spread is at most 1 000 000 kg/m³.');

/** The library's name of a material as it was when the setting was made. */
export const namedMaterial = z.object({ id: keptText().min(1).max(80), name: z.string() });
export type NamedMaterial = z.infer<typeof namedMaterial>;

/** A part on the scale: its mass, and the expanded uncertainty of that (k = 2). */
export const weighing = z.object({
  massKg: z.number().min(1e-12, 'A mass is greater than 0.').max(1e9, 'A mass is at most 1 000 000 000 kg.'),
  uncertaintyKg: z.number().min(0, 'An uncertainty is not negative.').max(1e9),
});
export type Weighing = z.infer<typeof weighing>;

/**
 * How far the part as made may differ from the part as drawn, every value up to that as likely as any other.
 * scale: all lengths longer or shorter by this share of themselves, about the centroid (shrinkage). offset: the surface further out or in by this length along
 * its normal (machining, coating, layers of a print).
 */
export const asMade = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('scale'), spread: z.number().min(0, 'A spread is not negative.').max(0.5, 'A spread of scale is at most 50 %.') }),
  z.object({ kind: z.literal('offset'), spreadM: z.number().min(0, 'A spread is not negative.').max(1, 'An offset is at most a metre.') }),
]);
export type AsMade = z.infer<typeof asMade>;

/** A shell, by its place in the measurement's list, with a density of its own; left out where that is null. */
export const shellDensity = z.object({ shell: z.number().int().nonnegative().max(199), densityKgM3: densityKgM3.nullable() });
export type ShellDensity = z.infer<typeof shellDensity>;

/**
 * What turns a measurement into a statement. Null means: not stated yet, and no figure that needs it is given.
 * `densityKgM3` is the one that was typed, or the named material's at the time when it was chosen; a weighing may set another
 * (`resolveDensity` of mechanics), and never outlives its revision.
 */
export const setting = z.object({
  lengthUnit: lengthUnit.nullable(),
  densityKgM3: densityKgM3.nullable(),
  densitySpreadKgM3: densitySpreadKgM3.nullable(),
  material: namedMaterial.nullable(),
  weighing: weighing.nullable(),
  axis,
  drive: drive.nullable(),
  /** Null, or left out as in what was stored before there was one: nothing is said of how the part is made. */
  asMade: asMade.nullable().optional(),
  /** Shells that are not of the part's density. Left out, as in what was stored before there were any: none. */
  shellDensities: z.array(shellDensity).max(200).optional(),
});
export type Setting = z.infer<typeof setting>;

/**
 * A density as a person gives it: typed, or by the name of a material, whose density is then taken from the library of this moment
 * unless one is given with it (what an undo puts back keeps the density that it was made with). Typing a density alone takes the name away.
 */
export const densityChoice = z.object({
  densityKgM3: densityKgM3.nullable().optional(),
  densitySpreadKgM3: densitySpreadKgM3.nullable().optional(),
  material: namedMaterial.pick({ id: true }).nullable().optional(),
});
export type DensityChoice = z.infer<typeof densityChoice>;

/** Some fields of a setting to be changed; what is left out stays as it is. */
export const settingChange = densityChoice.extend({
  lengthUnit: lengthUnit.nullable().optional(),
  weighing: weighing.nullable().optional(),
  axis: axis.optional(),
  drive: drive.nullable().optional(),
  asMade: asMade.nullable().optional(),
  /** All shells that are not of the part's density: those that are left out of the list get it back. */
  shellDensities: z.array(shellDensity).max(200).optional(),
});
export type SettingChange = z.infer<typeof settingChange>;
