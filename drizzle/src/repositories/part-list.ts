import { sql, type SQL } from 'drizzle-orm';
import { partStates, type PartFilter, type PartOrder, type PartSort, type PartState } from '@masswright/contracts';
import { partSummaries } from '../schema';
import type { Transaction } from '../tenancy/database';
import { isOfThisOrganisation } from '../tenancy/of-this-organisation';

/**
 * The words of a search, as `search_text` holds them. A text of 200 characters has at most 100; each is looked for by itself.
 */
export function splitSearch(text: string): string[] {
  return text.normalize('NFC').toLowerCase().split(/\s+/u).filter((word) => word !== '');
}

/**
 * What a filter leaves of a project, whatever its states. The tests of uuids come first: they are leakproof, so row-level security lets them through to
 * the index, and only the project's rows are left for the words. ILIKE and trigrams are not leakproof: an index for them is ignored under row-level
 * security, and a search over the whole organisation's rows would be the price.
 */
export function matchesText(projectId: string, filter: Pick<PartFilter, 'text' | 'deleted'>): SQL {
  const words = splitSearch(filter.text).map((word) => sql`position(${word} in ${partSummaries.searchText}) > 0`);
  const deleted = filter.deleted ? sql`${partSummaries.deletedAt} is not null` : sql`${partSummaries.deletedAt} is null`;
  return sql.join([isOfThisOrganisation(partSummaries), sql`${partSummaries.projectId} = ${projectId}`, deleted, ...words], sql` and `);
}

/** The states that a filter asks for; all where it names none. */
export function readStates(filter: Pick<PartFilter, 'states'>): readonly PartState[] {
  const asked = filter.states.split(',');
  return filter.states === '' ? partStates : partStates.filter((state) => asked.includes(state));
}

const statesInOrder = sql.raw(`array[${partStates.map((state) => `'${state}'`).join(', ')}]::text[]`);
const natural = (column: SQL | typeof partSummaries.nameKey): SQL => sql`(${column} collate natural_order)`;

/** What is sorted by. A row without it comes last either way. */
const sortKeys: Record<PartSort, SQL> = {
  number: sql`${partSummaries.number}`,
  name: natural(partSummaries.nameKey),
  file: natural(sql`${partSummaries.fileKey}`),
  unit: sql`${partSummaries.lengthUnitM}`,
  material: natural(sql`nullif(${partSummaries.materialKey}, '')`),
  size: sql`${partSummaries.sizeM}`,
  volume: sql`${partSummaries.volumeM3}`,
  mass: sql`${partSummaries.massKg}`,
  moment1: sql`${partSummaries.moment1KgM2}`,
  moment2: sql`${partSummaries.moment2KgM2}`,
  moment3: sql`${partSummaries.moment3KgM2}`,
  state: sql`array_position(${statesInOrder}, ${partSummaries.state})`,
  changed: sql`${partSummaries.changedAt}`,
};

/** These are always there. Said of the others only: "nulls last" keeps an index from giving a descending order. */
const alwaysThere: readonly PartSort[] = ['number', 'name', 'file', 'state', 'changed'];

function orderBy({ sort, direction }: PartOrder): SQL {
  const way = sql.raw(`${direction === 'ascending' ? 'asc' : 'desc'}${alwaysThere.includes(sort) ? '' : ' nulls last'}`);
  return sort === 'number' ? sql`${sortKeys.number} ${way}` : sql`${sortKeys[sort]} ${way}, ${partSummaries.number}`;
}

export interface ListedParts {
  /** Of the stretch that was asked for, in its order. */
  partIds: string[];
  /** By state, of all that matches the text. */
  counts: Record<PartState, number>;
  total: number;
  deleted: number;
}

/** A stretch of a project's list of parts, with counts of the whole, in one statement: so they always belong together. */
export async function listPartIds(
  tx: Transaction,
  projectId: string,
  query: PartFilter & PartOrder & { offset: number; limit: number },
): Promise<ListedParts> {
  const states = readStates(query);
  const matching = sql`from ${partSummaries} where ${matchesText(projectId, query)}`;
  const inStates = states.length === partStates.length ? sql`` : sql`and ${partSummaries.state} = any(${sql.param([...states])}::text[])`;
  // Read twice, since what is counted needs no order and what is ordered may come out of an index; both see the same moment.
  const { rows } = await tx.execute<{ counts: Partial<Record<PartState, number>> | null; ids: string[]; deleted: number }>(sql`
    select
      (select json_object_agg(state, n) from (select ${partSummaries.state} as state, count(*)::int as n ${matching} group by ${partSummaries.state}) by_state) as counts,
      array(select ${partSummaries.partId} ${matching} ${inStates} order by ${orderBy(query)} limit ${query.limit} offset ${query.offset})::text[] as ids,
      (select count(*)::int from ${partSummaries} where ${isOfThisOrganisation(partSummaries)} and ${partSummaries.projectId} = ${projectId} and ${partSummaries.deletedAt} is not null) as deleted`);
  const [row] = rows;
  if (row === undefined) throw new Error('A select of one row gave none.');
  const counts = Object.fromEntries(partStates.map((state) => [state, row.counts?.[state] ?? 0])) as Record<PartState, number>;
  return { partIds: row.ids, counts, total: states.reduce((sum, state) => sum + counts[state], 0), deleted: row.deleted };
}
