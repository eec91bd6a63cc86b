import { describe, expect, it } from 'vitest';
import { computeScalePicture, describeRatio, joinCells } from './scale-picture';

const format = (lengthM: number): string => `${lengthM * 1000} mm`;
const verdigris = (picture: ReturnType<typeof computeScalePicture>) => picture.shapes.flatMap((shape) => (shape.kind === 'rectangle' && shape.fill === 'verdigris' ? [shape] : []));

describe('a body to scale', () => {
  it('is as much larger or smaller than its companions as it is in truth', () => {
    // A box of 0.9 × 2 m is a door: both have the same height in the door's panel.
    const picture = computeScalePicture({ widthM: 0.9, heightM: 2, outline: null, format });
    const body = verdigris(picture)[2];
    const door = picture.shapes.find((shape) => shape.kind === 'rectangle' && shape.fill === 'rule');
    expect(door).toMatchObject({ width: body?.width, height: body?.height });
    expect(picture.alternative).toBe('The body is 2000 mm long: 83 coins long, 11 hands long, as long as a door.');
  });
  it('stays within its panels at every size, and is a speck rather than nothing', () => {
    for (const widthM of [1e-7, 0.01, 0.3, 40, 1e5]) {
      const picture = computeScalePicture({ widthM, heightM: widthM / 3, outline: { width: 3, height: 1, cells: [1, 0, 1] }, format });
      for (const shape of picture.shapes) {
        if (shape.kind !== 'rectangle') continue;
        expect(shape.x).toBeGreaterThanOrEqual(0);
        expect(shape.x + shape.width).toBeLessThanOrEqual(picture.width);
        expect(shape.y).toBeGreaterThanOrEqual(0);
        expect(Math.min(shape.width, shape.height)).toBeGreaterThan(0);
      }
    }
  });
  it('shows a hole as a hole', () => {
    const cells = [1, 1, 1, 1, 0, 1, 1, 1, 1];
    expect(joinCells({ width: 3, height: 3, cells })).toEqual([
      { column: 0, row: 0, columns: 3, rows: 1 },
      { column: 0, row: 1, columns: 1, rows: 1 },
      { column: 2, row: 1, columns: 1, rows: 1 },
      { column: 0, row: 2, columns: 3, rows: 1 },
    ]);
  });
  it('joins equal rows: a full box is one rectangle', () => {
    expect(joinCells({ width: 8, height: 5, cells: new Uint8Array(40).fill(1) })).toEqual([{ column: 0, row: 0, columns: 8, rows: 5 }]);
  });
});

describe('a ratio in words', () => {
  it.each([
    [3.24, 'hand', '3.2 hands long'],
    [0.5, 'door', '0.5 of a door'],
    [0.01, 'door', '1/100 of a door'],
    [1, 'coin', 'as long as a coin'],
    [2.5e7, 'coin', '3×10^7 coins long'],
  ])('%d of a %s is "%s"', (ratio, name, words) => {
    expect(describeRatio(ratio, name)).toBe(words);
  });
});
