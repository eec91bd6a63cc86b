import type { PartList, PartRow } from '@masswright/contracts';
import { queryOptions, useQueries, useQuery, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { api, unwrapAs } from '../../../lib/api';
import { writeQuery, type ListQuery } from '../model/list-address';
import { computeColumnRooms, joinColumnRooms, type ColumnRooms } from '../model/row-figures';
import { findStretches, placeRow, stretchRows } from '../model/stretches';
import { partsKey } from './keys';

const listKey = (projectId: string, query: ListQuery) => [...partsKey(projectId), writeQuery(query).toString()] as const;

/** The client's types forget which states are counted; the contract says all. */
type LooseList = Omit<PartList, 'counts'> & { counts: Record<string, number> };

function stretchQuery(projectId: string, query: ListQuery, stretch: number) {
  return queryOptions({
    queryKey: [...listKey(projectId, query), stretch] as const,
    queryFn: async ({ signal }): Promise<PartList> => {
      const { text, states, deleted, sort, direction } = query;
      const asked = { text, states, deleted: deleted ? ('true' as const) : undefined, sort, direction, offset: stretch * stretchRows, limit: stretchRows };
      const list = await unwrapAs<LooseList>(api.GET('/api/v1/projects/{projectId}/parts', { params: { path: { projectId }, query: asked }, signal }));
      return list;
    },
  });
}

export type ListHead = Pick<PartList, 'total' | 'counts' | 'deleted'>;

/** The rows of a list that have been read, and what was last heard of the list as a whole. */
export interface ReadList {
  query: ListQuery;
  head: ListHead | undefined;
  rooms: ColumnRooms;
  getRow: (index: number) => PartRow | undefined;
  countRead: () => number;
  /** All that are read, with their places. */
  listRead: () => { index: number; row: PartRow }[];
}

/** A stretch is read anew as a whole, so what follows from it is worked out once: there may be a hundred, and each has a hundred rows. */
const roomsOfStretch = new WeakMap<PartList, ColumnRooms>();
function findRooms(list: PartList): ColumnRooms {
  const known = roomsOfStretch.get(list) ?? computeColumnRooms(list.items);
  roomsOfStretch.set(list, known);
  return known;
}

function openRead(client: QueryClient, projectId: string, query: ListQuery): ReadList {
  const stretches = client
    .getQueryCache()
    .findAll({ queryKey: listKey(projectId, query) })
    .flatMap(({ queryKey, state }) => (state.data === undefined ? [] : [{ stretch: Number(queryKey.at(-1)), list: state.data as PartList, at: state.dataUpdatedAt }]));
  const lists = new Map(stretches.map(({ stretch, list }) => [stretch, list]));
  const latest = stretches.reduce<(typeof stretches)[number] | undefined>((best, one) => (best && best.at >= one.at ? best : one), undefined);
  return {
    query,
    head: latest?.list,
    rooms: joinColumnRooms(stretches.map(({ list }) => findRooms(list))),
    getRow: (index) => {
      const { stretch, place } = placeRow(index);
      return lists.get(stretch)?.items[place];
    },
    countRead: () => stretches.reduce((sum, { list }) => sum + list.items.length, 0),
    listRead: () =>
      [...lists]
        .sort(([one], [other]) => one - other)
        .flatMap(([stretch, { items }]) => items.map((row, place) => ({ index: stretch * stretchRows + place, row }))),
  };
}

/** Rows are looked up in the cache and not in the results, so what changes there must be told. */
const notifyOnChangeProps: ('data' | 'error')[] = ['data', 'error'];

/**
 * The rows of a project's list that are looked at, from `first` to `last`; others are read as they come into view. While the first answer to
 * another filter or order is on its way the rows of the one before stay, so that nothing jumps.
 */
export function usePartList(projectId: string, query: ListQuery, range: { first: number; last: number }) {
  const client = useQueryClient();
  const [shown, setShown] = useState(query);
  const isShown = writeQuery(shown).toString() === writeQuery(query).toString();
  const before = openRead(client, projectId, shown);
  const wanted = isShown ? findStretches(range.first, range.last, before.head?.total) : [0];
  const results = useQueries({ queries: wanted.map((stretch) => ({ ...stretchQuery(projectId, query, stretch), notifyOnChangeProps })) });
  if (!isShown && results[0]?.data) setShown(query);
  const failed = results.find(({ error }) => error !== null);
  return {
    list: openRead(client, projectId, shown),
    /** Another filter or order is asked for than the one that is seen. */
    isTurning: !isShown,
    error: failed?.error ?? null,
    retry: () => results.forEach(({ error, refetch }) => void (error && refetch())),
  };
}

/** How many parts are in each state: told with the list, and beside the deleted ones read for themselves. */
export function usePartCounts(projectId: string, view: ListQuery, list: ReadList): PartList['counts'] | undefined {
  const beside = useQuery({ ...stretchQuery(projectId, { ...view, states: '', deleted: false }, 0), enabled: view.deleted || list.query.deleted });
  return list.query.deleted ? beside.data?.counts : list.head?.counts;
}

/** The ids of rows that stand at some places, read where they are not known yet. */
export async function readRowIds(client: QueryClient, projectId: string, query: ListQuery, indices: readonly number[]): Promise<string[]> {
  const stretches = [...new Set(indices.map((index) => placeRow(index).stretch))];
  const lists = await Promise.all(stretches.map(async (stretch) => [stretch, await client.fetchQuery({ ...stretchQuery(projectId, query, stretch), staleTime: 30_000 })] as const));
  const byStretch = new Map(lists);
  return indices.flatMap((index) => {
    const { stretch, place } = placeRow(index);
    const row = byStretch.get(stretch)?.items[place];
    return row ? [row.id] : [];
  });
}
