import type { IntegralChange, Symmetric3, Vector3 } from '@masswright/contracts';
import { convertToMetres, type LengthUnit } from '@masswright/units';
import { mapSymmetric, mapVector } from '../body-vectors';
import { subtract } from '../vector';

/**
 * A change of a body: of ∫1, ∫x…, ∫x²…, ∫xy… over its volume about a stated point, of its area, and of its density; in SI. As a standard uncertainty it is
 * what one source does to all of them together, with its signs.
 */
export interface BodyChange {
  content: number;
  first: Vector3;
  second: Symmetric3;
  /** Null where what changes the body does something to its area that can't be told. */
  area: number | null;
  densityKgM3: number;
}

export const noChange: BodyChange = { content: 0, first: [0, 0, 0], second: { xx: 0, yy: 0, zz: 0, xy: 0, yz: 0, zx: 0 }, area: 0, densityKgM3: 0 };

/** A change that a measurement states, in the mesh's unit. */
export function convertChange({ content, first, second }: IntegralChange, area: number | null, unit: LengthUnit): BodyChange {
  return {
    content: convertToMetres(content, unit, 3),
    first: mapVector(first, (element) => convertToMetres(element, unit, 4)),
    second: mapSymmetric(second, (element) => convertToMetres(element, unit, 5)),
    area: area === null ? null : convertToMetres(area, unit, 2),
    densityKgM3: 0,
  };
}

export function scaleChange({ content, first, second, area, densityKgM3 }: BodyChange, factor: number): BodyChange {
  return {
    content: content * factor,
    first: mapVector(first, (element) => element * factor),
    second: mapSymmetric(second, (element) => element * factor),
    area: area === null ? null : area * factor,
    densityKgM3: densityKgM3 * factor,
  };
}

/** The same change with its integrals about another point. */
export function moveChange(change: BodyChange, from: Vector3, to: Vector3): BodyChange {
  const d = subtract(from, to);
  const { content, first, second } = change;
  const pair = (i: 0 | 1 | 2, j: 0 | 1 | 2): number => first[i] * d[j] + d[i] * first[j] + content * d[i] * d[j];
  return {
    ...change,
    first: [first[0] + content * d[0], first[1] + content * d[1], first[2] + content * d[2]],
    second: { xx: second.xx + pair(0, 0), yy: second.yy + pair(1, 1), zz: second.zz + pair(2, 2), xy: second.xy + pair(0, 1), yz: second.yz + pair(1, 2), zx: second.zx + pair(2, 0) },
  };
}

/**
 * Changes of which only bounds are known: one of the content, one along each axis, one of each second moment, taken as independent of each other.
 */
export function boundChanges(content: number, first: Vector3, second: Symmetric3, area = 0): BodyChange[] {
  const alone = (change: Partial<BodyChange>): BodyChange => ({ ...noChange, ...change });
  const seconds = (['xx', 'yy', 'zz', 'xy', 'yz', 'zx'] as const).map((key) => alone({ second: { ...noChange.second, [key]: second[key] } }));
  return [alone({ content, area }), alone({ first: [first[0], 0, 0] }), alone({ first: [0, first[1], 0] }), alone({ first: [0, 0, first[2]] }), ...seconds];
}
