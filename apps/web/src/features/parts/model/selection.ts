import type { PartFilter } from '@masswright/contracts';

/**
 * Which parts are chosen: one by one, or all that the filter leaves but some. The second holds for rows, too, that no one has looked at yet.
 */
export type Selection = { kind: 'some'; ids: ReadonlySet<string> } | { kind: 'all'; except: ReadonlySet<string> };

export const nothing: Selection = { kind: 'some', ids: new Set() };
export const everything: Selection = { kind: 'all', except: new Set() };

export function isSelected(selection: Selection, id: string): boolean {
  return selection.kind === 'some' ? selection.ids.has(id) : !selection.except.has(id);
}

/** How many of `total` rows are chosen. */
export function countSelected(selection: Selection, total: number): number {
  return selection.kind === 'some' ? selection.ids.size : Math.max(0, total - selection.except.size);
}

/** With some rows chosen, or not chosen, and the others as they were. */
export function withSelected(selection: Selection, ids: readonly string[], chosen: boolean): Selection {
  const set = new Set(selection.kind === 'some' ? selection.ids : selection.except);
  for (const id of ids) {
    if (chosen === (selection.kind === 'some')) set.add(id);
    else set.delete(id);
  }
  return selection.kind === 'some' ? { kind: 'some', ids: set } : { kind: 'all', except: set };
}

export function toggle(selection: Selection, id: string): Selection {
  return withSelected(selection, [id], !isSelected(selection, id));
}

/** What the api is told of a selection, nothing left to be guessed. */
export type ChosenParts = { ids: string[] } | { filter: PartFilter; except: string[]; expected?: number };

/**
 * The filter is the one under which all were chosen, `total` how many rows the person sees that it leaves: the api refuses where there are others by then.
 */
export function writeSelection(selection: Selection, { text, states, deleted }: PartFilter, total?: number): ChosenParts {
  if (selection.kind === 'some') return { ids: [...selection.ids] };
  return { filter: { text, states, deleted }, except: [...selection.except], ...(total === undefined ? {} : { expected: countSelected(selection, total) }) };
}

/** The rows from one to another, both with them, whichever comes first. */
export function listRange(from: number, to: number): number[] {
  const first = Math.min(from, to);
  return Array.from({ length: Math.abs(to - from) + 1 }, (_, step) => first + step);
}
