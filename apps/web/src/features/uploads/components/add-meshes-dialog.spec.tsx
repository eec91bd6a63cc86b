import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { act, cleanup, fireEvent, render, screen, waitFor } from '@testing-library/react';
import type { Material } from '@masswright/contracts';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { closeUploadDialog, openUploadDialog } from '../model/dialog-state';
import type { UploadEntry } from '../model/upload-entry';
import { nothingStated } from '../model/upload-entry';
import * as queue from '../model/upload-queue';
import { PageDrop } from '../../../components/page-drop';
import { AddMeshesDialog } from './add-meshes-dialog';

const aluminium: Material = {
  id: 'al-6061-t6',
  origin: 'starter',
  name: 'Aluminium 6061-T6',
  group: 'aluminium',
  densityKgM3: 2700,
  densitySpreadKgM3: 27,
  spreadBasis: 'judgement',
  source: '',
  version: 1,
  archivedAt: null,
  usedByParts: 0,
  can: { edit: false },
};
const box = { format: 'stl-binary', compression: null, facets: 12, boundingBox: { min: [0, 0, 0], max: [40, 30, 20] }, volume: 24_000, declaredUnit: null, silhouette: null } as const;
const entry = (key: string, more: Partial<UploadEntry> = {}): UploadEntry => ({
  key,
  projectId: 'project',
  dropId: 'drop',
  fileName: `${key}.stl`,
  folder: '',
  sizeBytes: 684,
  phase: 'sending',
  paused: false,
  sentBytes: 0,
  keptBytes: 0,
  stated: nothingStated,
  matches: [],
  quick: { ...box, boundingBox: { min: [0, 0, 0], max: [40, 30, 20] } },
  ...more,
});

describe('adding meshes', () => {
  const state = vi.spyOn(queue, 'stateUploads').mockImplementation(() => undefined);
  const decide = vi.spyOn(queue, 'decideUploads').mockImplementation(() => undefined);
  const add = vi.spyOn(queue, 'addUploads').mockImplementation(() => 'drop');
  const uploads = vi.spyOn(queue, 'useUploads');
  beforeEach(() => {
    for (const spy of [state, decide, add]) spy.mockClear();
  });
  afterEach(() => {
    closeUploadDialog();
    cleanup();
  });

  function open(entries: readonly UploadEntry[]): void {
    uploads.mockReturnValue(entries);
    openUploadDialog('project');
    const client = new QueryClient({ defaultOptions: { queries: { retry: false, enabled: false } } });
    render(
      <QueryClientProvider client={client}>
        <MemoryRouter>
          <PageDrop onFiles={(files) => openUploadDialog('project', files)}>
            <AddMeshesDialog projectId="project" materials={[aluminium]} />
          </PageDrop>
        </MemoryRouter>
      </QueryClientProvider>,
    );
  }

  it('takes what is dropped on it once, though the page below takes drops too', async () => {
    open([entry('a')]);
    const file = new File(['solid'], 'dropped.stl');
    fireEvent.drop(screen.getByRole('heading', { name: 'What unit is this mesh in?' }), { dataTransfer: { types: ['Files'], items: [], files: [file] } });
    await waitFor(() => expect(add).toHaveBeenCalled());
    expect(add.mock.calls).toEqual([['project', [{ file, folder: '' }]]]);
  });

  it('takes one file for a part’s next revision; of several it sends none and says so', async () => {
    open([]);
    const files = ['one.stl', 'two.stl'].map((name) => ({ file: new File(['solid'], name), folder: '' }));
    act(() => openUploadDialog('project', files, { partId: 'part', number: 7, name: 'Pawl' }));
    expect(await screen.findByText(/these are 2\. Drop the one that is meant/)).toBeTruthy();
    expect(add).not.toHaveBeenCalled();
    act(() => openUploadDialog('project', files.slice(0, 1), { partId: 'part', number: 7, name: 'Pawl' }));
    expect(add).toHaveBeenCalledExactlyOnceWith('project', [{ ...files[0], decision: { as: 'revision', partId: 'part', reason: '' } }]);
  });

  it('asks for the unit with the evidence, and preselects none', () => {
    open([entry('a'), entry('b')]);
    expect(screen.getByRole('heading', { name: 'What unit are these 2 meshes in?' })).toBeTruthy();
    const units = screen.getAllByRole<HTMLInputElement>('radio');
    expect(units).toHaveLength(6);
    expect(units.some((unit) => unit.checked)).toBe(false);
    const millimetres = screen.getByRole('row', { name: /millimetre/ });
    expect(millimetres.textContent).toContain('40.0 mm');
    expect(screen.getByRole('row', { name: /^metre/ }).className).toContain('recedes');
  });
  it('states nothing before the unit is answered, and says so', () => {
    open([entry('a')]);
    fireEvent.click(screen.getByRole('button', { name: 'Choose the unit above' }));
    expect(state).not.toHaveBeenCalled();
    expect(screen.getByRole('alert').textContent).toContain('in which unit');
  });
  it('states one answer for all, with the density that was typed', () => {
    open([entry('a'), entry('b')]);
    fireEvent.change(screen.getByLabelText('Density'), { target: { value: '2.7 g/cm3' } });
    fireEvent.click(screen.getByRole('radio', { name: 'inch' }));
    expect(screen.getByRole('row', { name: /inch/ }).textContent).toMatch(/1\.06 t|1 ?062|1\.06/);
    fireEvent.click(screen.getByRole('button', { name: 'These are inches' }));
    expect(state).toHaveBeenCalledWith(['a', 'b'], { lengthUnit: 'inch', material: null, densityKgM3: 2700 });
  });
  it('takes "later" for an answer and asks no more', () => {
    open([entry('a')]);
    fireEvent.click(screen.getByRole('button', { name: 'Later' }));
    expect(state).not.toHaveBeenCalled();
    expect(screen.queryByRole('radio')).toBeNull();
  });
  it('does not state a density that it could not read', () => {
    open([entry('a')]);
    fireEvent.click(screen.getByRole('radio', { name: 'millimetre' }));
    fireEvent.change(screen.getByLabelText('Density'), { target: { value: '2,7' } });
    fireEvent.click(screen.getByRole('button', { name: 'It is in millimetres' }));
    expect(state).not.toHaveBeenCalled();
  });
  it('lets each file have its own unit', () => {
    open([entry('a'), entry('b')]);
    fireEvent.click(screen.getByRole('button', { name: 'Decide file by file' }));
    fireEvent.change(screen.getByLabelText('Unit of b.stl'), { target: { value: 'cm' } });
    expect(state).toHaveBeenLastCalledWith(['b'], { lengthUnit: 'cm' });
  });
  it('asks whether a file of a known name is the next revision, with the reason, for all at once', () => {
    const match = (fileName: string) => ({ fileName, partId: `part of ${fileName}`, number: 7, name: 'Pawl', letter: 'A', storedFileName: fileName, folder: '', sizeBytes: 9, sha256: null, sameCase: true });
    const known = [entry('a', { matches: [match('a.stl')] }), entry('b', { matches: [match('b.stl')] })];
    open(known);
    expect(screen.queryByRole('radio')).toBeNull();
    fireEvent.change(screen.getByLabelText('Reason for the revision'), { target: { value: 'thicker wall' } });
    fireEvent.click(screen.getByRole('button', { name: 'Next revisions, all of them' }));
    expect(decide).toHaveBeenCalledOnce();
    const [keys, decision] = decide.mock.calls[0] ?? [];
    expect(keys).toEqual(['a', 'b']);
    expect(known.map((one) => decision?.(one))).toEqual([
      { as: 'revision', partId: 'part of a.stl', reason: 'thicker wall' },
      { as: 'revision', partId: 'part of b.stl', reason: 'thicker wall' },
    ]);
  });
  it('sends at once what is chosen, and leaves other kinds out until the person says otherwise', async () => {
    open([]);
    const chosen = [new File(['x'], 'plate.stl'), new File(['x'], 'notes.txt')];
    fireEvent.change(screen.getByLabelText('Mesh files'), { target: { files: chosen } });
    await waitFor(() => expect(add).toHaveBeenCalledWith('project', [{ file: chosen[0], folder: '' }]));
    fireEvent.click(screen.getByRole('button', { name: 'Send it all the same' }));
    expect(add).toHaveBeenLastCalledWith('project', [{ file: chosen[1], folder: '' }]);
  });
});
