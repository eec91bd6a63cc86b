import type { ChangeSettingRequest, Setting, StoredSetting } from '@masswright/contracts';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { createSettingEditor, type SettingEditor } from './setting-editor';

class StaleError extends Error {}
class OfflineError extends Error {}

/** A server that holds one setting and refuses changes made on an older version of it. */
class Server {
  stored: StoredSetting = {
    lengthUnit: 'mm',
    densityKgM3: 2700,
    densitySpreadKgM3: null,
    material: null,
    weighing: null,
    axis: { kind: 'mesh', along: 'z' },
    drive: null,
    version: 1,
    changedAt: '2026-11-28T14:06:00Z',
    changedBy: 'Ines Marsh',
    unitStated: null,
  };
  requests: ChangeSettingRequest[] = [];
  offline = false;
  /** Milliseconds until an answer. */
  latency = 50;

  write(change: Partial<Setting>, by: string): void {
    this.stored = { ...this.stored, ...change, version: this.stored.version + 1, changedBy: by };
  }

  /** As the api does: a density that comes without a name takes the name away, and the library knows every name. */
  private apply({ material, ...change }: Omit<ChangeSettingRequest, 'version'>): Partial<Setting> {
    if (material) return { ...change, material: { id: material.id, name: `Library's ${material.id}` } };
    return change.densityKgM3 === undefined ? change : { ...change, material: null };
  }

  save = async ({ version, ...change }: ChangeSettingRequest): Promise<StoredSetting> => {
    this.requests.push({ version, ...change });
    await new Promise((resolve) => setTimeout(resolve, this.latency));
    if (this.offline) throw new OfflineError('Masswright could not be reached.');
    if (version !== this.stored.version) throw new StaleError();
    this.write(this.apply(change), 'Ines Marsh');
    return this.stored;
  };

  openEditor(): SettingEditor {
    return createSettingEditor(this.stored, {
      save: this.save,
      reload: () => Promise.resolve(this.stored),
      isStale: (error) => error instanceof StaleError,
      isPassing: (error) => error instanceof OfflineError,
      describe: (error) => (error instanceof Error ? error.message : 'unknown'),
    });
  }
}

describe('setting editor', () => {
  let server: Server;
  let editor: SettingEditor;
  beforeEach(() => {
    vi.useFakeTimers();
    server = new Server();
    editor = server.openEditor();
  });
  afterEach(() => void vi.useRealTimers());
  const pass = (milliseconds: number) => vi.advanceTimersByTimeAsync(milliseconds);

  it('shows a change at once and saves it a moment later, with the version it was made on', async () => {
    editor.change({ densityKgM3: 7850 });
    expect(editor.get()).toMatchObject({ draft: { densityKgM3: 7850 }, status: 'waiting' });
    await pass(399);
    expect(server.requests).toHaveLength(0);
    await pass(1);
    expect(editor.get().status).toBe('saving');
    expect(server.requests).toEqual([{ densityKgM3: 7850, densitySpreadKgM3: null, version: 1 }]);
    await pass(50);
    expect(editor.get()).toMatchObject({ status: 'saved', saved: { version: 2, densityKgM3: 7850 } });
  });

  it('typing sends what was typed last, once', async () => {
    for (const densityKgM3 of [7, 78, 785, 7850]) {
      editor.change({ densityKgM3 });
      await pass(100);
    }
    await pass(1000);
    expect(server.requests).toEqual([{ densityKgM3: 7850, densitySpreadKgM3: null, version: 1 }]);
  });

  it('a change that is made while another is being saved follows it, on the new version', async () => {
    editor.change({ densityKgM3: 7850 });
    await pass(410);
    editor.change({ lengthUnit: 'inch' });
    await pass(2000);
    expect(server.requests).toEqual([
      { densityKgM3: 7850, densitySpreadKgM3: null, version: 1 },
      { lengthUnit: 'inch', version: 2 },
    ]);
    expect(editor.get()).toMatchObject({ status: 'saved', draft: { densityKgM3: 7850, lengthUnit: 'inch' } });
  });

  it('a change that takes longer to save than the pause after the next one loses nothing', async () => {
    server.latency = 2000;
    editor.change({ densityKgM3: 7850 });
    await pass(500);
    editor.change({ lengthUnit: 'cm' });
    await pass(1000);
    expect(server.requests).toHaveLength(1);
    await pass(5000);
    expect(server.stored).toMatchObject({ densityKgM3: 7850, lengthUnit: 'cm', version: 3 });
    expect(editor.get().status).toBe('saved');
  });

  it('undo takes back the last change, and saves that', async () => {
    editor.change({ densityKgM3: 7850 });
    await pass(2000);
    editor.change({ lengthUnit: 'inch' });
    await pass(2000);
    editor.undo();
    expect(editor.get().draft).toMatchObject({ lengthUnit: 'mm', densityKgM3: 7850 });
    await pass(2000);
    expect(server.stored.lengthUnit).toBe('mm');
    editor.undo();
    await pass(2000);
    expect(server.stored.densityKgM3).toBe(2700);
    expect(editor.get()).toMatchObject({ canUndo: false, status: 'saved' });
  });

  it('a number typed digit by digit is undone as one change', async () => {
    for (const densityKgM3 of [7, 78, 785, 7850]) {
      editor.change({ densityKgM3 });
      await pass(150);
    }
    editor.undo();
    expect(editor.get().draft.densityKgM3).toBe(2700);
  });

  it('setting what is set already is no change', async () => {
    editor.change({ axis: { along: 'z', kind: 'mesh' } });
    await pass(1000);
    expect(server.requests).toHaveLength(0);
    expect(editor.get().canUndo).toBe(false);
  });

  it('a failed save keeps what was set, says why, and can be tried again', async () => {
    server.offline = true;
    editor.change({ densityKgM3: 7850 });
    await pass(1000);
    expect(editor.get()).toMatchObject({ status: 'failed', problem: 'Masswright could not be reached.', draft: { densityKgM3: 7850 } });
    server.offline = false;
    editor.retry();
    await pass(100);
    expect(editor.get().status).toBe('saved');
    expect(server.stored.densityKgM3).toBe(7850);
  });

  it('what could not be saved is tried again by itself, after longer and longer pauses', async () => {
    server.offline = true;
    editor.change({ densityKgM3: 7850 });
    await pass(500);
    expect(editor.get()).toMatchObject({ status: 'failed', isAtRisk: true });
    await pass(2_100);
    expect(server.requests).toHaveLength(2);
    await pass(3_000);
    expect(server.requests).toHaveLength(2);
    server.offline = false;
    await pass(1_100);
    expect(editor.get()).toMatchObject({ status: 'saved', isAtRisk: false });
    expect(server.stored.densityKgM3).toBe(7850);
    await pass(120_000);
    expect(server.requests).toHaveLength(3);
  });

  it('a change that the server refuses is not sent again by itself', async () => {
    const save = vi.fn(() => Promise.reject(new Error('That is no density.')));
    const refused = createSettingEditor(server.stored, { save, reload: () => Promise.resolve(server.stored), isStale: () => false, isPassing: () => false, describe: String });
    refused.change({ densityKgM3: 1 });
    await pass(120_000);
    expect(save).toHaveBeenCalledTimes(1);
    expect(refused.get()).toMatchObject({ status: 'failed', isAtRisk: true });
  });

  it('what was undone can be done again, until something else is changed', async () => {
    editor.change({ densityKgM3: 7850 });
    await pass(2_000);
    editor.undo();
    expect(editor.get()).toMatchObject({ draft: { densityKgM3: 2700 }, canUndo: false, canRedo: true });
    editor.redo();
    await pass(2_000);
    expect(server.stored.densityKgM3).toBe(7850);
    expect(editor.get()).toMatchObject({ canUndo: true, canRedo: false });
    editor.undo();
    editor.change({ lengthUnit: 'inch' });
    expect(editor.get().canRedo).toBe(false);
  });

  it('when someone else was first, their setting is shown and mine is kept to put back', async () => {
    server.write({ densityKgM3: 1240 }, 'Tom Vale');
    editor.change({ densityKgM3: 7850 });
    await pass(1000);
    expect(editor.get()).toMatchObject({
      status: 'overtaken',
      draft: { densityKgM3: 1240 },
      saved: { changedBy: 'Tom Vale' },
      mine: { densityKgM3: 7850 },
      canUndo: false,
    });
    editor.putMineBack();
    await pass(1000);
    expect(server.stored).toMatchObject({ densityKgM3: 7850, version: 3 });
    expect(editor.get()).toMatchObject({ status: 'saved', mine: undefined });
  });

  it('when someone else has set the very same, nobody need be told', async () => {
    server.write({ densityKgM3: 7850 }, 'Tom Vale');
    editor.change({ densityKgM3: 7850 });
    await pass(1000);
    expect(editor.get()).toMatchObject({ status: 'saved', saved: { version: 2 } });
  });

  it('what others change is taken over while nothing is being changed here', async () => {
    server.write({ lengthUnit: 'inch' }, 'Tom Vale');
    editor.adopt(server.stored);
    expect(editor.get()).toMatchObject({ draft: { lengthUnit: 'inch' }, status: 'saved' });
    editor.change({ densityKgM3: 7850 });
    server.write({ lengthUnit: 'foot' }, 'Tom Vale');
    editor.adopt(server.stored);
    expect(editor.get().draft).toMatchObject({ lengthUnit: 'inch', densityKgM3: 7850 });
    await pass(1000);
    expect(editor.get()).toMatchObject({ status: 'overtaken', draft: { lengthUnit: 'foot' } });
  });

  it('an old answer never takes the place of a newer setting', async () => {
    const old = server.stored;
    editor.change({ densityKgM3: 7850 });
    await pass(1000);
    editor.adopt(old);
    expect(editor.get().draft.densityKgM3).toBe(7850);
  });

  it('leaving the page sends at once what still waits, and nothing where nothing waits', async () => {
    editor.flush();
    await pass(0);
    expect(server.requests).toHaveLength(0);
    editor.change({ densityKgM3: 7850 });
    editor.flush();
    await pass(100);
    expect(server.stored.densityKgM3).toBe(7850);
    await pass(1000);
    expect(server.requests).toHaveLength(1);
  });

  it('a material is sent with the density that is shown, and a typed density without a name', async () => {
    editor.change({ material: { id: 'steel', name: 'Steel' }, densityKgM3: 7850, densitySpreadKgM3: 79 });
    await pass(2000);
    editor.change({ material: null, densityKgM3: 7800, densitySpreadKgM3: null });
    await pass(2000);
    expect(server.requests).toEqual([
      { material: { id: 'steel' }, densityKgM3: 7850, densitySpreadKgM3: 79, version: 1 },
      { densityKgM3: 7800, densitySpreadKgM3: null, version: 2 },
    ]);
    editor.undo();
    await pass(2000);
    expect(server.stored).toMatchObject({ material: { id: 'steel' }, densityKgM3: 7850, densitySpreadKgM3: 79 });
  });

  it('a name that the library has changed meanwhile is no change of the setting', async () => {
    editor.change({ material: { id: 'steel', name: 'Steel' }, densityKgM3: 7850, densitySpreadKgM3: 79 });
    await pass(1000);
    expect(editor.get()).toMatchObject({ status: 'saved', draft: { material: { name: "Library's steel" } } });
    await pass(5000);
    expect(server.requests).toHaveLength(1);
  });

  it('a weighing is changed by itself', async () => {
    editor.change({ weighing: { massKg: 0.3, uncertaintyKg: 0.002 } });
    await pass(1000);
    expect(server.requests).toEqual([{ weighing: { massKg: 0.3, uncertaintyKg: 0.002 }, version: 1 }]);
    expect(server.stored.densityKgM3).toBe(2700);
  });
});
