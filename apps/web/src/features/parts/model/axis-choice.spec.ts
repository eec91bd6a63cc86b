import type { Axis } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { axisChoices, computeAxis, describeAxis, findChoice } from './axis-choice';

const statement: Parameters<typeof computeAxis>[2] = {
  boundingBoxM: { min: [0, 0, 0], max: [0.08, 0.04, 0.06] },
  centreOfMassM: [0.01, 0.02, 0.03],
  principalAxes: [
    [0, 1, 0],
    [1, 0, 0],
    [0, 0, -1],
  ],
};

describe('choice of an axis', () => {
  const before: Axis = { kind: 'principal', number: 1 };

  it('leads back to the same choice', () => {
    for (const { value } of axisChoices) expect(findChoice(computeAxis(value, before, statement))).toBe(value);
  });
  it('a typed axis begins where the one before it was', () => {
    expect(computeAxis('typed', before, statement)).toEqual({ kind: 'typed', pointM: [0.01, 0.02, 0.03], direction: [0, 1, 0] });
  });
  it('a typed axis begins without the noise of the integral behind its point', () => {
    const noisy = { ...statement, centreOfMassM: [0.0399999991059, 0.0200000000001, -1e-12] as [number, number, number] };
    expect(computeAxis('typed', { kind: 'mesh', along: 'z' }, noisy)).toMatchObject({ pointM: [0.04, 0.02, 0] });
  });
  it('is said with the point and the direction that place it', () => {
    const typed: Axis = { kind: 'typed', pointM: [0.0125, 0, -0.003], direction: [0, 0, 2] };
    expect(describeAxis(typed, { pointM: typed.pointM, direction: [0, 0, 1] })).toBe('through (12.5, 0, -3) mm, along (0, 0, 1) of the mesh frame');
    expect(describeAxis({ kind: 'mesh', along: 'x' }, { pointM: [0, 0, 0], direction: [1, 0, 0] })).toContain('along x of the mesh frame');
  });
  it('a typed axis of a part without figures begins at the origin, along z', () => {
    const none = { ...statement, centreOfMassM: null, principalAxes: null };
    expect(computeAxis('typed', before, none)).toEqual({ kind: 'typed', pointM: [0, 0, 0], direction: [0, 0, 1] });
  });
});
