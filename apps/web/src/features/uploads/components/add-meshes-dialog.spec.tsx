import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { closeUploadDialog, openUploadDialog } from '../model/dialog-state';
import * as queue from '../model/upload-queue';
import { AddMeshesDialog } from './add-meshes-dialog';

const mesh = new File([new Uint8Array(684)], 'plate.stl');

function open(files: readonly File[] = [mesh]): void {
  openUploadDialog('project', files);
  render(
    <MemoryRouter>
      <AddMeshesDialog projectId="project" />
    </MemoryRouter>,
  );
}

describe('adding meshes', () => {
  const add = vi.spyOn(queue, 'addUploads').mockImplementation(() => undefined);
  beforeEach(() => void add.mockClear());
  afterEach(() => {
    closeUploadDialog();
    cleanup();
  });

  it('asks for the unit and preselects none', () => {
    open();
    const units = screen.getAllByRole<HTMLInputElement>('radio');
    expect(units).toHaveLength(7);
    expect(units.some((unit) => unit.checked)).toBe(false);
  });
  it('sends nothing before the unit is answered, and says so', () => {
    open();
    fireEvent.click(screen.getByRole('button', { name: 'Add 1 mesh' }));
    expect(add).not.toHaveBeenCalled();
    expect(screen.getByRole('alert').textContent).toContain('in which unit');
  });
  it('sends the files with unit and density', () => {
    open();
    fireEvent.click(screen.getByRole('radio', { name: /^inch/ }));
    fireEvent.change(screen.getByLabelText('Density'), { target: { value: '2.7 g/cm3' } });
    fireEvent.click(screen.getByRole('button', { name: 'Add 1 mesh' }));
    expect(add).toHaveBeenCalledWith('project', [mesh], { lengthUnit: 'inch', densityKgM3: 2700 });
  });
  it('takes "not known yet" for an answer, and no density for none', () => {
    open();
    fireEvent.click(screen.getByRole('radio', { name: /^not known yet/ }));
    fireEvent.click(screen.getByRole('button', { name: 'Add 1 mesh' }));
    expect(add).toHaveBeenCalledWith('project', [mesh], { lengthUnit: null, densityKgM3: null });
  });
  it('does not send a density that it could not read', () => {
    open();
    fireEvent.click(screen.getByRole('radio', { name: /^millimetre/ }));
    fireEvent.change(screen.getByLabelText('Density'), { target: { value: '2,7' } });
    fireEvent.click(screen.getByRole('button', { name: 'Add 1 mesh' }));
    expect(add).not.toHaveBeenCalled();
  });
  it('leaves a file out that was chosen by mistake', () => {
    open([mesh, new File(['x'], 'notes.stl')]);
    fireEvent.click(screen.getByRole('button', { name: 'Leave out notes.stl' }));
    expect(screen.getAllByRole('button', { name: 'Add 1 mesh' })).toHaveLength(1);
  });
});
