import type { SettingsChange } from '@masswright/contracts';
import { beforeEach, describe, expect, it } from 'vitest';
import { createChangeSteps, describeLeft, describeStep, type ChangeSteps } from './change-steps';
import type { ChosenParts } from './selection';

const change = (id: string, reverses: string | null = null): SettingsChange => ({ id, projectId: 'reel', changed: 12, unchanged: 0, left: [], reverses, createdAt: '2026-11-28T14:06:00Z', createdBy: 'Ines Marsh' });

describe('steps of a list', () => {
  let asked: string[];
  let refusal: Error | undefined;
  let steps: ChangeSteps;
  const note = <Answer>(words: string, answer: Answer): Promise<Answer> => {
    if (refusal) return Promise.reject(refusal);
    asked.push(words);
    return Promise.resolve(answer);
  };
  const idsOf = (parts: ChosenParts): string[] => ('ids' in parts ? parts.ids : []);
  beforeEach(() => {
    asked = [];
    refusal = undefined;
    steps = createChangeSteps({
      undo: (id) => note(`undo ${id}`, change(`${id}'`, id)),
      remove: (parts) => note('delete', { ids: idsOf(parts) }),
      restore: (parts) => note('restore', { ids: idsOf(parts) }),
      isPassing: (error) => String(error).includes('connection'),
      describe: String,
    });
  });
  const unit = (id: string) => () => Promise.resolve({ kind: 'setting', change: change(id), about: 'Unit', to: 'millimetre' } as const);
  const sentence = (): string => {
    const { last } = steps.get();
    return last ? describeStep(last) : '';
  };

  it('a change is taken back, and done again by taking that back', async () => {
    await steps.take(unit('1'));
    expect(sentence()).toBe('Unit of 12 parts changed to millimetre.');
    await steps.undo();
    expect(sentence()).toBe('Unit of 12 parts put back as before.');
    expect(steps.get()).toMatchObject({ canUndo: false, canRedo: true });
    await steps.redo();
    expect(asked).toEqual(['undo 1', "undo 1'"]);
    expect(sentence()).toBe('Unit of 12 parts changed to millimetre.');
    await steps.undo();
    expect(asked.at(-1)).toBe("undo 1''");
  });

  it('deleted parts are restored by undo, and deleted by redo', async () => {
    await steps.take(() => Promise.resolve({ kind: 'deleted', ids: ['a', 'b', 'c'] }));
    expect(sentence()).toBe('3 parts deleted; restorable for 30 days.');
    await steps.undo();
    expect(sentence()).toBe('3 parts restored.');
    await steps.redo();
    expect(asked).toEqual(['restore', 'delete']);
  });

  it('are taken back one behind the other, and another change ends what could be done again', async () => {
    await steps.take(unit('1'));
    await steps.take(unit('2'));
    await steps.undo();
    await steps.undo();
    expect(asked).toEqual(['undo 2', 'undo 1']);
    await steps.take(unit('3'));
    expect(steps.get()).toMatchObject({ canUndo: true, canRedo: false });
  });

  it('a lost connection is said, and the step is still there', async () => {
    await steps.take(unit('1'));
    refusal = new Error('The connection was lost.');
    await steps.undo();
    expect(steps.get()).toMatchObject({ problem: 'Error: The connection was lost.', canUndo: true, isBusy: false });
    refusal = undefined;
    await steps.undo();
    expect(asked).toEqual(['undo 1']);
  });

  it('a refusal is said, and does not stand before the step behind it', async () => {
    await steps.take(unit('1'));
    await steps.take(unit('2'));
    refusal = new Error('It was taken back already.');
    await steps.undo();
    expect(steps.get()).toMatchObject({ problem: 'Error: It was taken back already.', canUndo: true, canRedo: false, isBusy: false });
    refusal = undefined;
    await steps.undo();
    expect(asked).toEqual(['undo 1']);
  });

  it('of parts that others restored first asks nothing', async () => {
    await steps.take(() => Promise.resolve({ kind: 'deleted', ids: [] }));
    await steps.undo();
    expect(asked).toEqual([]);
  });

  it('with nothing to take back, undo asks nothing', async () => {
    await steps.undo();
    await steps.redo();
    expect(asked).toEqual([]);
  });

  it('names the parts that were left, and because of whom', () => {
    const left = ['Drum', 'Pawl', 'Knob', 'Cover'].map((name, index) => ({ partId: name, number: index, name, changedBy: 'Tom Vale' }));
    expect(describeLeft({ ...change('1'), left })).toBe('Left as they are, because they were changed or deleted meanwhile: Drum (Tom Vale), Pawl (Tom Vale), Knob (Tom Vale) and 1 more.');
    expect(describeLeft({ ...change('1'), left: [{ partId: 'drum', number: 1, name: 'Drum', changedBy: '' }] })).toBe('Left as they are, because they were changed or deleted meanwhile: Drum.');
    expect(describeLeft(change('1'))).toBe('');
  });
});
