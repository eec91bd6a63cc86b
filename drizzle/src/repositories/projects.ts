import { sql } from 'drizzle-orm';
import { and, asc, eq } from 'drizzle-orm';
import { projects } from '../schema';
import type { Transaction } from '../tenancy/database';

export interface ProjectRow {
  id: string;
  name: string;
  /** Deleted ones left out. */
  parts: number;
  createdAt: Date;
}

const columns = {
  id: projects.id,
  name: projects.name,
  // Written out: in a query of one table drizzle leaves the tables' names away, and then `id` would be the part's.
  parts: sql<number>`(select count(*)::int from parts where parts.organisation_id = projects.organisation_id and parts.project_id = projects.id and parts.deleted_at is null)`,
  createdAt: projects.createdAt,
};

/** A page of the organisation's projects by name. */
export async function listProjects(
  tx: Transaction,
  page: { after: { name: string; id: string } | undefined; limit: number },
): Promise<ProjectRow[]> {
  return tx
    .select(columns)
    .from(projects)
    .where(
      page.after === undefined
        ? undefined
        : sql`(lower(${projects.name}), ${projects.id}) > (lower(${page.after.name}), ${page.after.id}::uuid)`,
    )
    .orderBy(asc(sql`lower(${projects.name})`), asc(projects.id))
    .limit(page.limit);
}

export async function findProject(tx: Transaction, projectId: string): Promise<ProjectRow | undefined> {
  const rows = await tx.select(columns).from(projects).where(eq(projects.id, projectId));
  return rows[0];
}

/** Whether there is such a project; quicker than to find it, which counts its parts. */
export async function hasProject(tx: Transaction, projectId: string): Promise<boolean> {
  const rows = await tx.select({ id: projects.id }).from(projects).where(eq(projects.id, projectId));
  return rows.length > 0;
}

export async function isProjectNameTaken(tx: Transaction, name: string, exceptId?: string): Promise<boolean> {
  const rows = await tx
    .select({ id: projects.id })
    .from(projects)
    .where(and(sql`lower(${projects.name}) = lower(${name})`, exceptId === undefined ? undefined : sql`${projects.id} <> ${exceptId}`));
  return rows.length > 0;
}

export async function insertProject(
  tx: Transaction,
  project: { id: string; organisationId: string; name: string; createdBy: string },
): Promise<void> {
  await tx.insert(projects).values(project);
}

export async function renameProject(tx: Transaction, projectId: string, name: string): Promise<void> {
  await tx.update(projects).set({ name }).where(eq(projects.id, projectId));
}

/** Takes the project's next part number; two at once wait for each other, and a rolled back one leaves no gap. */
export async function takePartNumber(tx: Transaction, projectId: string): Promise<number> {
  const rows = await tx
    .update(projects)
    .set({ nextPartNumber: sql`${projects.nextPartNumber} + 1` })
    .where(eq(projects.id, projectId))
    .returning({ next: projects.nextPartNumber });
  const row = rows[0];
  if (row === undefined) throw new Error('The project is gone.');
  return row.next - 1;
}
