import { getTableColumns, sql } from 'drizzle-orm';
import { eq, inArray, isNull } from 'drizzle-orm';
import { fileNameKey, type Measurement, type PartState, type StoredSetting, type MeasuringRun, type Setting } from '@masswright/contracts';
import { parts, partSummaries } from '../schema';
import type { Transaction } from '../tenancy/database';
import { presentMeasurement } from './measurement-rows';
import { findParts, readStoredSetting, type StoredPart } from './parts';

/** What a summary follows from, and what it says: `summarisePart` of mechanics, which this project doesn't know. */
export interface SummarySource {
  run: Pick<MeasuringRun, 'state'>;
  setting: StoredSetting;
  measurement: Measurement | null;
  before: { measurement: Measurement; lengthUnit: Setting['lengthUnit'] } | null;
}
export interface SummaryFigures {
  state: PartState;
  figures: {
    sizeM: readonly [number, number, number] | null;
    volumeM3: number | null;
    massKg: number | null;
    principalMomentsKgM2: readonly [number, number, number] | null;
  };
}
export type Summarise = (source: SummarySource) => SummaryFigures;

const batch = 500;

/** What a part's summary follows from. */
export function readSummarySource(stored: StoredPart): SummarySource {
  const { measurement, before } = stored;
  return {
    run: stored.run,
    setting: readStoredSetting(stored),
    measurement: measurement === null ? null : presentMeasurement(measurement),
    before: before === null ? null : { measurement: presentMeasurement(before.measurement), lengthUnit: before.lengthUnit },
  };
}

/** In metres: the same factors as in `units`, of which only the order matters here. */
const unitLengthsM: Record<NonNullable<Setting['lengthUnit']>, number> = { micron: 1e-6, mm: 1e-3, cm: 1e-2, inch: 0.0254, foot: 0.3048, m: 1 };

function makeSummary(stored: StoredPart, organisationId: string, summarise: Summarise): typeof partSummaries.$inferInsert {
  const { part, upload, setting } = stored;
  const source = readSummarySource(stored);
  const { state, figures } = summarise(source);
  const material = setting.materialName ?? '';
  const moments = figures.principalMomentsKgM2;
  return {
    partId: part.id,
    organisationId,
    projectId: part.projectId,
    number: part.number,
    nameKey: part.name.toLowerCase(),
    fileKey: fileNameKey(upload.fileName),
    materialKey: material.toLowerCase(),
    searchText: [String(part.number), part.name, upload.fileName, upload.folder, material].join('\n').normalize('NFC').toLowerCase(),
    state,
    deletedAt: part.deletedAt,
    changedAt: new Date(Math.max(stored.revision.createdAt.getTime(), setting.changedAt.getTime())),
    lengthUnitM: setting.lengthUnit === null ? null : unitLengthsM[setting.lengthUnit],
    sizeM: figures.sizeM === null ? null : Math.max(...figures.sizeM),
    volumeM3: figures.volumeM3,
    massKg: figures.massKg,
    moment1KgM2: moments?.[0] ?? null,
    moment2KgM2: moments?.[1] ?? null,
    moment3KgM2: moments?.[2] ?? null,
  };
}

const columns = Object.entries(getTableColumns(partSummaries));
const names = sql.raw(columns.map(([, column]) => column.name).join(', '));
const typedNames = sql.raw(columns.map(([, column]) => `${column.name} ${column.getSQLType()}`).join(', '));
const overwritten = sql.raw(columns.map(([, column]) => `${column.name} = excluded.${column.name}`).join(', '));

/** In one value instead of thousands, which PostgreSQL and drizzle both take long over; as text, a number comes through JSON to the last bit. */
async function writeSummaries(tx: Transaction, summaries: readonly (typeof partSummaries.$inferInsert)[]): Promise<void> {
  const rows = summaries.map((summary) => Object.fromEntries(columns.map(([key, column]) => [column.name, summary[key as keyof typeof summary]])));
  await tx.execute(sql`
    insert into part_summaries (${names}) select ${names} from json_to_recordset(${JSON.stringify(rows)}::json) as row (${typedNames})
    on conflict (part_id) do update set ${overwritten}`);
}

/**
 * Writes anew what parts are listed by. To be called in the transaction of every write that touches a part, its latest revision, that one's run or
 * setting; forgetting it shows in the tests, which hold all summaries against what they follow from.
 */
export async function refreshPartSummaries(tx: Transaction, organisationId: string, partIds: readonly string[], summarise: Summarise): Promise<void> {
  const ids = [...partIds].sort();
  for (let at = 0; at < ids.length; at += batch) {
    const some = ids.slice(at, at + batch);
    // What another transaction is writing about the same part must be seen here: whoever comes second waits, then reads.
    await tx.select({ id: parts.id }).from(parts).where(inArray(parts.id, some)).orderBy(parts.id).for('no key update');
    const stored = await findParts(tx, some);
    if (stored.length === 0) continue;
    await writeSummaries(tx, stored.map((one) => makeSummary(one, organisationId, summarise)));
  }
}

/** Parts of every organisation that have no summary: they come from an installation of before there were any. Needs the relay's scope. */
export async function findPartsWithoutSummary(tx: Transaction, limit: number): Promise<{ partId: string; organisationId: string }[]> {
  return tx
    .select({ partId: parts.id, organisationId: parts.organisationId })
    .from(parts)
    .leftJoin(partSummaries, eq(partSummaries.partId, parts.id))
    .where(isNull(partSummaries.partId))
    .limit(limit);
}
