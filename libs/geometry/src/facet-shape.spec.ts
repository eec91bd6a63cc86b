import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isDegenerate, isNormalContradicting } from './facet-shape';

describe('facets without area', () => {
  it('are told exactly: three corners of a lattice line, at any step and any place', () => {
    const step = fc.integer({ min: -(2 ** 20), max: 2 ** 20 });
    fc.assert(
      fc.property(fc.tuple(step, step, step), fc.tuple(step, step, step), fc.integer({ min: -8, max: 8 }), fc.integer({ min: -8, max: 8 }), (start, direction, one, two) => {
        const point = (times: number): number[] => start.map((coordinate, k) => (coordinate + times * (direction[k] ?? 0)) / 1024);
        expect(isDegenerate([...point(0), ...point(one), ...point(two)], 0)).toBe(true);
      }),
      { numRuns: 1000 },
    );
  });
  it('are not confused with facets one unit in the last place high', () => {
    const base = 1 + 2 ** -30;
    const line = [0, 0, 0, base, base, base, 3 * base, 3 * base, 3 * base];
    expect(isDegenerate(line, 0)).toBe(true);
    for (let k = 3; k < 9; k++) {
      const bent = [...line];
      bent[k] = (bent[k] ?? 0) * (1 + 2 ** -52);
      expect(isDegenerate(bent, 0)).toBe(false);
    }
  });
  it('are those with equal corners, too', () => {
    expect(isDegenerate([1, 2, 3, 1, 2, 3, 4, 5, 6], 0)).toBe(true);
    expect(isDegenerate([1, 2, 3, 1, 2, 3, 1, 2, 3], 0)).toBe(true);
    expect(isDegenerate([0, 0, 0, 1, 0, 0, 0, 1, 0], 0)).toBe(false);
  });
});

describe('stored normals', () => {
  const facet = [0, 0, 0, 1, 0, 0, 0, 1, 0];
  it('contradict where they point to the other side', () => {
    expect(isNormalContradicting(facet, 0, 0, 0, -1)).toBe(true);
    expect(isNormalContradicting(facet, 0, 9, 0, -1)).toBe(true);
  });
  it('say nothing where they are zero, no number, or in the facet but for rounding', () => {
    const normals: [number, number, number][] = [[0, 0, 0], [NaN, NaN, NaN], [1, 0, -1e-6], [0, 0, 2], [Infinity, 0, 0]];
    for (const normal of normals) expect(isNormalContradicting(facet, 0, ...normal)).toBe(false);
  });
});
