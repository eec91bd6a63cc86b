import type { IntegralChange, Measurement, Setting, Symmetric3 } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { computeStatement } from '../compute-statement';
import { makeMeasurement, plainSetting } from '../testing/bodies';

const setting: Setting = { ...plainSetting, densityKgM3: 1000 };
const kindOf = (measurement: Measurement, given: Partial<Setting> = {}): string | null | undefined => computeStatement(measurement, { ...setting, ...given }, { file: '', sha256: '' })?.axes;

/** A body of volume 8 with these second moments, and what the facets leave in doubt of them. */
function makeBody(xx: number, yy: number, zz: number, correction: Partial<Symmetric3> = {}, spread: Partial<Symmetric3> = {}): Measurement {
  const change = (second: Partial<Symmetric3>): IntegralChange => ({ content: 0, first: [0, 0, 0], second: { xx: 0, yy: 0, zz: 0, xy: 0, yz: 0, zx: 0, ...second } });
  return { ...makeMeasurement(8, [0, 0, 0], { xx, yy, zz, xy: 0, yz: 0, zx: 0 }), facetDoubt: { body: { correction: change(correction), spread: [change(spread)] }, area: { correction: 0, spread: [0] } } };
}

describe('axes are not unique where the difference of their moments is within its own uncertainty', () => {
  it('what the digits of a file cannot tell apart is equal', () => {
    expect(kindOf(makeBody(2, 2, 1))).toBe('disc-like' satisfies string);
    expect(kindOf(makeBody(2, 2 + 1e-8, 1))).toBe(kindOf(makeBody(2, 2, 1)));
    expect(kindOf(makeBody(2, 2.001, 1))).toBe('distinct');
    expect(kindOf(makeBody(2, 2, 2))).toBe('ball');
  });

  it('any spread of density parts nothing and brings nothing together', () => {
    for (const densitySpreadKgM3 of [null, 1, 500]) {
      expect(kindOf(makeBody(2, 2.001, 1), { densitySpreadKgM3 })).toBe('distinct');
      expect(kindOf(makeBody(2, 2, 1), { densitySpreadKgM3 })).toBe(kindOf(makeBody(2, 2, 1)));
    }
  });

  it('a tolerance of scale changes both moments alike', () => {
    expect(kindOf(makeBody(2, 2.01, 1), { asMade: { kind: 'scale', spread: 0.05 } })).toBe('distinct');
  });

  it('what the facets leave in doubt of the difference counts, and of the product of inertia between the axes', () => {
    expect(kindOf(makeBody(2, 2.01, 1, {}, { xx: 0.01 }))).not.toBe('distinct');
    expect(kindOf(makeBody(2, 2.01, 1, {}, { xy: 0.006 }))).not.toBe('distinct');
    expect(kindOf(makeBody(2, 2.01, 1, {}, { zz: 0.01 }))).toBe('distinct');
    expect(kindOf(makeBody(2, 2.01, 1, {}, { xx: 0.01, yy: 0.01 }))).toBe('distinct');
  });

  it('moments that the predicted correction brings together are equal, and such that it parts are no nearer for it', () => {
    expect(kindOf(makeBody(2, 2.01, 1, { xx: 0.01 }))).not.toBe('distinct');
    expect(kindOf(makeBody(2, 2.01, 1, { yy: 0.01 }))).toBe('distinct');
  });
});
