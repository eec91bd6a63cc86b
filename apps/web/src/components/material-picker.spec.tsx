import type { Material } from '@masswright/contracts';
import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import { useState } from 'react';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { MaterialPicker } from './material-picker';

function makeMaterial(name: string, densityKgM3: number, archivedAt: string | null = null): Material {
  return { id: name.toLowerCase().replace(/\W/g, '-'), name, group: 'aluminium', densityKgM3, densitySpreadKgM3: 27, spreadBasis: 'judgement', source: '', origin: 'starter', version: 1, archivedAt, usedByParts: 0, can: { edit: false } };
}
const library = [makeMaterial('Aluminium 6061-T6', 2700), makeMaterial('Aluminium 7075-T6', 2810), makeMaterial('Aluminium, old', 2600, '2026-11-28T14:06:00Z')];

let chosen: (Material | null)[];
function Page() {
  const [value, setValue] = useState<Material | null>(library[1] ?? null);
  return (
    <MaterialPicker
      label="Material"
      materials={library}
      value={value}
      onChange={(material) => {
        chosen.push(material);
        setValue(material);
      }}
    />
  );
}

describe('the picker of a material', () => {
  beforeEach(() => {
    chosen = [];
    render(<Page />);
  });
  afterEach(cleanup);
  const field = (): HTMLInputElement => screen.getByRole('combobox', { name: 'Material' });

  it('names what is chosen, and opens on it', () => {
    expect(field().value).toBe('Aluminium 7075-T6');
    fireEvent.click(field());
    expect(screen.getAllByRole('option').map(({ textContent }) => textContent)).toEqual(['Aluminium 6061-T62\u2009700 ± 27 kg/m³', 'Aluminium 7075-T62\u2009810 ± 27 kg/m³']);
    expect(screen.getByRole('option', { selected: true }).id).toBe(field().getAttribute('aria-activedescendant'));
  });
  it('takes what a few letters and Enter mean', () => {
    fireEvent.change(field(), { target: { value: '606' } });
    fireEvent.keyDown(field(), { key: 'Enter' });
    expect(chosen.map((material) => material?.densityKgM3)).toEqual([2700]);
    expect(field().value).toBe('Aluminium 6061-T6');
    expect(field().getAttribute('aria-expanded')).toBe('false');
  });
  it('goes through the list by arrows, around its ends', () => {
    fireEvent.keyDown(field(), { key: 'ArrowDown' });
    fireEvent.keyDown(field(), { key: 'ArrowDown' });
    fireEvent.keyDown(field(), { key: 'Enter' });
    expect(chosen.map((material) => material?.name)).toEqual(['Aluminium 6061-T6']);
  });
  it('leaves everything as it was on Escape', () => {
    fireEvent.change(field(), { target: { value: '606' } });
    fireEvent.keyDown(field(), { key: 'Escape' });
    expect(field().value).toBe('Aluminium 7075-T6');
    expect(chosen).toEqual([]);
  });
  it('takes the name away only where the field is left empty', () => {
    fireEvent.change(field(), { target: { value: '' } });
    expect(chosen).toEqual([]);
    fireEvent.blur(field());
    expect(chosen).toEqual([null]);
  });
  it('does not offer what is archived, and says when nothing fits', () => {
    fireEvent.change(field(), { target: { value: 'old' } });
    expect(screen.queryAllByRole('option')).toEqual([]);
    expect(screen.getByRole('status').textContent).toContain('No material has that in its name.');
    fireEvent.keyDown(field(), { key: 'Enter' });
    expect(chosen).toEqual([]);
  });
});
