import { z } from 'zod';
import type { Material } from '@masswright/contracts';
import { findMaterial, type MaterialRow, type Transaction } from '@masswright/drizzle';
import { findStarterMaterial, type StarterMaterial } from '@masswright/mechanics';

/** A material of either library as far as both know it. */
export type KnownMaterial = Pick<Material, 'id' | 'name' | 'group' | 'densityKgM3' | 'densitySpreadKgM3' | 'spreadBasis' | 'source' | 'origin' | 'version'> & { archivedAt: Date | null };

export const knowStarter = (starter: StarterMaterial): KnownMaterial => ({ ...starter, origin: 'starter', version: 1, archivedAt: null });

export function knowOwn(row: MaterialRow): KnownMaterial {
  const { id, name, group, densityKgM3, densitySpreadKgM3, spreadBasis, source, version, archivedAt } = row;
  return { id, name, group, densityKgM3, densitySpreadKgM3, spreadBasis, source, origin: 'own', version, archivedAt };
}

const uuid = z.uuid();

/** A material by its id: of the starter library, or the organisation's own; undefined where there is none. */
export async function findKnownMaterial(tx: Transaction, id: string): Promise<KnownMaterial | undefined> {
  const starter = findStarterMaterial(id);
  if (starter !== undefined) return knowStarter(starter);
  if (!uuid.safeParse(id).success) return undefined;
  const row = await findMaterial(tx, id);
  return row === undefined ? undefined : knowOwn(row);
}
