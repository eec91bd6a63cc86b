import type { Vector3 } from '@masswright/contracts';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { computeAxisMoment, resolveAxis, type RigidBody } from './axis-moment';
import { checkPrincipalMoments } from './check-tensor';
import { findCombinedBody } from './combine-bodies';
import { computeEqualBody } from './equal-body';
import { expressBody, expressDirection, expressPoint, expressTensor, findFrame, meshFrame, restoreDirection, restorePoint, restoreTensor } from './frame';
import { computePrincipalAxes } from './principal-axes';
import { computeForm, computePointTensor, rotateTensor, shiftFromCentre, shiftToCentre } from './tensor';
import { anyMoments, anyNumber, anyRotation, anyVector, compareTensors, makeBall, makeBlock, makeDiagonal, makePoint } from './testing/bodies';
import { cross, dot, findDirection, getLength, scale, subtract } from './vector';

const anyBody: fc.Arbitrary<RigidBody> = fc
  .tuple(fc.double({ min: 0.1, max: 100, noNaN: true }), anyVector, anyMoments, anyRotation)
  .map(([massKg, centreOfMassM, moments, rotation]) => ({ massKg, centreOfMassM, inertiaAtCentreOfMassKgM2: rotateTensor(makeDiagonal(...moments), rotation) }));
const anyDirection = anyVector.map(findDirection).filter((direction) => direction !== undefined);

describe('the parallel-axis theorem', () => {
  it('a shift and its way back give the tensor again', () => {
    fc.assert(fc.property(anyBody, anyVector, ({ massKg, inertiaAtCentreOfMassKgM2 }, offset) => {
      const there = shiftFromCentre(inertiaAtCentreOfMassKgM2, massKg, offset);
      const size = Math.max(...Object.values(there).map(Math.abs));
      const back = shiftToCentre(there, massKg, offset);
      for (const key of ['xx', 'yy', 'zz', 'xy', 'yz', 'zx'] as const) expect(Math.abs(back[key] - inertiaAtCentreOfMassKgM2[key])).toBeLessThan(1e-15 * size);
    }));
  });
  it('the moment about an axis is that of the shifted tensor', () => {
    fc.assert(fc.property(anyBody, anyVector, anyDirection, (body, pointM, direction) => {
      const { inertiaKgM2, throughCentreKgM2, parallelAxisTermKgM2, distanceM, radiusOfGyrationM } = computeAxisMoment(body, { pointM, direction });
      const shifted = shiftFromCentre(body.inertiaAtCentreOfMassKgM2, body.massKg, subtract(body.centreOfMassM, pointM));
      expect(inertiaKgM2 / computeForm(shifted, direction, direction)).toBeCloseTo(1, 10);
      expect(inertiaKgM2).toBe(throughCentreKgM2 + parallelAxisTermKgM2);
      expect(body.massKg * distanceM ** 2).toBeCloseTo(parallelAxisTermKgM2, 8);
      expect(body.massKg * radiusOfGyrationM ** 2).toBeCloseTo(inertiaKgM2, 8);
    }));
  });
  it('sliding along the axis changes nothing, and the axis through the centre is the least of its parallels', () => {
    fc.assert(fc.property(anyBody, anyVector, anyDirection, anyNumber, (body, pointM, direction, along) => {
      const at = computeAxisMoment(body, { pointM, direction });
      const slid: Vector3 = [pointM[0] + along * direction[0], pointM[1] + along * direction[1], pointM[2] + along * direction[2]];
      expect(computeAxisMoment(body, { pointM: slid, direction }).inertiaKgM2 / at.inertiaKgM2).toBeCloseTo(1, 9);
      expect(at.inertiaKgM2).toBeGreaterThanOrEqual(computeAxisMoment(body, { pointM: body.centreOfMassM, direction }).inertiaKgM2);
    }));
  });
  it('a cone about its apex: m (3R²/20 + 3h²/5), from memory', () => {
    const [m, R, h] = [2, 0.05, 0.1];
    const cone: RigidBody = { massKg: m, centreOfMassM: [0, 0, h / 4], inertiaAtCentreOfMassKgM2: makeDiagonal(0.0015, 0.0015, 0.0015) };
    expect(m * ((3 * R * R) / 20 + (3 * h * h) / 80)).toBeCloseTo(0.0015, 15);
    expect(computeAxisMoment(cone, { pointM: [0, 0, h], direction: [1, 0, 0] })).toMatchObject({ inertiaKgM2: expect.closeTo(0.01275, 14) as number, distanceM: expect.closeTo(0.075, 15) as number });
  });
});

describe('which line an axis is', () => {
  const known = { centreOfMassM: [1, 2, 3] as Vector3, principalAxes: [[0, 0, 1], [1, 0, 0], [0, 1, 0]] as [Vector3, Vector3, Vector3] };
  it('mesh and principal axes run through the centre of mass', () => {
    expect(resolveAxis({ kind: 'mesh', along: 'y' }, known)).toEqual({ pointM: [1, 2, 3], direction: [0, 1, 0] });
    expect(resolveAxis({ kind: 'principal', number: 2 }, known)).toEqual({ pointM: [1, 2, 3], direction: [1, 0, 0] });
  });
  it('a typed axis is taken as it is, its direction made a unit vector', () => {
    expect(resolveAxis({ kind: 'typed', pointM: [9, 8, 7], direction: [0, 3, -4] }, known)).toEqual({ pointM: [9, 8, 7], direction: [0, 0.6, -0.8] });
    expect(resolveAxis({ kind: 'typed', pointM: [0, 0, 0], direction: [1e-300, 0, 0] }, known)?.direction).toEqual([1, 0, 0]);
    expect(resolveAxis({ kind: 'typed', pointM: [0, 0, 0], direction: [1e300, 1e300, 0] }, known)?.direction).toEqual([Math.SQRT1_2, Math.SQRT1_2, 0].map((c) => expect.closeTo(c, 15) as number));
  });
  it('there is none where what it needs is not known', () => {
    const unknown = { centreOfMassM: null, principalAxes: null };
    expect(resolveAxis({ kind: 'mesh', along: 'x' }, unknown)).toBeUndefined();
    expect(resolveAxis({ kind: 'principal', number: 1 }, { ...known, principalAxes: null })).toBeUndefined();
    expect(resolveAxis({ kind: 'typed', pointM: [0, 0, 0], direction: [0, 0, 0] }, known)).toBeUndefined();
    expect(resolveAxis({ kind: 'typed', pointM: [0, 0, 0], direction: [0, 0, 5] }, unknown)).toEqual({ pointM: [0, 0, 0], direction: [0, 0, 1] });
  });
});

describe('frames', () => {
  const anyFrame = fc.tuple(anyVector, anyVector, anyVector).map(([origin, x, y]) => findFrame(origin, x, y)).filter((frame) => frame !== undefined);

  it('points, directions and tensors go there and back', () => {
    fc.assert(fc.property(anyFrame, anyVector, anyBody, (frame, point, body) => {
      expect(getLength(subtract(restorePoint(expressPoint(point, frame), frame), point))).toBeLessThan(1e-13);
      expect(getLength(subtract(restoreDirection(expressDirection(point, frame), frame), point))).toBeLessThan(1e-13);
      expect(compareTensors(restoreTensor(expressTensor(body.inertiaAtCentreOfMassKgM2, frame), frame), body.inertiaAtCentreOfMassKgM2)).toBeLessThan(1e-14);
    }));
  });
  it('axes are orthonormal and right-handed, x along the first direction, y on the side of the second', () => {
    fc.assert(fc.property(anyVector, anyVector, anyVector, (origin, x, y) => {
      const frame = findFrame(origin, x, y);
      fc.pre(frame !== undefined);
      for (const [i, one] of frame.axes.entries()) for (const [j, two] of frame.axes.entries()) expect(Math.abs(dot(one, two) - (i === j ? 1 : 0))).toBeLessThan(1e-15);
      expect(dot(cross(frame.axes[0], frame.axes[1]), frame.axes[2])).toBeCloseTo(1, 14);
      expect(dot(frame.axes[0], x)).toBeCloseTo(getLength(x), 9);
      expect(dot(frame.axes[1], y)).toBeGreaterThan(0);
    }));
  });
  it('the moment about a line is the same in every frame', () => {
    fc.assert(fc.property(anyFrame, anyBody, anyVector, anyDirection, (frame, body, pointM, direction) => {
      const inFrame = computeAxisMoment(expressBody(body, frame), { pointM: expressPoint(pointM, frame), direction: expressDirection(direction, frame) });
      expect(inFrame.inertiaKgM2 / computeAxisMoment(body, { pointM, direction }).inertiaKgM2).toBeCloseTo(1, 9);
    }));
  });
  it('principal moments are the same in every frame', () => {
    fc.assert(fc.property(anyFrame, anyBody, (frame, { inertiaAtCentreOfMassKgM2 }) => {
      const [here, there] = [computePrincipalAxes(inertiaAtCentreOfMassKgM2).moments, computePrincipalAxes(expressTensor(inertiaAtCentreOfMassKgM2, frame)).moments];
      for (const k of [0, 1, 2] as const) expect(Math.abs(here[k] - there[k]) / here[2]).toBeLessThan(1e-14);
    }));
  });
  it('parallel directions and a direction of zero span no frame', () => {
    expect(findFrame([0, 0, 0], [1, 2, 3], [-2, -4, -6])).toBeUndefined();
    expect(findFrame([0, 0, 0], [0, 0, 0], [1, 0, 0])).toBeUndefined();
    expect(findFrame([0, 0, 0], [5, 0, 0], [1, 1, 0])).toEqual(meshFrame);
  });
});

describe('bodies taken together', () => {
  it('a block cut in eight is the block again', () => {
    const [m, size] = [16, [2, 4, 6] as Vector3];
    const pieces = [-1, 1].flatMap((i) => [-1, 1].flatMap((j) => [-1, 1].map((k) => makeBlock(m / 8, scale(size, 0.5), [10 + (i * size[0]) / 4, (j * size[1]) / 4, (k * size[2]) / 4]))));
    const whole = findCombinedBody(pieces);
    expect(whole?.massKg).toBe(m);
    expect(whole?.centreOfMassM).toEqual([10, 0, 0]);
    expect(compareTensors(whole?.inertiaAtCentreOfMassKgM2 ?? makeDiagonal(NaN, NaN, NaN), makeBlock(m, size, [10, 0, 0]).inertiaAtCentreOfMassKgM2)).toBeLessThan(1e-15);
  });
  it('a cut-out is a body of negative mass: a thick shell is a ball less a ball, 2/5 m (R⁵ - r⁵)/(R³ - r³)', () => {
    const [R, r] = [0.05, 0.03];
    const outer = makeBall(R ** 3, R, [1, 0, 0]);
    const inner = makeBall(-(r ** 3), r, [1, 0, 0]);
    const shell = findCombinedBody([outer, inner]);
    expect((shell?.inertiaAtCentreOfMassKgM2.xx ?? NaN) / (shell?.massKg ?? NaN)).toBeCloseTo((0.4 * (R ** 5 - r ** 5)) / (R ** 3 - r ** 3), 15);
  });
  it('nothing at all has no centre', () => {
    expect(findCombinedBody([])).toBeUndefined();
    expect(findCombinedBody([makePoint(1, [0, 0, 0]), makePoint(-1, [1, 0, 0])])).toBeUndefined();
  });
  it('the tensor of a point mass has -m x y off its diagonal', () => {
    expect(computePointTensor(2, [1, 3, 5])).toEqual({ xx: 68, yy: 52, zz: 20, xy: -6, yz: -30, zx: -10 });
  });
});

describe('whether a body can have a tensor', () => {
  it('every set of point masses can', () => {
    fc.assert(fc.property(fc.array(fc.tuple(fc.double({ min: 0.1, max: 10, noNaN: true }), anyVector), { minLength: 2, maxLength: 20 }), (points) => {
      const body = findCombinedBody(points.map(([mass, at]) => makePoint(mass, at)));
      fc.pre(body !== undefined);
      expect(checkPrincipalMoments(computePrincipalAxes(body.inertiaAtCentreOfMassKgM2).moments)).toEqual([]);
    }));
  });
  it('a moment larger than the other two together is refused with the inequality and by how much', () => {
    expect(checkPrincipalMoments([1, 2, 3.3])).toEqual([
      { inequality: 'I₁ + I₂ ≥ I₃', excessKgM2: expect.closeTo(0.3, 14) as number, share: expect.closeTo(1 / 11, 14) as number, message: 'The largest principal moment exceeds the sum of the other two by 0.3000 kg·m² (9.09 % of the largest moment): no body has such a tensor.' },
    ]);
  });
  it('a negative moment is refused, too', () => {
    const [negative, sum] = checkPrincipalMoments([-0.5, 2, 2]);
    expect(negative).toMatchObject({ inequality: 'I₁ ≥ 0', excessKgM2: 0.5, share: 0.25 });
    expect(sum).toMatchObject({ inequality: 'I₁ + I₂ ≥ I₃', excessKgM2: 0.5 });
  });
  it('a flat body and rounding are let pass; a strict caller may ask for more', () => {
    expect(checkPrincipalMoments([1, 2, 3])).toEqual([]);
    expect(checkPrincipalMoments([1, 2, 3 + 1e-9])).toEqual([]);
    expect(checkPrincipalMoments([1, 2, 3 + 1e-9], 0)).toHaveLength(1);
    expect(checkPrincipalMoments([-1e-12, 1, 1])).toEqual([]);
  });
});

describe('the equal body', () => {
  it('of an ellipsoid is the ellipsoid', () => {
    // .03/.04/.05 m, 2 kg: moments .00164/.00136/.0010 (from memory); ascending they belong to the axes c, b, a.
    expect(computeEqualBody([0.001, 0.00136, 0.00164], 2)).toEqual([0.05, 0.04, 0.03].map((semiAxis) => expect.closeTo(semiAxis, 14) as number));
  });
  it('of a flat body is flat, and rounding makes no negative root', () => {
    expect(computeEqualBody([1, 2, 3 + 1e-15], 1)[2]).toBeCloseTo(0, 6);
  });
});
