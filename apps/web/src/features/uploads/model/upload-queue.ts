import type { CompleteUploadRequest, ServerEvent } from '@masswright/contracts';
import { createStore, useStore } from '../../../lib/store';
import { readPartOfUpload } from '../api/uploads';
import { changeEntries, isSettled, isUnfinished, type UploadEntry, type UploadEvent } from './upload-entry';
import type { Transport } from './transport';
import { createQuietWatch } from './quiet-watch';

/** Lives outside of React: files go on being sent while a person moves about in the application. */
const entries = createStore<readonly UploadEntry[]>([]);
const files = new Map<string, File>();
let lastKey = 0;
let transport: Promise<Transport> | undefined;

const apply = (event: UploadEvent): void => entries.set((list) => changeEntries(list, event));

function readAgain(partId: string): void {
  readPartOfUpload(partId).then(
    (part) => apply({ type: 'read', part }),
    // The list of parts says the same, and the next event asks again.
    () => undefined,
  );
}

/** Read only when the first file is sent: most visits send none. */
function getTransport(): Promise<Transport> {
  transport ??= import('./transport').then(
    (module) =>
      new module.Transport({
        onBegun: (key) => apply({ type: 'begun', key }),
        onSent: (key, bytes) => apply({ type: 'sent', key, bytes }),
        onAllSent: (key) => apply({ type: 'all-sent', key }),
        onStored: (key, part) => {
          apply({ type: 'stored', key, part });
          // A small mesh is measured before this answer has arrived: what was said about it meanwhile found nobody here to hear it.
          readAgain(part.id);
        },
        onFailed: (key, problem) => apply({ type: 'failed', key, problem }),
      }),
  );
  return transport;
}

function ship(key: string, how: 'send' | 'retry'): void {
  const entry = entries.get().find((candidate) => candidate.key === key);
  const file = files.get(key);
  if (!entry || !file) return;
  getTransport().then(
    (ready) => ready[how]({ key, file, projectId: entry.projectId, setting: entry.setting }),
    () => {
      transport = undefined;
      apply({ type: 'failed', key, problem: 'The part of this page that sends files could not be read. Check the connection and try again.' });
    },
  );
}

export function addUploads(projectId: string, chosen: readonly File[], setting: CompleteUploadRequest['setting']): void {
  const added = chosen.map((file): UploadEntry => {
    const key = `upload-${(lastKey += 1)}`;
    files.set(key, file);
    return { key, projectId, fileName: file.name, sizeBytes: file.size, setting, phase: 'waiting', sentBytes: 0 };
  });
  entries.set((list) => [...list, ...added]);
  for (const { key } of added) ship(key, 'send');
}

export function retryUpload(key: string): void {
  apply({ type: 'tried-again', key });
  ship(key, 'retry');
}

export function cancelOneUpload(key: string): void {
  apply({ type: 'cancelled', key });
  void transport?.then((ready) => ready.cancel(key));
}

/** Takes what is over off the list; the parts themselves stay, of course. */
export function clearSettledUploads(): void {
  entries.set((list) => {
    for (const entry of list) if (isSettled(entry)) files.delete(entry.key);
    return list.filter((entry) => !isSettled(entry));
  });
}

/** Before a person signs out: nothing of theirs may go on, or be seen, after that. */
export function stopUploads(): void {
  for (const entry of entries.get()) if (isUnfinished(entry)) cancelOneUpload(entry.key);
  entries.set([]);
  files.clear();
}

export function applyRunToUploads({ partId, state, stage, progress }: Extract<ServerEvent, { type: 'run' }>): void {
  if (!entries.get().some((entry) => entry.part?.id === partId)) return;
  apply({ type: 'run', partId, run: { state, stage, progress } });
  // The event says that it failed, the part says why.
  if (state === 'failed') readAgain(partId);
}

/** After a gap in the event stream: asks about all that may have gone on meanwhile. */
export function readUploadsAgain(): void {
  for (const entry of entries.get()) if (entry.part && !isSettled(entry)) readAgain(entry.part.id);
}

const askBeforeLeaving = (event: BeforeUnloadEvent): void => event.preventDefault();

// The listener is there only while it is needed: a page with one can't be kept by the browser for going back.
entries.subscribe(() => {
  if (entries.get().some(isUnfinished)) addEventListener('beforeunload', askBeforeLeaving);
  else removeEventListener('beforeunload', askBeforeLeaving);
});

// An event can be lost and an answer can be old: what nothing more is heard of is asked about again.
const quietWatch = createQuietWatch(readAgain);
entries.subscribe(() => quietWatch.update(entries.get().flatMap((entry) => (entry.part && !isSettled(entry) ? [entry.part.id] : []))));

export const useUploads = (): readonly UploadEntry[] => useStore(entries);
export const useUnfinishedUploads = (): number => useUploads().filter(isUnfinished).length;
