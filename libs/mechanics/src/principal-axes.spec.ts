import type { Vector3 } from '@masswright/contracts';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { classifyAxes, computePrincipalAxes } from './principal-axes';
import { multiplyTensor, rotateTensor, scaleTensor, type Tensor } from './tensor';
import { anyMoments, anyNumber, anyRotation, makeDiagonal } from './testing/bodies';
import { cross, dot } from './vector';

/** Some tensors that are hard: any, nearly diagonal, with moments that are equal or all but equal, of all sizes. */
const anyTensor: fc.Arbitrary<Tensor> = fc.oneof(
  fc.record({ xx: anyNumber, yy: anyNumber, zz: anyNumber, xy: anyNumber, yz: anyNumber, zx: anyNumber }),
  fc.tuple(anyMoments, anyRotation).map(([moments, rotation]) => rotateTensor(makeDiagonal(...moments), rotation)),
  fc.tuple(fc.double({ min: 0, max: 1e-6, noNaN: true }), fc.integer({ min: 0, max: 12 }), anyRotation).map(([gap, power, rotation]) => rotateTensor(makeDiagonal(1, 1 + gap * 10 ** -power, 1.5), rotation)),
  fc.tuple(anyNumber, fc.integer({ min: -300, max: -1 })).map(([off, power]) => ({ xx: 1, yy: 1, zz: 2, xy: off * 10 ** power, yz: off * 10 ** power, zx: 0 })),
  fc.tuple(anyMoments, anyRotation, fc.integer({ min: -250, max: 250 })).map(([moments, rotation, power]) => scaleTensor(rotateTensor(makeDiagonal(...moments), rotation), 10 ** power)),
);

const largestOf = (tensor: Tensor): number => Math.max(...Object.values(tensor).map(Math.abs));

describe('principal moments and axes', () => {
  it('I u = λ u for every axis, to a few units in the last place of the largest element', () => {
    fc.assert(
      fc.property(anyTensor, (tensor) => {
        const { moments, axes } = computePrincipalAxes(tensor);
        for (const [k, axis] of axes.entries()) {
          const residual = multiplyTensor(tensor, axis).map((element, i) => element - (moments[k] ?? NaN) * (axis[i] ?? NaN));
          expect(Math.max(...residual.map(Math.abs))).toBeLessThanOrEqual(3e-15 * largestOf(tensor));
        }
      }),
      { numRuns: 3000 },
    );
  });

  it('moments ascend, their sum is the trace, axes are orthonormal and right-handed', () => {
    fc.assert(
      fc.property(anyTensor, (tensor) => {
        const { moments, axes } = computePrincipalAxes(tensor);
        expect(moments[0] <= moments[1] && moments[1] <= moments[2]).toBe(true);
        expect(Math.abs(moments[0] + moments[1] + moments[2] - tensor.xx - tensor.yy - tensor.zz)).toBeLessThanOrEqual(4e-15 * largestOf(tensor));
        for (const [i, one] of axes.entries()) for (const [j, two] of axes.entries()) expect(Math.abs(dot(one, two) - (i === j ? 1 : 0))).toBeLessThan(2e-15);
        expect(dot(cross(axes[0], axes[1]), axes[2])).toBeCloseTo(1, 14);
      }),
      { numRuns: 1000 },
    );
  });

  it('the largest component of axes 1 and 2 is positive, and the first of equally large ones', () => {
    fc.assert(
      fc.property(anyTensor, (tensor) => {
        for (const axis of computePrincipalAxes(tensor).axes.slice(0, 2)) {
          const largest = Math.max(...axis.map(Math.abs));
          expect(axis.find((component) => Math.abs(component) > largest * (1 - 1e-9))).toBeGreaterThan(0);
        }
      }),
      { numRuns: 1000 },
    );
    // In the plane of x and y at 45°: (1, -1, 0)/√2 and not its opposite, whatever the last digits say.
    const { axes } = computePrincipalAxes({ xx: 2, yy: 2, zz: 9, xy: 0.3, yz: 0, zx: 0 });
    expect(axes[0]).toEqual([Math.SQRT1_2, -Math.SQRT1_2, 0].map((component) => expect.closeTo(component, 15) as number));
    expect(axes[1]).toEqual([Math.SQRT1_2, Math.SQRT1_2, 0].map((component) => expect.closeTo(component, 15) as number));
  });

  it('known spectra: whole-numbered matrices with whole-numbered moments, near-equal ones included', () => {
    // R = [[2, -2, 1], [1, 2, 2], [2, 1, -2]]/3 is orthogonal; 9 R D Rᵀ has moments 9 D and whole elements.
    const rows: Vector3[] = [[2, -2, 1], [1, 2, 2], [2, 1, -2]];
    for (const d of [[1, 2, 3], [5, 5, 7], [1, 1e12, 1e12 + 1], [1e6, 1e6 + 1, 1e6 + 2], [0, 0, 4], [4, 4, 4], [2 ** 40, 2 ** 40 + 1, 2 ** 41]] as Vector3[]) {
      const element = (i: number, j: number): number => d.reduce((sum, value, k) => sum + (rows[i]?.[k] ?? 0) * value * (rows[j]?.[k] ?? 0), 0);
      const tensor: Tensor = { xx: element(0, 0), yy: element(1, 1), zz: element(2, 2), xy: element(0, 1), yz: element(1, 2), zx: element(2, 0) };
      const { moments } = computePrincipalAxes(tensor);
      for (const k of [0, 1, 2] as const) expect(Math.abs(moments[k] - 9 * d[k])).toBeLessThanOrEqual(2e-15 * 9 * d[2]);
    }
  });

  it('a diagonal tensor keeps its elements to the bit and the axes of the mesh', () => {
    expect(computePrincipalAxes(makeDiagonal(3, 1, 2))).toEqual({ moments: [1, 2, 3], axes: [[0, 1, 0], [0, 0, 1], [1, 0, 0]] });
    expect(computePrincipalAxes(makeDiagonal(0, 0, 0)).moments).toEqual([0, 0, 0]);
  });

  it('the two-box housing (computed independently)', () => {
    const { moments } = computePrincipalAxes({ xx: 16188461.538, yy: 24726923.077, zz: 17650000, xy: -1153846.154, zx: 6923076.923, yz: 1384615.385 });
    expect(moments).toEqual([9745212.2, 23822394.423, 24997777.992].map((moment) => expect.closeTo(moment, 2) as number));
  });

  it('the tetrahedron of Tonon 2004 (computed independently from the printed vertices)', () => {
    const { moments } = computePrincipalAxes({ xx: 43520.33328539, yy: 194711.29259079, zz: 191168.76488608, xy: -11996.20139323, zx: 46343.16738139, yz: -4417.66156969 });
    expect(moments).toEqual([29535.43105, 191103.65379, 208761.30592].map((moment) => expect.closeTo(moment, 4) as number));
  });
});

describe('which axes are unique', () => {
  const tolerance = { lowerKgM2: 3e-6, upperKgM2: 3e-6 };
  it.each([
    [[1, 2, 3], 'distinct'],
    [[2, 2, 3], 'disc-like'],
    [[1, 3, 3], 'rod-like'],
    [[3, 3, 3], 'ball'],
    [[2, 2 + 2.9e-6, 3], 'disc-like'],
    [[2, 2 + 3.1e-6, 3], 'distinct'],
    [[3 - 4e-6, 3 - 2e-6, 3], 'ball'],
    [[0, 0, 0], 'ball'],
    [[0, 1, 1], 'rod-like'],
  ] as [Vector3, string][])('%j is %s', (moments, kind) => {
    expect(classifyAxes(moments, tolerance)).toBe(kind);
  });
  it('each pair is held against the uncertainty of its own difference', () => {
    expect(classifyAxes([2, 2.01, 2.02], { lowerKgM2: 0.02, upperKgM2: 0 })).toBe('disc-like');
    expect(classifyAxes([2, 2.01, 2.02], { lowerKgM2: 0, upperKgM2: 0.02 })).toBe('rod-like');
    expect(classifyAxes([2, 2.01, 2.02], { lowerKgM2: 0.02, upperKgM2: 0.02 })).toBe('ball');
  });
});
