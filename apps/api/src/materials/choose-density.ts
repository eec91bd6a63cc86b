import type { DensityChoice, Setting } from '@masswright/contracts';
import type { Transaction } from '@masswright/drizzle';
import { AppError } from '../platform/app-error';
import { findKnownMaterial, type KnownMaterial } from './find-known-material';

export type ChosenDensity = Pick<Setting, 'densityKgM3' | 'densitySpreadKgM3' | 'material'>;

function unknownMaterial(): AppError {
  const message = 'There is no such material in the library. Choose another, or type the density.';
  return new AppError('invalid-input', message, { fields: [{ path: 'material', message }] });
}

/**
 * What a choice of a density makes of a setting. A material alone brings the density and the spread that the library has at this moment; with a density,
 * that one is kept as it is (an undo, or a density of an earlier day). A density alone takes the material's name and spread away; `material: null` alone
 * takes the name away and leaves the density. What isn't said stays.
 *
 * @throws AppError invalid-input where the material is unknown, or a spread is given without a density to belong to
 */
export async function chooseDensity(tx: Transaction, before: Setting, choice: DensityChoice): Promise<ChosenDensity> {
  return (await prepareDensityChoice(tx, choice))(before);
}

/** The same choice for many settings: the library is asked once. */
export async function prepareDensityChoice(tx: Transaction, choice: DensityChoice): Promise<(before: Setting) => ChosenDensity> {
  const { material } = choice;
  if (!material) return (before) => settleDensity(before, choice, material);
  const known = await findKnownMaterial(tx, material.id);
  return (before) => {
    // What a setting is already named by stays a name that it can have.
    const named = known ?? (before.material?.id === material.id ? before.material : undefined);
    if (named === undefined) throw unknownMaterial();
    return settleDensity(before, choice, named);
  };
}

type NamedMaterial = Pick<KnownMaterial, 'id' | 'name'> & Partial<KnownMaterial>;

function settleDensity(before: Setting, choice: DensityChoice, material: NamedMaterial | null | undefined): ChosenDensity {
  const { densityKgM3, densitySpreadKgM3 } = choice;
  if (material) {
    const named = { id: material.id, name: material.name };
    if (typeof densityKgM3 === 'number') return { densityKgM3, densitySpreadKgM3: densitySpreadKgM3 ?? null, material: named };
    if (material.densityKgM3 === undefined) throw unknownMaterial();
    return { densityKgM3: material.densityKgM3, densitySpreadKgM3: densitySpreadKgM3 ?? material.densitySpreadKgM3 ?? null, material: named };
  }
  if (densityKgM3 === null) return { densityKgM3: null, densitySpreadKgM3: null, material: null };
  if (densityKgM3 !== undefined) return { densityKgM3, densitySpreadKgM3: densitySpreadKgM3 ?? null, material: null };
  const kept: ChosenDensity = { densityKgM3: before.densityKgM3, densitySpreadKgM3: before.densitySpreadKgM3, material: material === null ? null : before.material };
  if (densitySpreadKgM3 === undefined) return kept;
  if (kept.densityKgM3 === null && densitySpreadKgM3 !== null) {
    const message = 'A spread belongs to a density. State the density too.';
    throw new AppError('invalid-input', message, { fields: [{ path: 'densitySpreadKgM3', message }] });
  }
  return { ...kept, densitySpreadKgM3 };
}
