import type { Material, Measurement, Part, Setting } from '@masswright/contracts';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, fireEvent, render, screen, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { MemoryRouter } from 'react-router-dom';
import { useStore } from '../../../lib/store';
import { createSettingEditor, type SettingEditor } from '../model/setting-editor';
import { makeMeasurement } from '../model/testing/measurements';
import { PartStatement } from './part-statement';

/** A block of 30 × 20 × 10 units. */
const block = makeMeasurement();

const openBlock: Measurement = {
  ...block,
  volume: null,
  soundness: { ...block.soundness, closed: false, oriented: false, defensible: false, boundaryEdges: 4, findings: [{ kind: 'boundary-edges', count: 4, facets: [2, 3], lines: [[0, 0, 10, 30, 0, 10]] }] },
};

const metal: Setting = { lengthUnit: 'mm', densityKgM3: 2700, densitySpreadKgM3: null, material: null, weighing: null, axis: { kind: 'mesh', along: 'z' }, drive: null };

const aluminium: Material = {
  id: 'al-6061-t6', name: 'Aluminium 6061-T6', group: 'aluminium', densityKgM3: 2700, densitySpreadKgM3: 27, spreadBasis: 'judgement', source: 'a handbook',
  origin: 'starter', version: 1, archivedAt: null, usedByParts: 0, can: { edit: false },
};
const steel: Material = { ...aluminium, id: 'steel-4140', name: 'Steel 4140', group: 'steel', densityKgM3: 7850, densitySpreadKgM3: 79 };
const made: Pick<Setting, 'material' | 'densityKgM3' | 'densitySpreadKgM3'> = { material: { id: aluminium.id, name: aluminium.name }, densityKgM3: 2700, densitySpreadKgM3: 27 };

function makePart(measurement: Measurement | null, setting: Setting, edit: boolean): Part {
  const head = { id: 'revision', letter: 'A', fileName: 'block.stl', reason: '', createdAt: '2026-11-28T14:06:00Z', createdBy: 'Ines Marsh' };
  return {
    id: 'part',
    projectId: 'project',
    projectName: 'Reel',
    number: 4,
    name: 'Block',
    state: measurement ? 'ready' : 'measuring',
    deletedAt: null,
    revisions: [head],
    unitDoubt: null,
    sameBytes: [],
    can: { edit },
    revision: {
      ...head,
      folder: '',
      sizeBytes: 684,
      run: { state: measurement ? 'done' : 'running', stage: measurement ? 'storing' : 'measuring', progress: measurement ? 1 : 0.4, error: null, finishedAt: measurement ? '2026-11-28T14:06:02Z' : null, durationMs: measurement ? 41 : null },
      setting: { ...setting, version: 1, changedAt: '2026-11-28T14:06:00Z', changedBy: 'Ines Marsh', unitStated: null },
      sha256: measurement ? 'ab'.repeat(32) : null,
      format: measurement?.format ?? null,
      compression: null,
      measurement,
      measuredBefore: null,
    },
  };
}

function Page({ part, editor }: { part: Part; editor: SettingEditor }) {
  return (
    <QueryClientProvider client={new QueryClient()}>
      <MemoryRouter>
        <PartStatement part={part} editor={editor} state={useStore(editor)} ownName="Ines Marsh" materials={[aluminium, steel]} />
      </MemoryRouter>
    </QueryClientProvider>
  );
}

function open(measurement: Measurement | null, { setting = metal, edit = true, change = {} }: { setting?: Setting; edit?: boolean; change?: Partial<Part> } = {}): SettingEditor {
  const part = { ...makePart(measurement, setting, edit), ...change };
  const { setting: stored } = part.revision;
  const editor = createSettingEditor(stored, {
    save: ({ version, material, ...changed }) => Promise.resolve({ ...stored, ...changed, material: material ? { id: material.id, name: material.id } : null, version: version + 1 }),
    reload: () => Promise.resolve(stored),
    isStale: () => false,
    isPassing: () => false,
    describe: String,
  });
  render(<Page part={part} editor={editor} />);
  return editor;
}

const section = (name: string): HTMLElement => screen.getByRole('region', { name });
const text = (element: HTMLElement): string => element.textContent.replace(/\u2009/g, '');

describe('the statement of a part', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => {
    cleanup();
    vi.useRealTimers();
  });

  it('gives the figures of a block as the handbook does', () => {
    open(block);
    const figures = text(section('Figures'));
    // m = 2700 · 6e-6 = 16.2 g; I about z = m (30² + 20²)/12 = 1.755 kg·mm².
    expect(figures).toContain('16.2000');
    expect(figures).toContain('6.00000');
    expect(figures).toContain('22.0000');
    expect(figures).toContain('1.75500');
    expect(text(section('Axis and torque'))).toContain('1.75500');
  });

  it('captions its tensor with unit, point, axes and sign convention', () => {
    open(block);
    expect(section('Figures').querySelector('figcaption')?.textContent).toBe(
      'kg·mm² about the centre of mass, axes of the mesh frame; off-diagonals are matrix elements, -∫xy dm.',
    );
  });

  it('answers a typed density at once, and leaves half a word alone', () => {
    const editor = open(block);
    const density = screen.getByLabelText('Density');
    fireEvent.change(density, { target: { value: '7.85 g' } });
    expect(text(section('Figures'))).toContain('16.2000');
    fireEvent.change(density, { target: { value: '7.85 g/cm3' } });
    expect(text(section('Figures'))).toContain('47.1000');
    expect(editor.get().draft.densityKgM3).toBe(7850);
  });

  it('leaves the digits of a density alone that its field does not show', () => {
    const editor = open(block, { setting: { ...metal, densityKgM3: 2712.6306616 } });
    const density = screen.getByLabelText<HTMLInputElement>('Density');
    expect(density.value).toBe('2712.63 kg/m³');
    fireEvent.focus(density);
    fireEvent.blur(density);
    fireEvent.keyDown(density, { key: 'Enter' });
    expect(editor.get().draft.densityKgM3).toBe(2712.6306616);
  });

  it('takes an undone density back into its field', () => {
    open(block);
    fireEvent.change(screen.getByLabelText('Density'), { target: { value: '7.85 g/cm3' } });
    fireEvent.click(screen.getByRole('button', { name: /Undo/ }));
    expect(screen.getByLabelText<HTMLInputElement>('Density').value).toBe('2700 kg/m³');
    expect(text(section('Figures'))).toContain('16.2000');
  });

  it('tells the parallel-axis term apart for a typed axis', () => {
    open(block, { setting: { ...metal, axis: { kind: 'typed', pointM: [0, 0, 0], direction: [0, 0, 2] } } });
    const axis = text(section('Axis and torque'));
    // About the corner: m (30² + 20²)/3 = 7.02; through the centre 1.755; the rest is m d².
    expect(axis).toContain('7.0200');
    expect(axis).toContain('1.75500');
    expect(axis).toContain('5.26500 kg·mm²');
  });

  it('gives torque and energy for a drive, with the caution that belongs to them', () => {
    open(block);
    fireEvent.change(screen.getByLabelText('Speed in r/min'), { target: { value: '300' } });
    fireEvent.change(screen.getByLabelText('Time in s'), { target: { value: '0.5' } });
    const axis = text(section('Axis and torque'));
    // τ = 1.755e-6 · 31.4159/0.5, E = ½ · 1.755e-6 · 31.4159².
    expect(axis).toContain('0.11027 N·mm');
    expect(axis).toContain('0.86606 mJ');
    for (const standard of ['ISO 12100', 'ISO 14120', 'ISO 14119']) expect(axis).toContain(standard);
  });

  it('shows a torque only for what the fields say', () => {
    const editor = open(block, { setting: { ...metal, drive: { speedRadPerS: 31.41592653589793, timeS: 0.5 } } });
    const axis = section('Axis and torque');
    expect(text(axis)).toContain('0.11027 N·mm');
    fireEvent.change(screen.getByLabelText('Speed in r/min'), { target: { value: '' } });
    expect(text(axis)).not.toContain('N·mm');
    expect(text(axis)).toContain('Give a speed and a time.');
    fireEvent.change(screen.getByLabelText('Speed in r/min'), { target: { value: 'fast' } });
    expect(text(axis)).not.toContain('N·mm');
    fireEvent.change(screen.getByLabelText('Speed in r/min'), { target: { value: '' } });
    fireEvent.change(screen.getByLabelText('Time in s'), { target: { value: '' } });
    expect(editor.get().draft.drive).toBeNull();
    expect(text(axis)).not.toContain('Torque');
  });

  it('shows no moment while the typed axis is none', () => {
    open(block, { setting: { ...metal, axis: { kind: 'typed', pointM: [0, 0, 0], direction: [0, 0, 1] }, drive: { speedRadPerS: 10, timeS: 1 } } });
    const axis = section('Axis and torque');
    fireEvent.change(screen.getByLabelText('Direction z'), { target: { value: '0' } });
    expect(text(axis)).toContain('Mend the axis first');
    expect(text(axis)).not.toMatch(/kg·mm²|N·mm|mJ/);
    fireEvent.change(screen.getByLabelText('Direction x'), { target: { value: '1' } });
    expect(text(axis)).toContain('kg·mm²');
    expect(text(axis)).not.toContain('Mend');
  });

  it('has no heading of a drive, and no caution about one, where there is none and none can be given', () => {
    open(block, { edit: false });
    expect(text(section('Axis and torque'))).not.toContain('Drive');
    expect(text(section('Axis and torque'))).not.toContain('ISO 12100');
  });

  it('shows no figure of an open mesh, and says why and what to do', () => {
    open(openBlock);
    expect(text(section('Soundness'))).toContain('Open: not defensible');
    const figures = text(section('Figures'));
    expect(figures).toContain('No figures.');
    expect(figures).toContain('open at 4 edges');
    expect(figures).not.toMatch(/\d (g|kg|cm³|mm³|cm²|mm²)/);
    expect(screen.queryByRole('region', { name: 'Axis and torque' })).toBeNull();
  });

  it('states no size and no mass before the unit is stated', () => {
    open(block, { setting: { ...metal, lengthUnit: null } });
    expect(text(section('Figures'))).toContain('No figures yet.');
    fireEvent.change(screen.getByLabelText('Unit'), { target: { value: 'inch' } });
    // 6000 cubic inches at 2700 kg/m³.
    expect(text(section('Figures'))).toContain('265.470');
  });

  it('gives volume and centre, but no mass, before the density is stated', () => {
    open(block, { setting: { ...metal, densityKgM3: null } });
    const figures = text(section('Figures'));
    expect(figures).toContain('No mass yet.');
    expect(figures).toContain('6.00000');
    expect(within(section('Figures')).getAllByRole('img', { name: /Along x .* centre of mass is at 15\.0000\d* ± \S+ mm/ })).toHaveLength(1);
  });

  it('has no control that a reader may not use', () => {
    open(block, { edit: false });
    // To copy, and to choose whose doubt is looked into, changes nothing.
    const changesNothing = (element: HTMLElement): boolean => element.textContent.startsWith('Copy') || element === screen.getByLabelText('Doubt of');
    for (const role of ['textbox', 'combobox', 'radio', 'button'] as const) expect(screen.queryAllByRole(role).filter((element) => !changesNothing(element))).toEqual([]);
    expect(screen.queryByText('Saved')).toBeNull();
    expect(text(section('Source'))).toContain('2700 kg/m³');
    expect(text(section('Figures'))).toContain('16.2000');
  });

  it('shows how far a mesh is that is still being measured', () => {
    open(null);
    expect(screen.getAllByRole('progressbar', { name: 'Measuring, 40 %' })).toHaveLength(1);
    expect(screen.queryByRole('region', { name: 'Figures' })).toBeNull();
  });

  it('takes name, density and spread of a material that is picked, and keeps the name until a density is typed', () => {
    const editor = open(block);
    const picker = screen.getByRole('combobox', { name: 'Material' });
    fireEvent.change(picker, { target: { value: '4140' } });
    fireEvent.keyDown(picker, { key: 'Enter' });
    expect(editor.get().draft).toMatchObject({ material: { id: 'steel-4140', name: 'Steel 4140' }, densityKgM3: 7850, densitySpreadKgM3: 79 });
    expect(text(section('Figures'))).toContain('47.10 g± 0.55 g');
    vi.setSystemTime(Date.now() + 2000);
    fireEvent.change(screen.getByLabelText('Density'), { target: { value: '7.8 g/cm3 ± 1 %' } });
    expect(editor.get().draft).toMatchObject({ material: null, densityKgM3: 7800, densitySpreadKgM3: 78 });
    fireEvent.click(screen.getByRole('button', { name: /Undo/ }));
    expect(editor.get().draft).toMatchObject({ material: { name: 'Steel 4140' }, densityKgM3: 7850 });
  });

  it('offers the density that the library has by now, with what it would move', () => {
    const editor = open(block, { setting: { ...metal, ...made, densityKgM3: 2600 } });
    const source = text(section('Source'));
    expect(source).toContain('Aluminium 6061-T6 now has 2700 kg/m³ in the library; this setting was made with 2600 kg/m³.');
    // 6000 mm³ at 100 kg/m³ more.
    expect(source).toContain('+0.6 g, +3.8 %');
    fireEvent.click(screen.getByRole('button', { name: /^Take/ }));
    expect(editor.get().draft.densityKgM3).toBe(2700);
    expect(text(section('Source'))).not.toContain('in the library');
  });

  it('a weight that the material allows sets the density; one that it does not is said, and changes nothing', () => {
    open(block, { setting: { ...metal, ...made } });
    const weighed = screen.getByLabelText('Weighed mass');
    fireEvent.change(weighed, { target: { value: '16.3 g ± 0.1 g' } });
    expect(text(section('Figures'))).toContain('16.30 g± 0.10 g');
    expect(text(section('Source'))).toContain('Agrees');
    expect(text(section('Source'))).toContain('In force: 2717 kg/m³, by the weight.');
    fireEvent.change(weighed, { target: { value: '12 g ± 0.1 g' } });
    expect(text(section('Figures'))).toContain('16.20 g± 0.19 g');
    expect(text(section('Source'))).toContain('hollow, filled, or of another');
    expect(text(section('Source'))).not.toContain('In force');
  });

  it('a weighing that is refused leaves no verdict beside its error, and says which is still in force', () => {
    open(block, { setting: { ...metal, ...made, weighing: { massKg: 0.0163, uncertaintyKg: 0.0001 } } });
    const weighed = screen.getByLabelText('Weighed mass');
    expect(text(section('Source'))).toContain('Agrees');
    for (const refused of ['0', '15.0 g']) {
      fireEvent.change(weighed, { target: { value: refused } });
      fireEvent.blur(weighed);
      expect(text(section('Source'))).not.toContain('Agrees');
      expect(text(section('Source'))).toContain('Still in force: 16.3 ± 0.1 g.');
    }
    fireEvent.change(weighed, { target: { value: '16.2 g ± 0.1 g' } });
    expect(text(section('Source'))).toContain('Agrees');
  });

  it('asks how sure the scale is', () => {
    const editor = open(block);
    const weighed = screen.getByLabelText('Weighed mass');
    fireEvent.change(weighed, { target: { value: '16.3 g' } });
    fireEvent.blur(weighed);
    expect(text(section('Source'))).toContain('Say how sure the scale is');
    expect(editor.get().draft.weighing).toBeNull();
  });

  it('asks for the unit again where the volume does not fit the revision before', () => {
    const before = { id: 'earlier', letter: 'A', fileName: 'block.stl', reason: '', createdAt: '2026-11-27T09:00:00Z', createdBy: 'Ines Marsh' };
    const editor = open(block, {
      setting: { ...metal, lengthUnit: 'inch' },
      change: { state: 'unit-doubt', unitDoubt: { lengthUnit: 'mm', volumeRatio: 16387.064 }, revisions: [{ ...before, id: 'revision', letter: 'B', reason: 'thicker wall' }, before] },
    });
    const source = text(section('Source'));
    expect(source).toContain('about 16000 times that of revision A, as if millimetres had been taken for inches');
    expect(source).toContain('taken over from revision A; nobody has stated it for this file');
    expect(source).toContain('thicker wall');
    fireEvent.click(screen.getByRole('button', { name: 'These are millimetres' }));
    expect(editor.get().draft.lengthUnit).toBe('mm');
    expect(screen.queryByText('Is the unit right?')).toBeNull();
  });

  it('offers all units where the volumes speak for none of them', () => {
    const before = { id: 'earlier', letter: 'A', fileName: 'block.stl', reason: '', createdAt: '2026-11-27T09:00:00Z', createdBy: 'Ines Marsh' };
    const editor = open(block, { change: { state: 'unit-doubt', unitDoubt: { lengthUnit: null, volumeRatio: 1e-9 }, revisions: [{ ...before, id: 'revision', letter: 'B' }, before] } });
    expect(text(section('Source'))).toContain('about a thousand-millionth of that of revision A, as if one unit had been taken for another, but none of the six');
    fireEvent.click(screen.getByRole('button', { name: 'State the unit' }));
    fireEvent.click(screen.getByRole('menuitem', { name: /^metre/ }));
    expect(editor.get().draft.lengthUnit).toBe('m');
  });

  it('says where the same bytes are', () => {
    open(block, { change: { sameBytes: [{ projectId: 'other', projectName: 'Winch', partId: 'twin', number: 3, name: 'Slab', letter: 'C' }] } });
    expect(text(section('Source'))).toContain('Slab revision C, in Winch');
    expect(screen.getByRole('link', { name: 'Slab' }).getAttribute('href')).toBe('/projects/other/parts/twin');
  });
});
