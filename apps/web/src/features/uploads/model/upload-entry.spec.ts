import type { Part } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { awaitsDecision, changeEntries, isReadyToStore, isSettled, isToBeTold, isUnfinished, nothingStated, writeCompletion, type Stated, type UploadEntry, type UploadEvent } from './upload-entry';
import { summariseUploads } from './upload-summary';
import { computeShareDone, describeEntry } from './upload-words';

const entry = (key = 'a'): UploadEntry => ({
  key,
  projectId: 'p',
  fileName: `${key}.stl`,
  sizeBytes: 1000,
  dropId: 'drop',
  folder: '',
  phase: 'waiting',
  paused: false,
  sentBytes: 0,
  keptBytes: 0,
  stated: nothingStated,
});
const millimetres: Stated = { lengthUnit: 'mm', material: null, densityKgM3: 2700 };

const part = (id: string): Part => ({
  id,
  projectId: 'p',
  projectName: 'Reel',
  number: 1,
  name: 'a',
  state: 'measuring',
  deletedAt: null,
  revisions: [],
  unitDoubt: null,
  sameBytes: [],
  can: { edit: true },
  revision: {
    id: 'r',
    letter: 'A',
    fileName: 'a.stl',
    folder: '',
    sizeBytes: 1000,
    reason: '',
    createdAt: '2026-11-28T14:06:00Z',
    createdBy: 'Ines Marsh',
    run: { state: 'queued', stage: 'waiting', progress: 0, error: null, finishedAt: null, durationMs: null },
    setting: {
      lengthUnit: null,
      densityKgM3: null,
      densitySpreadKgM3: null,
      material: null,
      weighing: null,
      axis: { kind: 'mesh', along: 'z' },
      drive: null,
      version: 1,
      changedAt: '2026-11-28T14:06:00Z',
      changedBy: 'Ines Marsh',
      unitStated: null,
    },
    sha256: null,
    format: null,
    compression: null,
    measurement: null,
    measuredBefore: null,
  },
});

/** What becomes of one entry through some events. */
function pass(...events: UploadEvent[]): UploadEntry {
  const [result] = events.reduce<readonly UploadEntry[]>(changeEntries, [entry()]);
  if (!result) throw new Error('the entry was lost');
  return result;
}

const stored: UploadEvent = { type: 'stored', key: 'a', part: part('part-1'), told: nothingStated };
const allSent: UploadEvent = { type: 'all-sent', key: 'a', uploadId: 'upload-1', partHashes: ['ab'] };

describe('an upload', () => {
  it('goes from waiting through sending and storing to a part that is measured', () => {
    expect(describeEntry(pass())).toBe('Waiting');
    const sending = pass({ type: 'begun', key: 'a' }, { type: 'sent', key: 'a', bytes: 400, keptBytes: 0 });
    expect(sending).toMatchObject({ phase: 'sending', sentBytes: 400 });
    expect(computeShareDone(sending)).toBeCloseTo(0.2);
    const measuring = pass({ type: 'begun', key: 'a' }, allSent, stored, {
      type: 'run',
      partId: 'part-1',
      run: { state: 'running', stage: 'measuring', progress: 0.5 },
    });
    expect(describeEntry(measuring)).toBe('Measuring');
    expect(isUnfinished(measuring)).toBe(false);
    expect(isSettled(measuring)).toBe(false);
    const done = pass({ type: 'begun', key: 'a' }, stored, { type: 'run', partId: 'part-1', run: { state: 'done', stage: 'storing', progress: 1 } });
    expect(isSettled(done)).toBe(true);
    expect(computeShareDone(done)).toBe(1);
  });
  it('that is cancelled stays cancelled, whatever arrives late', () => {
    const late = pass({ type: 'begun', key: 'a' }, { type: 'cancelled', key: 'a' }, { type: 'sent', key: 'a', bytes: 900, keptBytes: 0 }, { type: 'failed', key: 'a', problem: 'x' });
    expect(late).toMatchObject({ phase: 'cancelled', sentBytes: 0 });
    expect(late.problem).toBeUndefined();
  });
  it('that was stored before the cancel arrived is shown as the part that it is', () => {
    expect(pass({ type: 'begun', key: 'a' }, { type: 'cancelled', key: 'a' }, stored)).toMatchObject({ phase: 'stored', part: { id: 'part-1' } });
  });
  it('that failed says why and can be tried again from the beginning', () => {
    const failed = pass({ type: 'begun', key: 'a' }, { type: 'failed', key: 'a', problem: 'The storage did not take the file.' });
    expect(failed).toMatchObject({ phase: 'failed', problem: 'The storage did not take the file.' });
    expect(isSettled(failed)).toBe(true);
    expect(changeEntries([failed], { type: 'tried-again', key: 'a' })[0]).toMatchObject({ phase: 'waiting', sentBytes: 0, problem: undefined });
  });
  it('is not tried again while it is being sent', () => {
    expect(pass({ type: 'begun', key: 'a' }, { type: 'tried-again', key: 'a' }).phase).toBe('sending');
  });
  it('of nothing has a share all the same', () => {
    expect(computeShareDone({ ...entry(), sizeBytes: 0 })).toBe(0);
  });
  it('whose mesh could not be measured gives the reason', () => {
    const read = part('part-1');
    read.revision.run = { ...read.revision.run, state: 'failed', error: { code: 'file-truncated', message: 'It was cut off.', at: null } };
    const failed = pass(stored, { type: 'read', part: read });
    expect(describeEntry(failed)).toBe('Could not be measured');
    expect(failed.part?.problem).toBe('It was cut off.');
  });
  it('that is measured stays measured, though an answer from before arrives after', () => {
    const done: UploadEvent = { type: 'run', partId: 'part-1', run: { state: 'done', stage: 'storing', progress: 1 } };
    const late = pass(stored, done, { type: 'read', part: part('part-1') }, { type: 'run', partId: 'part-1', run: { state: 'running', stage: 'measuring', progress: 0.5 } });
    expect(isSettled(late)).toBe(true);
    expect(describeEntry(late)).toBe('Measured');
  });
  it('that could not be measured may still learn why', () => {
    const read = part('part-1');
    read.revision.run = { ...read.revision.run, state: 'failed', error: { code: 'file-truncated', message: 'It was cut off.', at: null } };
    const failed: UploadEvent = { type: 'run', partId: 'part-1', run: { state: 'failed', stage: 'reading', progress: 0 } };
    expect(pass(stored, failed, { type: 'read', part: read }, { type: 'read', part: part('part-1') }).part?.problem).toBe('It was cut off.');
  });
  it('leaves the others, and their list, alone', () => {
    const list = [entry('a'), entry('b')];
    const next = changeEntries(list, { type: 'begun', key: 'b' });
    expect(next[0]).toBe(list[0]);
    expect(changeEntries(list, { type: 'run', partId: 'none', run: { state: 'done', stage: 'storing', progress: 1 } })).toBe(list);
  });
});

describe('what an upload waits for', () => {
  const match = { fileName: 'a.stl', partId: 'part-7', number: 7, name: 'Pawl', letter: 'A', storedFileName: 'A.stl', folder: '', sizeBytes: 9, sha256: null, sameCase: false };

  it('is not a part before the server has said whether a part has its name', () => {
    expect(isReadyToStore(pass({ type: 'begun', key: 'a' }, allSent))).toBe(false);
    expect(isReadyToStore(pass({ type: 'begun', key: 'a' }, allSent, { type: 'matched', key: 'a', matches: [] }))).toBe(true);
  });
  it('waits for the person where a part has its name, and is then what they say', () => {
    const asked = pass({ type: 'matched', key: 'a', matches: [match] }, { type: 'begun', key: 'a' }, allSent);
    expect([awaitsDecision(asked), isReadyToStore(asked), describeEntry(asked)]).toEqual([true, false, 'Sent, wants your decision']);
    const [decided] = changeEntries([asked], { type: 'decided', key: 'a', decision: { as: 'revision', partId: 'part-7', reason: 'thicker wall' } });
    expect(decided && isReadyToStore(decided)).toBe(true);
    expect(decided && writeCompletion(decided)).toMatchObject({ revisionOf: { partId: 'part-7', reason: 'thicker wall' }, partHashes: ['ab'] });
  });
  it('takes with it what was stated until then; what is stated later, the server is told', () => {
    const stated: UploadEvent = { type: 'stated', key: 'a', stated: millimetres };
    expect(writeCompletion(pass(stated)).setting).toEqual({ lengthUnit: 'mm', densityKgM3: 2700 });
    expect(isToBeTold(pass(stored))).toBe(false);
    expect(isToBeTold(pass(stored, stated))).toBe(true);
    expect(isToBeTold(pass(stored, stated, { type: 'told', key: 'a', told: millimetres }))).toBe(false);
  });
  it('names a material instead of its density', () => {
    const material = { id: 'al-6061-t6', name: 'Aluminium 6061-T6' };
    expect(writeCompletion(pass({ type: 'stated', key: 'a', stated: { lengthUnit: 'inch', material } })).setting).toEqual({ lengthUnit: 'inch', material: { id: 'al-6061-t6' } });
  });
  it('a revision keeps the unit that it took over', () => {
    const revision = part('part-1');
    revision.revision.letter = 'B';
    revision.revision.setting.lengthUnit = 'mm';
    expect(isToBeTold(pass({ type: 'stored', key: 'a', part: revision, told: nothingStated }, { type: 'stated', key: 'a', stated: { lengthUnit: 'inch' } }))).toBe(false);
  });
  it('is paused and goes on, but not once it is sent', () => {
    const paused: UploadEvent = { type: 'paused', key: 'a', paused: true };
    expect(describeEntry(pass({ type: 'begun', key: 'a' }, paused))).toBe('Paused');
    expect(pass({ type: 'begun', key: 'a' }, allSent, paused).paused).toBe(false);
  });
  it('that was sent but not stored is not sent again, unless the storage has something else', () => {
    const failed = (unsent: boolean) => pass({ type: 'begun', key: 'a' }, allSent, { type: 'failed', key: 'a', problem: 'x', unsent }, { type: 'tried-again', key: 'a' });
    expect(failed(false).phase).toBe('sent');
    expect(failed(true).phase).toBe('waiting');
  });
});

describe('all uploads in one line', () => {
  it('count what is under way and what became of the others', () => {
    const list = [entry('a'), { ...entry('b'), phase: 'failed' as const }, pass(stored)];
    expect(summariseUploads(list)).toMatchObject({ sentence: '3 meshes: 1 being sent, 1 being measured, 1 with a problem', settled: false, wrong: true, unitMissing: 2 });
  });
  it('are settled once nothing happens any more', () => {
    expect(summariseUploads([{ ...entry(), phase: 'cancelled' }])).toMatchObject({ settled: true, share: 1 });
  });
});

describe('a file that is there already', () => {
  const match = { fileName: 'a.stl', partId: 'part-7', number: 7, name: 'Pawl', letter: 'A', storedFileName: 'a.stl', folder: '', sizeBytes: 9, sha256: 'aa', sameCase: true };
  const present = (lengthUnit: 'mm' | null) => {
    const read = part('part-7');
    read.revision.setting.lengthUnit = lengthUnit;
    return pass({ type: 'found-present', key: 'a', presentIn: match, part: read });
  };

  it('is still asked about where a broken-off drop left its unit unsaid, and the answer is told to its part', () => {
    expect(summariseUploads([present(null)]).unitMissing).toBe(1);
    const [answered] = changeEntries([present(null)], { type: 'stated', key: 'a', stated: millimetres });
    expect(answered && isToBeTold(answered)).toBe(true);
  });
  it('is not asked about where its unit was stated', () => {
    expect(summariseUploads([present('mm')]).unitMissing).toBe(0);
  });
});

describe('a next revision whose part was deleted meanwhile', () => {
  it('is decided anew instead of failing for ever, and need not be sent again', () => {
    const match = { fileName: 'a.stl', partId: 'part-7', number: 7, name: 'Pawl', letter: 'A', storedFileName: 'a.stl', folder: '', sizeBytes: 9, sha256: null, sameCase: true };
    const again = pass(
      { type: 'matched', key: 'a', matches: [match] },
      { type: 'begun', key: 'a' },
      allSent,
      { type: 'decided', key: 'a', decision: { as: 'revision', partId: 'part-7', reason: '' } },
      { type: 'failed', key: 'a', problem: 'deleted', undecided: true },
      { type: 'tried-again', key: 'a' },
    );
    expect([again.phase, again.decision, isReadyToStore(again)]).toEqual(['sent', undefined, true]);
    expect(writeCompletion(again).revisionOf).toBeUndefined();
  });
});
