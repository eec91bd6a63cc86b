import { sql } from 'drizzle-orm';
import { and, asc, eq, gt } from 'drizzle-orm';
import type { Setting } from '@masswright/contracts';
import { measurements, measuringRuns, parts, projects, revisions, settings, uploads, users } from '../schema';
import type { Transaction } from '../tenancy/database';

const columns = {
  part: { id: parts.id, projectId: parts.projectId, projectName: projects.name, number: parts.number, name: parts.name },
  revision: { id: revisions.id, ordinal: revisions.ordinal, createdAt: revisions.createdAt },
  createdByName: sql<string>`coalesce((select ${users.name} from ${users} where ${users.id} = ${revisions.createdBy}), '')`,
  upload: { fileName: uploads.fileName, sizeBytes: uploads.sizeBytes, sha256: uploads.sha256 },
  run: measuringRuns,
  setting: settings,
  settingChangedByName: sql<string>`coalesce((select ${users.name} from ${users} where ${users.id} = ${settings.changedBy}), '')`,
  measurement: measurements,
};

function selectParts(tx: Transaction) {
  return tx
    .select(columns)
    .from(parts)
    .innerJoin(projects, and(eq(projects.organisationId, parts.organisationId), eq(projects.id, parts.projectId)))
    .innerJoin(
      revisions,
      and(
        eq(revisions.organisationId, parts.organisationId),
        eq(revisions.partId, parts.id),
        sql`${revisions.ordinal} = (select max(latest.ordinal) from ${revisions} latest where latest.organisation_id = ${parts.organisationId} and latest.part_id = ${parts.id})`,
      ),
    )
    .innerJoin(uploads, and(eq(uploads.organisationId, revisions.organisationId), eq(uploads.id, revisions.uploadId)))
    .innerJoin(settings, and(eq(settings.organisationId, revisions.organisationId), eq(settings.revisionId, revisions.id)))
    .innerJoin(measuringRuns, and(eq(measuringRuns.organisationId, revisions.organisationId), eq(measuringRuns.revisionId, revisions.id)))
    .leftJoin(measurements, and(eq(measurements.organisationId, measuringRuns.organisationId), eq(measurements.id, measuringRuns.measurementId)));
}

/** A part with its latest revision, as read from the tables. */
export type StoredPart = Awaited<ReturnType<typeof listParts>>[number];

/** A page of a project's parts by number, each with its latest revision. */
export async function listParts(tx: Transaction, projectId: string, page: { afterNumber: number; limit: number }) {
  return selectParts(tx)
    .where(and(eq(parts.projectId, projectId), gt(parts.number, page.afterNumber)))
    .orderBy(asc(parts.number))
    .limit(page.limit);
}

export async function findPart(tx: Transaction, partId: string): Promise<StoredPart | undefined> {
  const rows = await selectParts(tx).where(eq(parts.id, partId));
  return rows[0];
}

/** Adds a part with its first revision, its setting and a queued run. Gives the run's id. */
export async function insertPart(
  tx: Transaction,
  added: {
    organisationId: string;
    projectId: string;
    partId: string;
    number: number;
    name: string;
    uploadId: string;
    createdBy: string;
    setting: Pick<Setting, 'lengthUnit' | 'densityKgM3' | 'axis'>;
  },
): Promise<{ revisionId: string; runId: string }> {
  const { organisationId, createdBy } = added;
  await tx.insert(parts).values({ id: added.partId, organisationId, projectId: added.projectId, number: added.number, name: added.name });
  const [revision] = await tx
    .insert(revisions)
    .values({ organisationId, partId: added.partId, ordinal: 1, uploadId: added.uploadId, createdBy })
    .returning({ id: revisions.id });
  if (revision === undefined) throw new Error('An insert gave no row.');
  await tx.insert(settings).values({ revisionId: revision.id, organisationId, ...added.setting, changedBy: createdBy });
  const [run] = await tx.insert(measuringRuns).values({ organisationId, revisionId: revision.id }).returning({ id: measuringRuns.id });
  if (run === undefined) throw new Error('An insert gave no row.');
  return { revisionId: revision.id, runId: run.id };
}

export async function renamePart(tx: Transaction, partId: string, name: string): Promise<void> {
  await tx.update(parts).set({ name }).where(eq(parts.id, partId));
}

/** Changes a setting if it still has the version that the change was made on; false when it has moved on. */
export async function changeSetting(
  tx: Transaction,
  change: { revisionId: string; version: number; setting: Setting; changedBy: string },
): Promise<boolean> {
  const { setting } = change;
  const rows = await tx
    .update(settings)
    .set({
      lengthUnit: setting.lengthUnit,
      densityKgM3: setting.densityKgM3,
      axis: setting.axis,
      driveSpeedRadPerS: setting.drive?.speedRadPerS ?? null,
      driveTimeS: setting.drive?.timeS ?? null,
      version: sql`${settings.version} + 1`,
      changedAt: sql`now()`,
      changedBy: change.changedBy,
    })
    .where(and(eq(settings.revisionId, change.revisionId), eq(settings.version, change.version)))
    .returning({ version: settings.version });
  return rows.length > 0;
}
