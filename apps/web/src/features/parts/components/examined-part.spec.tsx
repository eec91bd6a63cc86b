import { measuringVersion, type Material, type Measurement, type Part, type Setting } from '@masswright/contracts';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, fireEvent, render, screen, within } from '@testing-library/react';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { useStore } from '../../../lib/store';
import { createSettingEditor, type SettingEditor } from '../model/setting-editor';
import { makeMeasurement, makeShell } from '../model/testing/measurements';
import { PartStatement } from './part-statement';

const metal: Setting = { lengthUnit: 'mm', densityKgM3: 1000, densitySpreadKgM3: 10, material: null, weighing: null, axis: { kind: 'mesh', along: 'z' }, drive: null };
const pla = { id: 'pla', name: 'PLA', group: 'polymer', densityKgM3: 1240, densitySpreadKgM3: 20, archivedAt: null } as unknown as Material;

function makePart(measurement: Measurement, setting: Setting, run: Partial<Part['revision']['run']>, measuredBefore: Measurement | null): Part {
  const head = { id: 'revision', letter: 'A', fileName: 'block.stl', reason: '', createdAt: '2026-11-28T14:06:00Z', createdBy: 'Ines Marsh' };
  return {
    id: 'part', projectId: 'project', projectName: 'Reel', number: 4, name: 'Block', state: 'ready', deletedAt: null, revisions: [head], unitDoubt: null, sameBytes: [], can: { edit: true },
    revision: {
      ...head, folder: '', sizeBytes: 684, sha256: 'ab'.repeat(32), format: measurement.format, compression: null, measurement, measuredBefore,
      run: { state: 'done', stage: 'storing', progress: 1, error: null, finishedAt: '2026-11-28T14:06:02Z', durationMs: 41, ...run },
      setting: { ...setting, version: 1, changedAt: '2026-11-28T14:06:00Z', changedBy: 'Ines Marsh', unitStated: null },
    },
  };
}

function Page({ part, editor }: { part: Part; editor: SettingEditor }) {
  return (
    <QueryClientProvider client={new QueryClient()}>
      <MemoryRouter>
        <PartStatement part={part} editor={editor} state={useStore(editor)} ownName="Ines Marsh" materials={[pla]} />
      </MemoryRouter>
    </QueryClientProvider>
  );
}

interface Opened {
  setting?: Setting;
  run?: Partial<Part['revision']['run']>;
  measuredBefore?: Measurement | null;
}

function open(measurement: Measurement, { setting = metal, run = {}, measuredBefore = null }: Opened = {}): SettingEditor {
  const part = makePart(measurement, setting, run, measuredBefore);
  const { setting: stored } = part.revision;
  const editor = createSettingEditor(stored, { save: () => Promise.resolve(stored), reload: () => Promise.resolve(stored), isStale: () => false, isPassing: () => false, describe: String });
  render(<Page part={part} editor={editor} />);
  return editor;
}

const section = (name: string): HTMLElement => screen.getByRole('region', { name });
const text = (element: HTMLElement): string => element.textContent.replace(/\u2009/g, '');

describe('what the engine finds, on the page of a part', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => {
    cleanup();
    vi.useRealTimers();
  });

  const nothingExamined = { nonManifoldEdges: null, nonManifoldVertices: null, degenerateFacets: null, duplicateFacets: null, shells: null, cavities: null, selfIntersections: null };
  const block = makeMeasurement();
  const standing = makeMeasurement({ examined: 'integrals', soundness: { ...block.soundness, ...nothingExamined } });

  it('figures that stand are shown while the rest is examined, which is said with its progress', () => {
    open(standing, { run: { state: 'running', stage: 'examining', progress: 0.6 } });
    expect(text(section('Soundness'))).toContain('Volume, mass and closedness stand.');
    expect(screen.getAllByRole('progressbar', { name: 'Examining, 60 %' })).toHaveLength(1);
    expect(text(section('Soundness'))).toContain('Not examined yet.');
    expect(text(section('Figures'))).toContain('6.000 g± 0.069 g');
    expect(text(section('Doubt'))).toContain('The facets are being examined');
  });

  it('a mesh that is too large to be examined says so, and why', () => {
    open({ ...standing, examined: 'limited', facets: 5_000_000 });
    expect(text(section('Soundness'))).toContain('the mesh has 5000000 facets, and meshes of up to 4000000 are');
    expect(screen.queryByRole('progressbar')).toBeNull();
  });

  it('each figure has its uncertainty, and the ledger says what that is made of', () => {
    open(block);
    // 6 g with a rectangular spread of 1 %: U = 2 · 0.06/√3.
    expect(text(section('Figures'))).toContain('6.000 g± 0.069 g');
    const doubt = section('Doubt');
    expect(text(doubt)).toContain('Density');
    expect(within(doubt).getByRole('row', { name: /^Density .*100\.0 %/ })).toBe(within(doubt).getAllByRole('row')[1]);
    fireEvent.change(screen.getByLabelText('Doubt of'), { target: { value: 'volume' } });
    expect(text(doubt)).toContain('Digits of the file');
    expect(within(doubt).queryByRole('row', { name: /^Density/ })).toBeNull();
  });

  it('a tolerance as made joins the uncertainty at once, and is taken back by undo', () => {
    const editor = open(block);
    fireEvent.change(screen.getByLabelText('Tolerance as made'), { target: { value: '± 1 %' } });
    expect(editor.get().draft.asMade).toEqual({ kind: 'scale', spread: 0.01 });
    // 2 · 6 g · √(0.01² + 0.03²)/√3.
    expect(text(section('Figures'))).toContain('6.00 g± 0.22 g');
    expect(within(section('Doubt')).getByRole('row', { name: /^As made .*90\.0 %/ })).toBe(within(section('Doubt')).getAllByRole('row')[1]);
    fireEvent.click(screen.getByRole('button', { name: /Undo/ }));
    expect(text(section('Figures'))).toContain('6.000 g± 0.069 g');
  });

  const two = makeMeasurement({ shells: [makeShell('solid', [30, 20, 10]), makeShell('detached', [10, 10, 10])], soundness: { ...block.soundness, shells: 2 } });

  it('a shell can have its own density, or be left out, and undo takes that back', () => {
    const editor = open(two);
    expect(text(section('Soundness'))).toContain('2 pieces that hang together by edges');
    fireEvent.change(screen.getByLabelText('Density of shell 2'), { target: { value: 'own' } });
    expect(editor.get().draft.shellDensities).toEqual([]);
    fireEvent.change(screen.getByLabelText('Density of shell 2, typed'), { target: { value: '8 g/cm3' } });
    expect(editor.get().draft.shellDensities).toEqual([{ shell: 1, densityKgM3: 8000 }]);
    // 6 cm³ at 1 g/cm³ and 1 cm³ at 8 g/cm³.
    expect(text(section('Figures'))).toContain('14.000 g');
    expect(text(section('Figures'))).toContain('shell by shell');
    vi.setSystemTime(Date.now() + 2000);
    fireEvent.change(screen.getByLabelText('Density of shell 1'), { target: { value: 'out' } });
    expect(text(section('Figures'))).toContain('8.000');
    fireEvent.click(screen.getByRole('button', { name: /Undo/ }));
    expect(editor.get().draft.shellDensities).toEqual([{ shell: 1, densityKgM3: 8000 }]);
  });

  it('densities of shells that are not there give no mass, and say why', () => {
    const editor = open(two, { setting: { ...metal, shellDensities: [{ shell: 7, densityKgM3: 8000 }] } });
    expect(text(section('Figures'))).toContain('There is no shell 8');
    fireEvent.click(screen.getByRole('button', { name: /Give all shells/ }));
    expect(editor.get().draft.shellDensities).toEqual([]);
    expect(text(section('Figures'))).toContain('6.000 g');
  });

  it('an open mesh says where it is open and what hangs on that, and gives no figure', () => {
    const openings: Measurement['openings'] = { loops: [{ edges: 4, length: 60, centre: [15, 10, 10], width: 20 }], loopCount: 1, volumes: { aboutMiddle: 5000, fanned: 6000 }, lostVolume: null };
    open(makeMeasurement({ volume: null, openings, soundness: { ...block.soundness, closed: false, oriented: false, defensible: false, boundaryEdges: 4 } }));
    const soundness = text(section('Soundness'));
    expect(soundness).toContain('1 opening.');
    expect(soundness).toContain('would hold 5.000, with each opening closed by a fan to its centre 6.000 cm³: 17 % apart');
    expect(soundness).toContain('15.0000, 10.0000, 10.0000');
    expect(screen.queryByRole('region', { name: 'Doubt' })).toBeNull();
  });

  it('the unit that the file states is offered, and nothing is chosen for the person', () => {
    const editor = open(makeMeasurement({ declaredUnit: 'mm' }), { setting: { ...metal, lengthUnit: null } });
    expect(text(section('Source'))).toContain('The file says it is in millimetres.');
    expect(editor.get().draft.lengthUnit).toBeNull();
    fireEvent.click(screen.getByRole('button', { name: 'Take millimetres' }));
    expect(editor.get().draft.lengthUnit).toBe('mm');
    expect(screen.queryByRole('button', { name: 'Take millimetres' })).toBeNull();
  });

  it('a material that the file names proposes an entry of the library', () => {
    const editor = open(makeMeasurement({ declaredMaterials: ['pla', 'Body 1'] }), { setting: { ...metal, densityKgM3: null, densitySpreadKgM3: null } });
    expect(text(section('Source'))).toContain('The file names its materials “pla”, “Body 1”.');
    fireEvent.click(screen.getByRole('button', { name: 'Take PLA' }));
    expect(editor.get().draft).toMatchObject({ material: { id: 'pla', name: 'PLA' }, densityKgM3: 1240, densitySpreadKgM3: 20 });
  });

  it('a part that an earlier version measured can be measured again', () => {
    open({ ...block, measuringVersion: 'm1' });
    expect(text(section('Source'))).toContain(`These figures are version m1’s. The present one, ${measuringVersion}`);
    expect(screen.getByRole('button', { name: 'Measure again' })).toBeDefined();
  });

  it('what an earlier version found is held against what the present one does', () => {
    open(block, { measuredBefore: { ...block, measuringVersion: 'm1', volume: block.volume && { ...block.volume, content: 6006 } } });
    expect(text(section('Source'))).toContain('An earlier statement of this revision was made by version m1');
    expect(within(section('Source')).getByRole('row', { name: /^Volume cm³ 6\.00600 -0\.0060/ })).toBeDefined();
  });
});
