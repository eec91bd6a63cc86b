import { sql } from 'drizzle-orm';
import { eq } from 'drizzle-orm';
import type { Setting } from '@masswright/contracts';
import { parts, revisions, settings, settingsChangeItems, settingsChanges, users, type SettingBefore } from '../schema';
import type { Transaction } from '../tenancy/database';
import { readSetting, writeSetting } from './parts';

export type { SettingBefore } from '../schema';

/** The setting of a part's latest revision, as a change of many looks at it. */
export interface CurrentSetting {
  partId: string;
  revisionId: string;
  version: number;
  before: SettingBefore;
  changedByName: string;
}

/** The settings of the latest revisions of parts, by part. Whoever is going to change them holds the parts first. */
export async function findCurrentSettings(tx: Transaction, partIds: readonly string[]): Promise<CurrentSetting[]> {
  const rows = await tx
    .selectDistinctOn([revisions.partId], { partId: revisions.partId, revisionId: revisions.id, setting: settings, changedByName: users.name })
    .from(revisions)
    .innerJoin(settings, sql`${settings.organisationId} = ${revisions.organisationId} and ${settings.revisionId} = ${revisions.id}`)
    .leftJoin(users, eq(users.id, settings.changedBy))
    .where(sql`${revisions.partId} = any(${sql.param([...partIds])}::uuid[])`)
    .orderBy(revisions.partId, sql`${revisions.ordinal} desc`);
  return rows.map(({ partId, revisionId, setting, changedByName }) => ({
    partId,
    revisionId,
    version: setting.version,
    before: { ...readSetting(setting), unitStatedAt: setting.unitStatedAt?.toISOString() ?? null, unitStatedBy: setting.unitStatedBy },
    changedByName: changedByName ?? '',
  }));
}

/** What is to become of one setting. `unitStatedAt: 'now'` where the change itself states the unit. */
export interface SettingAfter {
  revisionId: string;
  version: number;
  setting: Setting;
  unitStatedAt: string | null;
  unitStatedBy: string | null;
}

/** Sent as text, which a number comes through to the last bit; jsonb would rewrite it on the way. */
const asRow = ({ revisionId, version, setting, unitStatedAt, unitStatedBy }: SettingAfter) => ({ revisionId, version, ...writeSetting(setting), unitStatedAt, unitStatedBy });

/**
 * Changes many settings in one statement, each only if it still has the version that was read; gives the revisions that were changed, which is all of
 * them while their parts are held.
 */
export async function writeSettings(tx: Transaction, changes: readonly SettingAfter[], changedBy: string): Promise<string[]> {
  if (changes.length === 0) return [];
  const { rows } = await tx.execute<{ revision_id: string }>(sql`
    update settings set
      length_unit = after."lengthUnit", density_kg_m3 = after."densityKgM3", density_spread_kg_m3 = after."densitySpreadKgM3",
      material_id = after."materialId", material_name = after."materialName",
      weighed_mass_kg = after."weighedMassKg", weighed_mass_uncertainty_kg = after."weighedMassUncertaintyKg",
      axis = after.axis, drive_speed_rad_per_s = after."driveSpeedRadPerS", drive_time_s = after."driveTimeS",
      unit_stated_at = after."unitStatedAt", unit_stated_by = after."unitStatedBy",
      version = settings.version + 1, changed_at = now(), changed_by = ${changedBy}
    from json_to_recordset(${JSON.stringify(changes.map(asRow))}::json) as after (
      "revisionId" uuid, version integer, "lengthUnit" text, "densityKgM3" double precision, "densitySpreadKgM3" double precision, "materialId" text, "materialName" text,
      "weighedMassKg" double precision, "weighedMassUncertaintyKg" double precision, axis jsonb, "driveSpeedRadPerS" double precision, "driveTimeS" double precision,
      "unitStatedAt" timestamptz, "unitStatedBy" uuid)
    where settings.revision_id = after."revisionId" and settings.version = after.version
    returning settings.revision_id`);
  return rows.map(({ revision_id: revisionId }) => revisionId);
}

/** Notes a change of many settings with what each was before. */
export async function insertSettingsChange(
  tx: Transaction,
  change: { id: string; organisationId: string; projectId: string; reverses: string | null; createdBy: string },
  items: readonly { revisionId: string; before: SettingBefore; versionAfter: number }[],
): Promise<Date> {
  const [row] = await tx.insert(settingsChanges).values(change).returning({ createdAt: settingsChanges.createdAt });
  if (row === undefined) throw new Error('An insert gave no row.');
  if (items.length > 0) {
    await tx.execute(sql`
      insert into settings_change_items (organisation_id, change_id, revision_id, before, version_after)
      select ${change.organisationId}::uuid, ${change.id}::uuid, item."revisionId", item.before, item."versionAfter"
      from json_to_recordset(${JSON.stringify(items)}::json) as item ("revisionId" uuid, before jsonb, "versionAfter" integer)`);
  }
  return row.createdAt;
}

export async function findSettingsChange(tx: Transaction, changeId: string) {
  const [row] = await tx.select().from(settingsChanges).where(eq(settingsChanges.id, changeId));
  return row;
}

/** Who took a change back, and when; undefined where nobody did. */
export async function findReversal(tx: Transaction, changeId: string): Promise<{ id: string; byName: string } | undefined> {
  const [row] = await tx
    .select({ id: settingsChanges.id, byName: users.name })
    .from(settingsChanges)
    .leftJoin(users, eq(users.id, settingsChanges.createdBy))
    .where(eq(settingsChanges.reverses, changeId));
  return row === undefined ? undefined : { id: row.id, byName: row.byName ?? '' };
}

/** What a change did, setting by setting; parts that were forgotten since are left out. */
export async function listSettingsChangeItems(tx: Transaction, changeId: string) {
  return tx
    .select({ partId: revisions.partId, number: parts.number, revisionId: settingsChangeItems.revisionId, before: settingsChangeItems.before, versionAfter: settingsChangeItems.versionAfter })
    .from(settingsChangeItems)
    .innerJoin(revisions, sql`${revisions.organisationId} = ${settingsChangeItems.organisationId} and ${revisions.id} = ${settingsChangeItems.revisionId}`)
    .innerJoin(parts, sql`${parts.organisationId} = ${revisions.organisationId} and ${parts.id} = ${revisions.partId}`)
    .where(eq(settingsChangeItems.changeId, changeId))
    .orderBy(parts.number);
}
