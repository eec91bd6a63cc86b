import { sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import { and, desc, eq, inArray, lt } from 'drizzle-orm';
import { axis, type Setting, type StoredSetting } from '@masswright/contracts';
import { measurements, measuringRuns, parts, projects, revisions, settings, uploads, users } from '../schema';
import type { Transaction } from '../tenancy/database';

const nameOf = (column: typeof revisions.createdBy) => sql<string>`coalesce((select ${users.name} from ${users} where ${users.id} = ${column}), '')`;

function selectParts(tx: Transaction) {
  // Looked up part by part: of a join with the greatest ordinal the planner makes a reading of all revisions that the organisation has.
  const latest = tx
    .select({ id: revisions.id, organisationId: revisions.organisationId, ordinal: revisions.ordinal, reason: revisions.reason, createdAt: revisions.createdAt, createdBy: revisions.createdBy, uploadId: revisions.uploadId })
    .from(revisions)
    .where(and(eq(revisions.organisationId, parts.organisationId), eq(revisions.partId, parts.id)))
    .orderBy(desc(revisions.ordinal))
    .limit(1)
    .as('latest');
  return tx
    .select({
      part: { id: parts.id, projectId: parts.projectId, projectName: projects.name, number: parts.number, name: parts.name, deletedAt: parts.deletedAt },
      revision: { id: latest.id, ordinal: latest.ordinal, reason: latest.reason, createdAt: latest.createdAt, createdBy: latest.createdBy },
      upload: { id: uploads.id, fileName: uploads.fileName, folder: uploads.folder, sizeBytes: uploads.sizeBytes, sha256: uploads.sha256 },
      run: measuringRuns,
      setting: settings,
      measurement: measurements,
    })
    .from(parts)
    .innerJoin(projects, and(eq(projects.organisationId, parts.organisationId), eq(projects.id, parts.projectId)))
    .innerJoinLateral(latest, sql`true`)
    .innerJoin(uploads, and(eq(uploads.organisationId, latest.organisationId), eq(uploads.id, latest.uploadId)))
    .innerJoin(settings, and(eq(settings.organisationId, latest.organisationId), eq(settings.revisionId, latest.id)))
    .innerJoin(measuringRuns, and(eq(measuringRuns.organisationId, latest.organisationId), eq(measuringRuns.revisionId, latest.id)))
    .leftJoin(measurements, and(eq(measurements.organisationId, measuringRuns.organisationId), eq(measurements.id, measuringRuns.measurementId)));
}

/** The names of people, by their ids; of those that the organisation may not see, none. Asked for apart: who may see whom is long to decide, row by row. */
async function findNames(tx: Transaction, ids: readonly (string | null)[]): Promise<Map<string | null, string>> {
  const wanted = [...new Set(ids)].filter((id) => id !== null);
  if (wanted.length === 0) return new Map();
  const rows = await tx.select({ id: users.id, name: users.name }).from(users).where(inArray(users.id, wanted));
  return new Map(rows.map(({ id, name }) => [id, name]));
}

type SelectedPart = Awaited<ReturnType<typeof selectParts>>[number] & { createdByName: string; settingChangedByName: string; unitStatedByName: string };
type MeasurementRow = typeof measurements.$inferSelect;

/** A part with its latest revision, as read from the tables, and what was measured of the last revision before it. */
export type StoredPart = SelectedPart & { before: { measurement: MeasurementRow; lengthUnit: Setting['lengthUnit'] } | null };

/** Parts with their latest revisions, deleted ones too, in the order of the ids; ids that name none are passed over. */
export async function findParts(tx: Transaction, partIds: readonly string[]): Promise<StoredPart[]> {
  if (partIds.length === 0) return [];
  // Prepared: of so many tables, planning takes longer than reading.
  const select = selectParts(tx).where(sql`${parts.id} = any(${sql.placeholder('ids')}::uuid[])`).prepare('find_parts');
  const rows = new Map((await select.execute({ ids: [...partIds] })).map((row) => [row.part.id, row]));
  const names = await findNames(tx, [...rows.values()].flatMap(({ revision, setting }) => [revision.createdBy, setting.changedBy, setting.unitStatedBy]));
  const named = (id: string | null): string => names.get(id) ?? '';
  const earlier = await findMeasuredBefore(tx, [...rows.values()].filter(({ revision }) => revision.ordinal > 1).map(({ part }) => part.id));
  return partIds.flatMap((id) => {
    const row = rows.get(id);
    if (row === undefined) return [];
    const { revision, setting } = row;
    return [{ ...row, createdByName: named(revision.createdBy), settingChangedByName: named(setting.changedBy), unitStatedByName: named(setting.unitStatedBy), before: earlier.get(id) ?? null }];
  });
}

export async function findPart(tx: Transaction, partId: string): Promise<StoredPart | undefined> {
  return (await findParts(tx, [partId]))[0];
}

/** By part: the last revision before the latest that was measured. */
async function findMeasuredBefore(tx: Transaction, partIds: readonly string[]): Promise<Map<string, NonNullable<StoredPart['before']>>> {
  if (partIds.length === 0) return new Map();
  const latest = alias(revisions, 'latest');
  const rows = await tx
    .selectDistinctOn([revisions.partId], { partId: revisions.partId, measurement: measurements, lengthUnit: settings.lengthUnit })
    .from(revisions)
    .innerJoin(latest, and(eq(latest.organisationId, revisions.organisationId), eq(latest.partId, revisions.partId), lt(revisions.ordinal, latest.ordinal)))
    .innerJoin(settings, and(eq(settings.organisationId, revisions.organisationId), eq(settings.revisionId, revisions.id)))
    .innerJoin(measuringRuns, and(eq(measuringRuns.organisationId, revisions.organisationId), eq(measuringRuns.revisionId, revisions.id)))
    .innerJoin(measurements, and(eq(measurements.organisationId, measuringRuns.organisationId), eq(measurements.id, measuringRuns.measurementId)))
    .where(inArray(revisions.partId, [...partIds]))
    .orderBy(revisions.partId, sql`${revisions.ordinal} desc`);
  return new Map(rows.map(({ partId, measurement, lengthUnit }) => [partId, { measurement, lengthUnit }]));
}

type SettingRow = typeof settings.$inferSelect;

/** The setting that a row holds. */
export function readSetting(row: SettingRow): Setting {
  const { driveSpeedRadPerS: speedRadPerS, driveTimeS: timeS, materialId, materialName, weighedMassKg, weighedMassUncertaintyKg } = row;
  return {
    lengthUnit: row.lengthUnit,
    densityKgM3: row.densityKgM3,
    densitySpreadKgM3: row.densitySpreadKgM3,
    material: materialId === null || materialName === null ? null : { id: materialId, name: materialName },
    weighing: weighedMassKg === null || weighedMassUncertaintyKg === null ? null : { massKg: weighedMassKg, uncertaintyKg: weighedMassUncertaintyKg },
    axis: axis.parse(row.axis),
    drive: speedRadPerS === null || timeS === null ? null : { speedRadPerS, timeS },
    asMade: row.asMade,
    shellDensities: row.shellDensities,
  };
}

/** The columns that hold a setting. */
export function writeSetting(setting: Setting) {
  const { lengthUnit, densityKgM3, densitySpreadKgM3, material, weighing, drive } = setting;
  return {
    lengthUnit,
    densityKgM3,
    densitySpreadKgM3,
    materialId: material?.id ?? null,
    materialName: material?.name ?? null,
    weighedMassKg: weighing?.massKg ?? null,
    weighedMassUncertaintyKg: weighing?.uncertaintyKg ?? null,
    axis: setting.axis,
    driveSpeedRadPerS: drive?.speedRadPerS ?? null,
    driveTimeS: drive?.timeS ?? null,
    asMade: setting.asMade ?? null,
    shellDensities: setting.shellDensities ?? [],
  };
}

/** The setting of a part's latest revision with who last changed it and when its unit was stated. */
export function readStoredSetting({ setting, settingChangedByName, unitStatedByName }: Pick<SelectedPart, 'setting' | 'settingChangedByName' | 'unitStatedByName'>): StoredSetting {
  return {
    ...readSetting(setting),
    version: setting.version,
    changedAt: setting.changedAt.toISOString(),
    changedBy: settingChangedByName,
    unitStated: setting.unitStatedAt === null ? null : { at: setting.unitStatedAt.toISOString(), by: unitStatedByName },
  };
}

/** Adds a part without a revision; `insertRevision` gives it its first. */
export async function insertPart(tx: Transaction, added: { id: string; organisationId: string; projectId: string; number: number; name: string }): Promise<void> {
  await tx.insert(parts).values(added);
}

/** Holds a part for this transaction, so that two revisions at once come one after the other; undefined where there is none. */
export async function lockPart(tx: Transaction, partId: string): Promise<{ projectId: string; deletedAt: Date | null } | undefined> {
  const rows = await tx.select({ projectId: parts.projectId, deletedAt: parts.deletedAt }).from(parts).where(eq(parts.id, partId)).for('update');
  return rows[0];
}

/**
 * Adds a part's next revision with its setting and a queued run; `unitStated` says whether its unit was stated for this very file. `settingVersion` goes
 * on from the revision before: a change that was made on that one's setting is then never taken for one of this.
 */
export async function insertRevision(
  tx: Transaction,
  added: { organisationId: string; partId: string; uploadId: string; reason: string; createdBy: string; setting: Setting; settingVersion: number; unitStated: boolean },
): Promise<{ revisionId: string; runId: string; ordinal: number }> {
  const { organisationId, partId, createdBy } = added;
  const [revision] = await tx
    .insert(revisions)
    .values({
      organisationId,
      partId,
      ordinal: sql`(select coalesce(max(earlier.ordinal), 0) + 1 from ${revisions} earlier where earlier.organisation_id = ${organisationId} and earlier.part_id = ${partId})`,
      uploadId: added.uploadId,
      reason: added.reason,
      createdBy,
    })
    .returning({ id: revisions.id, ordinal: revisions.ordinal });
  if (revision === undefined) throw new Error('An insert gave no row.');
  const stated = added.unitStated ? { unitStatedAt: sql`now()`, unitStatedBy: createdBy } : {};
  await tx.insert(settings).values({ revisionId: revision.id, organisationId, ...writeSetting(added.setting), ...stated, version: added.settingVersion, changedBy: createdBy });
  const [run] = await tx.insert(measuringRuns).values({ organisationId, revisionId: revision.id }).returning({ id: measuringRuns.id });
  if (run === undefined) throw new Error('An insert gave no row.');
  return { revisionId: revision.id, runId: run.id, ordinal: revision.ordinal };
}

/** All revisions of a part, the latest first. */
export async function listRevisions(tx: Transaction, partId: string) {
  return tx
    .select({ id: revisions.id, ordinal: revisions.ordinal, fileName: uploads.fileName, reason: revisions.reason, createdAt: revisions.createdAt, createdByName: nameOf(revisions.createdBy) })
    .from(revisions)
    .innerJoin(uploads, and(eq(uploads.organisationId, revisions.organisationId), eq(uploads.id, revisions.uploadId)))
    .where(eq(revisions.partId, partId))
    .orderBy(sql`${revisions.ordinal} desc`);
}

export async function renamePart(tx: Transaction, partId: string, name: string): Promise<void> {
  await tx.update(parts).set({ name }).where(eq(parts.id, partId));
}

/**
 * Changes a setting if it still has the version that the change was made on; false when it has moved on. `statesUnit`: the person stated the unit,
 * be it the one that stood there.
 */
export async function changeSetting(
  tx: Transaction,
  change: { revisionId: string; version: number; setting: Setting; statesUnit: boolean; changedBy: string },
): Promise<boolean> {
  const { setting, changedBy } = change;
  const stated = setting.lengthUnit === null ? { unitStatedAt: null, unitStatedBy: null } : change.statesUnit ? { unitStatedAt: sql`now()`, unitStatedBy: changedBy } : {};
  const rows = await tx
    .update(settings)
    .set({ ...writeSetting(setting), ...stated, version: sql`${settings.version} + 1`, changedAt: sql`now()`, changedBy })
    .where(and(eq(settings.revisionId, change.revisionId), eq(settings.version, change.version)))
    .returning({ version: settings.version });
  return rows.length > 0;
}
