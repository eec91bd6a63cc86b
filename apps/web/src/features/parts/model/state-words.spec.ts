import { partStates } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { listChips, stateTexts, wantingStates } from './state-words';

const counts = { measuring: 3, failed: 2, 'not-defensible': 1, 'unit-missing': 9, 'unit-doubt': 0, 'density-missing': 0, 'weight-disagrees': 0, ready: 199 };

describe('states of parts', () => {
  it('each is said in words of its own', () => {
    expect(new Set(partStates.map((state) => stateTexts[state].word)).size).toBe(partStates.length);
  });
  it('chips say how many parts each would leave', () => {
    expect(listChips({ counts, deleted: 2 }, { states: '', deleted: false }).map(({ name, count }) => `${name} ${count}`)).toEqual(['All 214', 'Being measured 3', 'Needs a look 12', 'Ready 199', 'Deleted 2']);
  });
  it('chips keep their counts among the deleted, and have none before they are read', () => {
    expect(listChips({ counts, deleted: 2 }, { states: '', deleted: true }).map(({ count }) => count)).toEqual([214, 3, 12, 199, 2]);
    expect(listChips({ counts: undefined, deleted: 2 }, { states: '', deleted: true }).map(({ count }) => count)).toEqual([undefined, undefined, undefined, undefined, 2]);
  });
  it('single states stand open once their group is chosen, and stay so while one of them is', () => {
    const open = ['Not measured', 'Not defensible', 'Unit missing'];
    for (const states of [wantingStates.join(), 'failed']) {
      const singles = listChips({ counts, deleted: 0 }, { states, deleted: false }).filter(({ isSingle }) => isSingle);
      expect(singles.map(({ name }) => name)).toEqual(open);
    }
    expect(listChips({ counts, deleted: 0 }, { states: 'ready', deleted: false }).some(({ isSingle }) => isSingle)).toBe(false);
  });
});
