import { convertToMetres, lengthUnits } from '@masswright/units';
import { describe, expect, it } from 'vitest';
import { findUnitDoubt } from './unit-doubt';

describe('a unit in doubt', () => {
  it('is found for every mistaken pair of the six units, and the right one is named', () => {
    for (const right of lengthUnits) {
      for (const taken of lengthUnits) {
        // The same body as before, exported in `right` but read in the unit of the revision before.
        const volume = 6.4e-5 / convertToMetres(1, right, 3);
        const before = { volume: 6.4e-5 / convertToMetres(1, taken, 3), lengthUnit: taken };
        const doubt = findUnitDoubt({ volume: volume * 1.04, lengthUnit: taken }, before);
        if (right === taken) expect(doubt).toBeUndefined();
        else expect(doubt?.lengthUnit, `${right} read as ${taken}`).toBe(right);
      }
    }
  });
  it('is found for the cube of any two units, whatever unit is stated, and names a unit only where one brings the volumes together', () => {
    for (const one of lengthUnits) {
      for (const other of lengthUnits.filter((unit) => unit !== one)) {
        const cube = convertToMetres(1, one, 3) / convertToMetres(1, other, 3);
        for (const stated of lengthUnits) {
          for (const change of [0.85, 1, 1.2]) {
            const doubt = findUnitDoubt({ volume: 2.5 * cube * change, lengthUnit: stated }, { volume: 2.5, lengthUnit: stated });
            expect(doubt, `${stated}, ${one} to ${other}, ${change}`).toBeDefined();
            if (!doubt) continue;
            expect(doubt.volumeRatio / (cube * change)).toBeCloseTo(1, 12);
            // The unit that is right, if there is one, is the stated one over that ratio.
            const right = lengthUnits.find((unit) => Math.abs((convertToMetres(1, unit) * convertToMetres(1, one)) / (convertToMetres(1, stated) * convertToMetres(1, other)) - 1) < 1e-9);
            expect(doubt.lengthUnit, `${stated}, ${one} to ${other}, ${change}`).toBe(right ?? null);
          }
        }
      }
    }
  });
  it('is without a unit where none of the six brings the volumes together', () => {
    const doubt = findUnitDoubt({ volume: 35.3, lengthUnit: 'mm' }, { volume: 1, lengthUnit: 'mm' });
    expect(doubt).toEqual({ lengthUnit: null, volumeRatio: 35.3 });
  });
  it('is not raised by a change of the design, however large', () => {
    for (const ratio of [0.3, 0.9, 1, 1.5, 3, 8, 100, 500]) {
      expect(findUnitDoubt({ volume: 1000 * ratio, lengthUnit: 'mm' }, { volume: 1000, lengthUnit: 'mm' }), String(ratio)).toBeUndefined();
    }
  });
  it('says by how much the volumes differ', () => {
    const doubt = findUnitDoubt({ volume: 1000, lengthUnit: 'inch' }, { volume: 1000, lengthUnit: 'mm' });
    expect(doubt?.lengthUnit).toBe('mm');
    // 25.4³, exactly 16387.064: NIST SP 811, from memory.
    expect(doubt?.volumeRatio).toBeCloseTo(16387.064, 6);
  });
});
