import type { PartRow } from '@masswright/contracts';
import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import type { BulkChange } from '../model/bulk-change';
import { findNote } from '../model/state-words';
import { RowNote } from './row-note';

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

const standing = { defensible: true, closed: true, oriented: true, turned: false, selfIntersections: null, overlapping: false, examined: 'integrals' } as const;

let done: string[] = [];
function open(shown: PartRow, canEdit = true): void {
  done = [];
  const note = findNote(shown);
  if (!note) throw new Error('The row has figures.');
  const actions = {
    onStateUnit: (_: PartRow, unit: string) => void done.push(unit),
    onChange: (_: PartRow, { change }: BulkChange) => void done.push(JSON.stringify(change)),
    materials: [],
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
    expect(screen.getByText(/^About 16.000 times the volume before: millimetres\?$/)).toBeTruthy();
    press('Yes, millimetres: Drum');
    press('Keep inches: Drum');
    expect(done).toEqual(['mm', 'inch']);
  });
  it('where the volumes speak for none of the units, all are offered', () => {
    open(row({ state: 'unit-doubt', unitDoubt: { lengthUnit: null, volumeRatio: 1 / 28316.8 } }));
    expect(screen.getByText(/^About 1\/28.000 of the volume before: in which unit is it\?$/)).toBeTruthy();
    expect(screen.queryByRole('button', { name: /^Yes/ })).toBeNull();
    fireEvent.click(screen.getByRole('button', { name: 'State the unit: Drum' }));
    fireEvent.click(screen.getByRole('menuitem', { name: /^foot/ }));
    press('Keep inches: Drum');
    expect(done).toEqual(['foot', 'inch']);
  });
  it('a missing density is typed, or its material chosen, from the row', () => {
    open(row({ state: 'density-missing' }));
    press('State the density: Drum');
    fireEvent.change(screen.getByLabelText('or a density'), { target: { value: '2.7 g/cm3' } });
    press('Set the density');
    expect(done).toEqual([JSON.stringify({ densityKgM3: 2700, densitySpreadKgM3: null })]);
  });
  it('a file that failed says why, can be measured again and be replaced', () => {
    open(row({ state: 'failed' }));
    expect(screen.getByText('The file was cut off.')).toBeTruthy();
    press('Measure again: Drum');
    press('Replace the file: Drum');
    expect(done).toEqual(['again', 'replace']);
  });
  it('a missing unit can be stated from the row', () => {
    open(row({ state: 'unit-missing' }, null));
    expect(screen.getByRole('button', { name: 'State the unit: Drum' })).toBeTruthy();
  });
  it('a reader is told, and asked nothing', () => {
    open(doubtful, false);
    expect(screen.queryAllByRole('button')).toEqual([]);
  });
  it('a part that has its figures, or a weight that contradicts them, has no sentence in their place', () => {
    expect(findNote(row({ state: 'ready' }))).toBeUndefined();
    expect(findNote(row({ state: 'weight-disagrees' }))).toBeUndefined();
  });

  it('figures that stand while the rest is examined stay in their columns; the unit is asked for all the same', () => {
    expect(findNote(row({ state: 'measuring', soundness: standing }))).toBeUndefined();
    expect(findNote(row({ state: 'measuring', soundness: null }))).toEqual({ text: '' });
    expect(findNote(row({ state: 'measuring', soundness: standing }, null))).toMatchObject({ ask: 'unit' });
    expect(findNote(row({ state: 'measuring', soundness: { ...standing, closed: null, oriented: false, defensible: false } }))?.text).toContain('do not cancel');
  });
});
