import type { Axis, StatementRecord, Vector3 } from '@masswright/contracts';
import { resolveAxis, type Line } from '@masswright/mechanics';
import type { Choice } from '../../../components/choice-bar';

export type AxisChoice = 'x' | 'y' | 'z' | '1' | '2' | '3' | 'typed';

export const axisChoices: readonly Choice<AxisChoice>[] = [
  { value: 'x', label: 'X', spoken: 'Mesh axis X' },
  { value: 'y', label: 'Y', spoken: 'Mesh axis Y' },
  { value: 'z', label: 'Z', spoken: 'Mesh axis Z' },
  { value: '1', label: '1', spoken: 'Principal axis 1' },
  { value: '2', label: '2', spoken: 'Principal axis 2' },
  { value: '3', label: '3', spoken: 'Principal axis 3' },
  { value: 'typed', label: 'Typed' },
];

export function findChoice(axis: Axis): AxisChoice {
  switch (axis.kind) {
    case 'mesh':
      return axis.along;
    case 'principal':
      return (['1', '2', '3'] as const)[axis.number - 1] ?? '1';
    case 'typed':
      return 'typed';
  }
}

/** To a millionth of the body, in decimal millimetres: the digits behind are the noise of the integral, and would stand in fields. */
function roundPoint(pointM: Vector3, { min, max }: StatementRecord['boundingBoxM']): Vector3 {
  const sizeMm = Math.max(...max.map((end, index) => end - (min[index] ?? 0))) * 1000;
  const decimals = sizeMm > 0 ? Math.min(20, Math.max(0, 5 - Math.floor(Math.log10(sizeMm)))) : 20;
  // Adding 0 takes the sign off a zero.
  const round = (element: number): number => Number((element * 1000).toFixed(decimals)) / 1000 + 0;
  return [round(pointM[0]), round(pointM[1]), round(pointM[2])];
}

/** The axis that a choice means by itself; undefined for a typed one, which needs a place and a direction. */
export function computeSimpleAxis(choice: AxisChoice): Axis | undefined {
  switch (choice) {
    case 'x':
    case 'y':
    case 'z':
      return { kind: 'mesh', along: choice };
    case '1':
      return { kind: 'principal', number: 1 };
    case '2':
      return { kind: 'principal', number: 2 };
    case '3':
      return { kind: 'principal', number: 3 };
    case 'typed':
      return undefined;
  }
}

/** The axis that a choice means. A typed one begins as the axis that was shown before, so that nothing jumps. */
export function computeAxis(choice: AxisChoice, before: Axis, statement: Pick<StatementRecord, 'boundingBoxM' | 'centreOfMassM' | 'principalAxes'>): Axis {
  const simple = computeSimpleAxis(choice);
  if (simple) return simple;
  const line = resolveAxis(before, statement);
  return { kind: 'typed', pointM: line ? roundPoint(line.pointM, statement.boundingBoxM) : [0, 0, 0], direction: line?.direction ?? [0, 0, 1] };
}

const writeTriple = (vector: readonly number[], decimals: number): string => `(${vector.map((element) => Number(element.toFixed(decimals))).join(', ')})`;

/** An axis in words, with what places it: every moment needs it beside it. */
export function describeAxis(axis: Axis, line: Line): string {
  const direction = writeTriple(line.direction, 5);
  switch (axis.kind) {
    case 'mesh':
      return `through the centre of mass, along ${axis.along} of the mesh frame`;
    case 'principal':
      return `principal axis ${axis.number}, through the centre of mass, along ${direction} of the mesh frame`;
    case 'typed':
      return `through ${writeTriple(line.pointM.map((element) => element * 1000), 4)} mm, along ${direction} of the mesh frame`;
  }
}
