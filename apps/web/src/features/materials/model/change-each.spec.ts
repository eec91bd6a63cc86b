import type { SettingsChange } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { changeEach } from './change-each';

const change = (id: string): SettingsChange => ({ id, projectId: id, changed: 1, unchanged: 0, left: [], reverses: null, createdAt: '2026-11-28T14:06:00Z', createdBy: 'Ines Marsh' });
/** Refuses those that are named. */
const work = (refused: readonly string[]) => (id: string): Promise<SettingsChange> => (refused.includes(id) ? Promise.reject(new Error(`${id} is refused`)) : Promise.resolve(change(id)));

describe('a change of several projects, one after the other', () => {
  it('is all of them where none fails', async () => {
    expect(await changeEach(['reel', 'drum'], work([]))).toEqual({ changes: [change('reel'), change('drum')] });
  });
  it('gives what was done with the first failure, so that it can be taken back', async () => {
    expect(await changeEach(['reel', 'drum', 'boom', 'jib'], work(['drum', 'jib']))).toEqual({ changes: [change('reel'), change('boom')], error: new Error('drum is refused') });
  });
  it('fails where nothing at all was done', async () => {
    await expect(changeEach(['reel', 'drum'], work(['reel', 'drum']))).rejects.toThrow('reel is refused');
  });
});
