import { sql } from 'drizzle-orm';
import { and, asc, eq } from 'drizzle-orm';
import type { CreateMaterialRequest } from '@masswright/contracts';
import { materials, parts, revisions, settings } from '../schema';
import type { Transaction } from '../tenancy/database';
import { isOfThisOrganisation } from '../tenancy/of-this-organisation';

export type MaterialRow = typeof materials.$inferSelect;

/** The organisation's own materials by name, archived ones too. */
export async function listMaterials(tx: Transaction): Promise<MaterialRow[]> {
  return tx.select().from(materials).orderBy(asc(sql`lower(${materials.name})`));
}

export async function findMaterial(tx: Transaction, materialId: string): Promise<MaterialRow | undefined> {
  const rows = await tx.select().from(materials).where(eq(materials.id, materialId));
  return rows[0];
}

/** Whether another own material has the name, letter case left aside. */
export async function isMaterialNameTaken(tx: Transaction, name: string, exceptId?: string): Promise<boolean> {
  const rows = await tx
    .select({ id: materials.id })
    .from(materials)
    .where(and(sql`lower(${materials.name}) = lower(${name})`, exceptId === undefined ? undefined : sql`${materials.id} <> ${exceptId}`));
  return rows.length > 0;
}

export async function insertMaterials(tx: Transaction, added: readonly (CreateMaterialRequest & { id: string; organisationId: string; changedBy: string })[]): Promise<void> {
  if (added.length > 0) await tx.insert(materials).values([...added]);
}

/** Changes an own material if it still has the version that the change was made on; false when it has moved on. */
export async function changeMaterial(
  tx: Transaction,
  change: { materialId: string; version: number; fields: Partial<CreateMaterialRequest>; archived?: boolean; changedBy: string },
): Promise<boolean> {
  const { fields, archived, changedBy } = change;
  // Archiving what is archived keeps the date.
  const archivedAt = archived === undefined ? {} : { archivedAt: archived ? sql`coalesce(${materials.archivedAt}, now())` : null };
  const rows = await tx
    .update(materials)
    .set({ ...fields, ...archivedAt, version: sql`${materials.version} + 1`, changedAt: sql`now()`, changedBy })
    .where(and(eq(materials.id, change.materialId), eq(materials.version, change.version)))
    .returning({ version: materials.version });
  return rows.length > 0;
}

const isLatest = sql`not exists (select 1 from ${revisions} later where later.organisation_id = ${revisions.organisationId} and later.part_id = ${revisions.partId} and later.ordinal > ${revisions.ordinal})`;

/**
 * By the id of a material: how many parts' latest revisions are set to it, deleted parts left out. These are looked for among the deleted parts, which
 * are few and have an index; joined the other way, every part of every organisation is read.
 */
export async function countMaterialUses(tx: Transaction): Promise<Map<string, number>> {
  const { rows } = await tx.execute<{ material_id: string; parts: number }>(sql`
    select settings.material_id, count(*)::int as parts
    from (select distinct on (part_id) id, part_id from revisions order by part_id, ordinal desc) latest
    join settings on settings.revision_id = latest.id and settings.material_id is not null
    where not exists (select 1 from ${parts} where ${isOfThisOrganisation(parts)} and ${parts.deletedAt} is not null and ${parts.id} = latest.part_id)
    group by settings.material_id`);
  return new Map(rows.map((row) => [row.material_id, row.parts]));
}

/** The parts whose latest revision is set to a material, of all projects, deleted ones left out. */
export async function findPartsOfMaterial(tx: Transaction, materialId: string): Promise<string[]> {
  const rows = await tx
    .select({ partId: parts.id })
    .from(settings)
    .innerJoin(revisions, and(eq(revisions.organisationId, settings.organisationId), eq(revisions.id, settings.revisionId)))
    .innerJoin(parts, and(eq(parts.organisationId, revisions.organisationId), eq(parts.id, revisions.partId)))
    .where(and(eq(settings.materialId, materialId), sql`${parts.deletedAt} is null`, isLatest))
    .orderBy(parts.projectId, parts.number);
  return rows.map(({ partId }) => partId);
}
