import { describe, expect, it } from 'vitest';
import { findSide, findSideOfInside, findTurn, findTurnOfInside } from './predicates';
import { createDraw, type Draw } from '../testing/draw';

/** Numbers as multiples of 2⁻²⁰⁰, which all that are drawn here are. */
function toWhole(value: number): bigint {
  const scaled = value * 2 ** 100;
  return Number.isInteger(scaled) ? BigInt(scaled) << 100n : BigInt(scaled * 2 ** 100);
}

const signOf = (value: bigint): number => (value > 0n ? 1 : value < 0n ? -1 : 0);

function determinant(rows: bigint[][]): bigint {
  const [[a, b, c], [d, e, f], [g, h, i]] = rows as [[bigint, bigint, bigint], [bigint, bigint, bigint], [bigint, bigint, bigint]];
  return a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
}

/** Seven points: mostly near one plane or one line, or upon it to the last bit. */
function drawPoints(draw: Draw): Float64Array {
  const isPlain = draw.next() < 0.4;
  const points = Float64Array.from({ length: 21 }, () => (isPlain ? draw.whole(-99, 99) / 8 : draw.pick([draw.whole(-3, 3), draw.whole(-9, 9) / 3, draw.between(-1, 1), 0.1 * draw.whole(-9, 9)])));
  const away = isPlain ? 0 : draw.pick([0, 0, 1e6, 1e-9]);
  const [u, v] = [draw.whole(-8, 8) / 4, isPlain ? draw.whole(-8, 8) / 4 : draw.between(-1, 1)];
  for (let point = 3; point < 7; point++) {
    if (draw.next() < 0.4) continue;
    for (let k = 0; k < 3; k++) {
      const a = points[k] ?? 0, b = points[3 + k] ?? 0, c = points[6 + k] ?? 0;
      points[3 * point + k] = a + u * (b - a) + v * (c - a) + (!isPlain && draw.next() < 0.2 ? 1e-17 : 0);
    }
  }
  return points.map((coordinate) => coordinate + away);
}

describe('which side a point lies on', () => {
  it('is what exact arithmetic says, in space and in the picture along each axis', () => {
    const draw = createDraw();
    const seen = [0, 0, 0];
    for (let k = 0; k < 4000; k++) {
      const points = drawPoints(draw);
      const whole = Array.from({ length: 7 }, (_, n) => [0, 1, 2].map((axis) => toWhole(points[3 * n + axis] ?? 0)));
      const inside = [3, 4, 5] as const;
      // Four times everything, so that halves and quarters are whole.
      const within = [0, 1, 2].map((axis) => 2n * (whole[3]?.[axis] ?? 0n) + (whole[4]?.[axis] ?? 0n) + (whole[5]?.[axis] ?? 0n));
      const corners = [0, 1, 2].map((n) => (whole[n] ?? []).map((coordinate) => 4n * coordinate));
      for (const [point, found, turnOf] of [
        [(whole[6] ?? []).map((coordinate) => 4n * coordinate), findSide(points, 0, 1, 2, 6), (i: number, j: number) => findTurn(points, i, j, 0, 1, 6)],
        [within, findSideOfInside(points, 0, 1, 2, inside), (i: number, j: number) => findTurnOfInside(points, i, j, 0, 1, inside)],
      ] as const) {
        const less = (n: number): bigint[] => (corners[n] ?? []).map((coordinate, axis) => coordinate - (point[axis] ?? 0n));
        const side = 0 - signOf(determinant([less(0), less(1), less(2)]));
        expect(found, `seed ${draw.seed}, case ${k}: ${points.join()}`).toBe(side);
        seen[side + 1] = (seen[side + 1] ?? 0) + 1;
        for (const [i, j] of [[0, 1], [1, 2], [2, 0]] as const) {
          const [a = [], b = []] = [less(0), less(1)];
          expect(turnOf(i, j), `seed ${draw.seed}, case ${k}`).toBe(signOf((a[i] ?? 0n) * (b[j] ?? 0n) - (a[j] ?? 0n) * (b[i] ?? 0n)));
        }
      }
    }
    expect(Math.min(...seen)).toBeGreaterThan(200);
  });

  it('is in front of a facet for the point from which its corners run counter-clockwise', () => {
    const points = Float64Array.of(0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1, 0.2, 0.2, -1, 0.3, 0.3, 0);
    expect([3, 4, 5].map((point) => findSide(points, 0, 1, 2, point))).toEqual([1, -1, 0]);
  });
});
