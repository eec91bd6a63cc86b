import { partSorts, partStates, type PartFilter, type PartOrder, type PartState } from '@masswright/contracts';
import { isStandard, readColumns, standardColumns, writeColumns, type ColumnId } from './columns';

/** What the list shows: all of it stands in the address of the page. */
export interface ListView extends PartFilter, PartOrder {
  columns: readonly ColumnId[];
}
/** The part of it that decides which rows there are, and in which order. */
export type ListQuery = PartFilter & PartOrder;

const isOneOf = <Name extends string>(names: readonly Name[], text: string | null): text is Name => names.some((name) => name === text);

export function readStates(states: string): PartState[] {
  return states.split(',').filter((name): name is PartState => isOneOf(partStates, name));
}

/** What an address says; what it says wrongly, or not at all, is as usual. */
export function readAddress(parameters: URLSearchParams, rememberedColumns: readonly ColumnId[] | undefined): ListView {
  const sort = parameters.get('sort');
  return {
    text: (parameters.get('text') ?? '').slice(0, 200),
    states: readStates(parameters.get('states') ?? '').join(),
    deleted: parameters.get('deleted') === 'true',
    sort: isOneOf(partSorts, sort) ? sort : 'number',
    direction: parameters.get('direction') === 'descending' ? 'descending' : 'ascending',
    columns: readColumns(parameters.get('columns')) ?? rememberedColumns ?? standardColumns,
  };
}

/** The query that the api is asked with, without what is as usual. */
export function writeQuery({ text, states, deleted, sort, direction }: ListQuery): URLSearchParams {
  const parameters = new URLSearchParams();
  if (text !== '') parameters.set('text', text);
  if (states !== '') parameters.set('states', states);
  if (deleted) parameters.set('deleted', 'true');
  if (sort !== 'number') parameters.set('sort', sort);
  if (direction !== 'ascending') parameters.set('direction', direction);
  return parameters;
}

export function writeAddress(view: ListView): URLSearchParams {
  const parameters = writeQuery(view);
  if (!isStandard(view.columns)) parameters.set('columns', writeColumns(view.columns));
  return parameters;
}

/** A click on a column's head: sorts by it, and the other way round the next time. */
export function turnOrder(before: PartOrder, sort: PartOrder['sort']): PartOrder {
  return { sort, direction: before.sort === sort && before.direction === 'ascending' ? 'descending' : 'ascending' };
}
