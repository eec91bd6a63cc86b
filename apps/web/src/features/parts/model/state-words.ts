import { partStates, type PartList, type PartRow, type PartState } from '@masswright/contracts';
import type { Tone } from '../../../components/status-tag';
import { askUnit } from './doubt-words';

/** What a part's state is called in its row, and the tone of it. */
export const stateTexts: Record<PartState, { tone: Tone; word: string }> = {
  measuring: { tone: 'busy', word: 'Being measured' },
  failed: { tone: 'wrong', word: 'Not measured' },
  'not-defensible': { tone: 'wrong', word: 'Not defensible' },
  'unit-missing': { tone: 'doubt', word: 'Unit missing' },
  'unit-doubt': { tone: 'doubt', word: 'Unit in doubt' },
  'density-missing': { tone: 'doubt', word: 'Density missing' },
  'weight-disagrees': { tone: 'doubt', word: 'Weight disagrees' },
  ready: { tone: 'agreement', word: 'Ready' },
};

/** The states in which a part wants something of a person. */
export const wantingStates: readonly PartState[] = partStates.filter((state) => state !== 'measuring' && state !== 'ready');

export interface StateChip {
  name: string;
  /** Undefined where it is not known yet. */
  count: number | undefined;
  states: string;
  deleted: boolean;
  /** One state out of a group that stands before it. */
  isSingle?: boolean;
}

const sum = (counts: PartList['counts'], states: readonly PartState[]): number => states.reduce((total, state) => total + counts[state], 0);

export interface ChipCounts {
  /** Of the parts that are not deleted; undefined before they are read. */
  counts: PartList['counts'] | undefined;
  deleted: number | undefined;
}

/** Ways to narrow the list by state, with how many parts each leaves. Single states stand open once their group, or one of them, is chosen. */
export function listChips({ counts, deleted }: ChipCounts, chosen: { states: string; deleted: boolean }): StateChip[] {
  const group = wantingStates.join();
  const isOpen = !chosen.deleted && chosen.states !== '' && chosen.states.split(',').every((state) => (wantingStates as readonly string[]).includes(state));
  const singles = wantingStates.filter((state) => (counts && counts[state] > 0) || chosen.states === state);
  const count = (states: readonly PartState[]): number | undefined => counts && sum(counts, states);
  return [
    { name: 'All', count: count(partStates), states: '', deleted: false },
    { name: 'Being measured', count: count(['measuring']), states: 'measuring', deleted: false },
    { name: 'Needs a look', count: count(wantingStates), states: group, deleted: false },
    ...(isOpen ? singles.map((state) => ({ name: stateTexts[state].word, count: count([state]), states: state, deleted: false, isSingle: true })) : []),
    { name: 'Ready', count: count(['ready']), states: 'ready', deleted: false },
    { name: 'Deleted', count: deleted, states: '', deleted: true },
  ];
}

/** What stands in a row where its figures would: why there are none, or which of them are in doubt; with what the person can do about it. */
export type RowNote = { text: string; ask?: 'failed' | 'unit' | 'unit-doubt' | 'density' };

export function findNote(row: PartRow): RowNote | undefined {
  const { run } = row.revision;
  switch (row.state) {
    case 'failed':
      return { text: run.error?.message ?? 'The file could not be measured.', ask: 'failed' };
    case 'unit-missing':
      return { text: 'No size and no mass before the unit is stated.', ask: 'unit' };
    case 'density-missing':
      return { text: 'State a material or a density: then there is a mass.', ask: 'density' };
    case 'not-defensible':
      return { text: 'No figures: the mesh has no inside that could be defended.' };
    case 'measuring':
      // Figures that stand while the rest is examined stay in their columns.
      if (row.soundness === null) return { text: '' };
      if (row.revision.setting.lengthUnit === null) return { text: 'No size and no mass before the unit is stated.', ask: 'unit' };
      return row.soundness.defensible ? undefined : { text: 'No figures so far: the edges of the mesh do not cancel.' };
    case 'unit-doubt':
      return row.unitDoubt ? { text: askUnit(row.unitDoubt), ask: 'unit-doubt' } : undefined;
    case 'weight-disagrees':
    case 'ready':
      return undefined;
  }
}
