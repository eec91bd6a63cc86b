import type { MaterialUse } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { computeMove, isBehind } from './use-figures';

const use = (change: Partial<MaterialUse>): MaterialUse => ({ partId: 'p', projectId: 'r', projectName: 'Reel', number: 1, name: 'Drum', letter: 'A', densityKgM3: 2700, massKg: 0.27, massAtPresentDensityKg: 0.271, ...change });

describe('what a new density moves', () => {
  it('is the difference of the masses, and their share', () => {
    const move = computeMove(use({}));
    expect(move?.differenceKg).toBeCloseTo(0.001, 12);
    expect(move?.share).toBeCloseTo(1 / 270, 12);
  });
  it('is nothing where there is no mass, or where a weighing sets it', () => {
    expect(computeMove(use({ massKg: null }))).toBeNull();
    expect(computeMove(use({ massAtPresentDensityKg: null }))).toBeNull();
  });
  it('concerns the parts that were made with another density', () => {
    expect([isBehind(use({}), 2710), isBehind(use({}), 2700)]).toEqual([true, false]);
  });
});
