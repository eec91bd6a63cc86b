import { describe, expect, it } from 'vitest';
import type { Setting } from '@masswright/contracts';
import type { Transaction } from '@masswright/drizzle';
import { AppError } from '../platform/app-error';
import { chooseDensity } from './choose-density';

/** The starter library stands in the code, so nothing may be asked of the database; whoever does fails the test. */
const noDatabase = new Proxy({}, { get: (_, name) => { throw new Error(`The database was asked for ${String(name)}.`); } }) as Transaction;

const bare: Setting = { lengthUnit: 'mm', densityKgM3: null, densitySpreadKgM3: null, material: null, weighing: null, axis: { kind: 'mesh', along: 'z' }, drive: null };
const steel: Setting = { ...bare, densityKgM3: 7800, densitySpreadKgM3: 50, material: { id: 'steel-mild', name: 'Mild steel of last year' } };

describe('a choice of a density', () => {
  it('by a material brings the library’s density, spread and name of this moment', async () => {
    expect(await chooseDensity(noDatabase, bare, { material: { id: 'al-6061-t6' } })).toEqual({ densityKgM3: 2700, densitySpreadKgM3: 27, material: { id: 'al-6061-t6', name: 'Aluminium 6061-T6' } });
    expect(await chooseDensity(noDatabase, steel, { material: { id: 'steel-mild' } })).toEqual({ densityKgM3: 7850, densitySpreadKgM3: 78.5, material: { id: 'steel-mild', name: 'Mild steel' } });
  });

  it('by a material with a density keeps that density, and its spread as given', async () => {
    expect(await chooseDensity(noDatabase, bare, { material: { id: 'pla' }, densityKgM3: 1250, densitySpreadKgM3: 10 })).toEqual({ densityKgM3: 1250, densitySpreadKgM3: 10, material: { id: 'pla', name: 'PLA' } });
    expect(await chooseDensity(noDatabase, bare, { material: { id: 'pla' }, densityKgM3: 1250 })).toMatchObject({ densityKgM3: 1250, densitySpreadKgM3: null });
  });

  it('typed takes the material’s name away, and the spread unless one is given', async () => {
    expect(await chooseDensity(noDatabase, steel, { densityKgM3: 7900 })).toEqual({ densityKgM3: 7900, densitySpreadKgM3: null, material: null });
    expect(await chooseDensity(noDatabase, steel, { densityKgM3: 7900, densitySpreadKgM3: 5 })).toEqual({ densityKgM3: 7900, densitySpreadKgM3: 5, material: null });
  });

  it('without a material leaves the density', async () => {
    expect(await chooseDensity(noDatabase, steel, { material: null })).toEqual({ densityKgM3: 7800, densitySpreadKgM3: 50, material: null });
  });

  it('of none takes everything away', async () => {
    expect(await chooseDensity(noDatabase, steel, { densityKgM3: null })).toEqual({ densityKgM3: null, densitySpreadKgM3: null, material: null });
  });

  it('that says nothing changes nothing, and of a spread alone only the spread', async () => {
    const { densityKgM3, densitySpreadKgM3, material } = steel;
    expect(await chooseDensity(noDatabase, steel, {})).toEqual({ densityKgM3, densitySpreadKgM3, material });
    expect(await chooseDensity(noDatabase, steel, { densitySpreadKgM3: 1 })).toEqual({ densityKgM3, densitySpreadKgM3: 1, material });
  });

  it('by an unknown material, or a spread without a density, is refused with words', async () => {
    await expect(chooseDensity(noDatabase, steel, { material: { id: 'unobtainium' } })).rejects.toThrow(AppError);
    await expect(chooseDensity(noDatabase, steel, { material: { id: 'unobtainium' } })).rejects.toThrow('no such material in the library');
    await expect(chooseDensity(noDatabase, bare, { densitySpreadKgM3: 1 })).rejects.toThrow('A spread belongs to a density');
  });
});
