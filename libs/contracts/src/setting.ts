import { z } from 'zod';
import { lengthUnits } from '@masswright/units';

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

/** What turns a measurement into a statement. Null means: not stated yet, and no figure that needs it is given. */
export const setting = z.object({
  lengthUnit: lengthUnit.nullable(),
  densityKgM3: z.number().min(1e-6, 'A density is at least 0.000001 kg/m³.').max(1e6, 'A density is at most 1 000 000 kg/m³.').nullable(),
  axis,
  drive: drive.nullable(),
});
export type Setting = z.infer<typeof setting>;
