import type { PartRow } from '@masswright/contracts';
import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { describeRatio, findRowNote, RowNote } from './row-note';

const row = (change: Partial<PartRow>, lengthUnit: 'mm' | 'inch' | null = 'inch'): PartRow =>
  ({
    id: 'part',
    name: 'Drum',
    state: 'ready',
    unitDoubt: null,
    ...change,
    revision: { run: { state: 'failed', error: { code: 'file-truncated', message: 'The file was cut off.', at: null } }, setting: { lengthUnit, version: 3 } },
  }) as PartRow;
const doubtful = row({ state: 'unit-doubt', unitDoubt: { lengthUnit: 'mm', volumeRatio: 16387.06 } });

let done: string[] = [];
function open(shown: PartRow, canEdit = true): void {
  done = [];
  const note = findRowNote(shown);
  if (!note) throw new Error('The row has figures.');
  const actions = {
    onStateUnit: (_: PartRow, unit: string) => void done.push(unit),
    onMeasureAgain: () => void done.push('again'),
    onReplace: () => void done.push('replace'),
  };
  render(<RowNote row={shown} note={note} actions={canEdit ? actions : undefined} tabIndex={0} />);
}
const press = (name: string): void => void fireEvent.click(screen.getByRole('button', { name }));

describe('what a row says in the place of its figures', () => {
  afterEach(cleanup);
  it('a doubtful unit is asked about, and either answer is one press away', () => {
    open(doubtful);
    expect(screen.getByText(/^16.387 times the volume before: millimetres\?$/)).toBeTruthy();
    press('Drum: these are millimetres');
    press('Drum: keep inches');
    expect(done).toEqual(['mm', 'inch']);
  });
  it('a ratio below one is said the other way round', () => {
    expect(describeRatio({ lengthUnit: 'inch', volumeRatio: 1 / 16387.06 })).toBe('1/16\u2009387 of');
  });
  it('a file that failed says why, can be measured again and be replaced', () => {
    open(row({ state: 'failed' }));
    expect(screen.getByText('The file was cut off.')).toBeTruthy();
    press('Measure again');
    press('Replace the file');
    expect(done).toEqual(['again', 'replace']);
  });
  it('a missing unit can be stated from the row', () => {
    open(row({ state: 'unit-missing' }, null));
    expect(screen.getByRole('button', { name: 'State the unit of Drum' })).toBeTruthy();
  });
  it('a reader is told, and asked nothing', () => {
    open(doubtful, false);
    expect(screen.queryAllByRole('button')).toEqual([]);
  });
  it('a part that has its figures, or a weight that contradicts them, has no sentence in their place', () => {
    expect(findRowNote(row({ state: 'ready' }))).toBeUndefined();
    expect(findRowNote(row({ state: 'weight-disagrees' }))).toBeUndefined();
  });
});
