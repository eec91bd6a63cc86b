import { describe, expect, it } from 'vitest';
import { bodiesPerFamily, drawBody, families } from './smooth-families';
import { placeTruth } from './smooth-truth';
import { sumMesh } from './sum-mesh';
import { arc, drawUpTruth, turnTruth } from './smooth-curves';
import { ballCorners, ellipsoidTruth, icosahedralCorners, makeRoundedBlock } from './smooth-balls';

describe('the randomised set of smooth bodies', () => {
  it('has at least a thousand of them', () => {
    expect(Object.keys(families).length * bodiesPerFamily).toBeGreaterThanOrEqual(1000);
  });

  it.each(Object.keys(families))('%s: the mesh is closed and its facets agree about the outside', (family) => {
    for (const number of [4, 5]) {
      const { corners } = drawBody(family, number);
      const runs = new Map<string, number>();
      const key = (at: number): string => corners.subarray(at, at + 3).join();
      for (let at = 0; at < corners.length; at += 9) {
        for (const [from, to] of [[at, at + 3], [at + 3, at + 6], [at + 6, at]] as const) {
          const [one, two] = [key(from), key(to)];
          const edge = one < two ? `${one} ${two}` : `${two} ${one}`;
          runs.set(edge, (runs.get(edge) ?? 0) + (one < two ? 1 : -1));
        }
      }
      expect([...runs.values()].filter((balance) => balance !== 0)).toEqual([]);
    }
  });

  it.each(Object.keys(families))('%s: the mesh comes near to the body, the more so the finer it is', (family) => {
    for (const number of [0, 1, 2, 3]) {
      const { corners, truth } = drawBody(family, number);
      const mesh = sumMesh(corners, truth.centre);
      const size = Math.cbrt(truth.volume);
      expect(Math.abs(mesh.volume / truth.volume - 1)).toBeLessThan(0.06);
      expect(Math.abs(mesh.area / truth.area - 1)).toBeLessThan(0.06);
      for (const k of [0, 1, 2] as const) expect(Math.abs(mesh.first[k]) / mesh.volume).toBeLessThan(0.03 * size);
      for (const key of ['xx', 'yy', 'zz', 'xy', 'yz', 'zx'] as const) expect(Math.abs(mesh.second[key] - truth.second[key])).toBeLessThan(0.1 * (truth.second.xx + truth.second.yy + truth.second.zz));
    }
  });
});

describe('what the set holds for true', () => {
  const near = (value: number): number => expect.closeTo(value, 10) as number;

  it('torus, sphere and elliptic cylinder by the handbook', () => {
    const torus = turnTruth([arc([5, 0], [1, 1], 0, 2 * Math.PI, 24)]);
    expect(torus.volume).toBeCloseTo(10 * Math.PI * Math.PI, 10);
    expect(torus.area).toBeCloseTo(20 * Math.PI * Math.PI, 9);
    expect(2 * torus.second.xx).toBeCloseTo(torus.volume * (25 + 0.75), 8);
    expect(ellipsoidTruth([1, 1, 1]).area).toBeCloseTo(4 * Math.PI, 10);
    // Prolate, c = 5 about a = b = 1: 2π (1 + (c/e) asin e).
    const e = Math.sqrt(1 - 1 / 25);
    expect(ellipsoidTruth([1, 1, 5]).area).toBeCloseTo(2 * Math.PI * (1 + (5 / e) * Math.asin(e)), 6);
    const cylinder = drawUpTruth([arc([3, 1], [2, 1], 0, 2 * Math.PI, 24)], 2);
    expect(cylinder).toMatchObject({ volume: near(4 * Math.PI), centre: [near(3), near(1), 1], second: { xx: near(4 * Math.PI), yy: near(Math.PI), zz: near((4 * Math.PI) / 3), xy: near(0) } });
  });

  it('a finer mesh ends at the truth: the error falls by the square of the step', () => {
    const error = (corners: Float64Array, volume: number): number => 1 - sumMesh(corners, [0, 0, 0]).volume / volume;
    const ball = (4 / 3) * Math.PI;
    expect(error(ballCorners(48, 24), ball) / error(ballCorners(96, 48), ball)).toBeCloseTo(4, 1);
    expect(error(icosahedralCorners(10), ball) / error(icosahedralCorners(20), ball)).toBeCloseTo(4, 1);
    const [coarse, fine] = [makeRoundedBlock([1, 2, 3], 1, 10), makeRoundedBlock([1, 2, 3], 1, 20)];
    expect(error(coarse.corners, coarse.truth.volume) / error(fine.corners, fine.truth.volume)).toBeCloseTo(4, 1);
    const second = ({ corners, truth }: typeof coarse): number => 1 - sumMesh(corners, [0, 0, 0]).second.xx / truth.second.xx;
    expect(second(coarse) / second(fine)).toBeCloseTo(4, 1);
  });

  it('turning a body turns its moments', () => {
    const truth = ellipsoidTruth([1, 2, 3]);
    const quarterAboutZ = placeTruth(truth, [[0, -1, 0], [1, 0, 0], [0, 0, 1]], [1, 2, 3]);
    expect(quarterAboutZ).toMatchObject({ centre: [1, 2, 3], second: { xx: near(truth.second.yy), yy: near(truth.second.xx), zz: near(truth.second.zz) } });
  });
});
