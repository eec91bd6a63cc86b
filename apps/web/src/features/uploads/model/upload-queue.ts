import { cleanFileName, cleanFolder, dropMeshEnding, fileNameKey, type ServerEvent } from '@masswright/contracts';
import pLimit from 'p-limit';
import { getSentence, isProblem, isWorthAnotherTry } from '../../../lib/problem';
import { createStore, useStore } from '../../../lib/store';
import { completeUpload, findNameMatches, readPartOfUpload, stateSettings } from '../api/uploads';
import type { DroppedFile } from '../../../lib/dropped-files';
import { orderMatches } from './name-matches';
import { createPace } from './pace';
import { createQuickReaders } from './quick-figures';
import { createPresenceCheck } from './presence-check';
import { createQuietWatch } from './quiet-watch';
import type { Shipment, Transport } from './transport';
import { changeEntries, isReadyToStore, isSettled, isToBeTold, isUnfinished, nothingStated, writeCompletion, writeIntakeSetting, type Decision, type NameMatch, type Stated, type UploadEntry, type UploadEvent } from './upload-entry';

/** Lives outside of React: files go on being sent while a person moves about in the application. */
const entries = createStore<readonly UploadEntry[]>([]);
/** Why what a person stated could not be stored; by project. */
const statingProblem = createStore<{ projectId: string; sentence: string } | undefined>(undefined);
const files = new Map<string, File>();
let lastKey = 0;
let lastDrop = 0;
let transport: Promise<Transport> | undefined;
const storing = pLimit(4);
export const pace = createPace();

const apply = (event: UploadEvent): void => entries.set((list) => changeEntries(list, event));
const find = (key: string): UploadEntry | undefined => entries.get().find((entry) => entry.key === key);

const quickReaders = createQuickReaders((key, quick) => apply({ type: 'read-quickly', key, quick }));

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
        onSent: (key, bytes, keptBytes) => {
          pace.note(key, bytes, keptBytes);
          apply({ type: 'sent', key, bytes, keptBytes });
        },
        onAllSent: (key, uploadId, partHashes) => {
          pace.forget(key);
          apply({ type: 'all-sent', key, uploadId, partHashes });
          storeIfReady(key);
        },
        onFailed: (key, problem) => {
          pace.forget(key);
          apply({ type: 'failed', key, problem });
        },
      }),
  );
  return transport;
}

/** Makes a part of what is wholly sent, unless the person has to decide something first. */
function storeIfReady(key: string): void {
  const entry = find(key);
  if (!entry || !isReadyToStore(entry)) return;
  apply({ type: 'storing', key });
  void storing(async () => {
    const ready = find(key);
    if (!ready?.sent) return;
    const told = ready.stated;
    try {
      const part = await completeUpload(ready.sent.uploadId, writeCompletion(ready));
      apply({ type: 'stored', key, part, told });
      void transport?.then((at) => at.forget(key));
      files.delete(key);
      // A small mesh is measured before this answer has arrived: what was said about it meanwhile found nobody here to hear it.
      readAgain(part.id);
      tellServer(ready.projectId);
    } catch (error) {
      // Of a next revision, a conflict is about its part, which was deleted meanwhile; of a new part, about the upload.
      const undecided = ready.decision?.as === 'revision' && (isProblem(error, 'conflict') || isProblem(error, 'not-found'));
      const unsent = !undecided && (isProblem(error, 'upload-incomplete') || isProblem(error, 'conflict'));
      if (unsent) void transport?.then((at) => at.startOver(key));
      apply({ type: 'failed', key, problem: getSentence(error), unsent, undecided });
    }
  });
}

function ship(key: string, how: 'send' | 'retry'): void {
  const entry = find(key);
  const file = files.get(key);
  if (!entry || !file) return;
  const shipment: Shipment = { key, file, folder: entry.folder, projectId: entry.projectId };
  getTransport().then(
    (ready) => {
      ready[how](shipment);
      if (find(key)?.paused) ready.pause(key);
    },
    () => {
      transport = undefined;
      apply({ type: 'failed', key, problem: 'The part of this page that sends files could not be read. Check the connection and try again.' });
    },
  );
}

/** Where a drop has two files of one name, the names of their parts tell their folders too. */
function findPartName({ file, folder }: DroppedFile, all: readonly DroppedFile[]): string | undefined {
  const key = fileNameKey(file.name);
  if (folder === '' || all.filter((other) => fileNameKey(other.file.name) === key).length < 2) return undefined;
  return `${dropMeshEnding(file.name)} (${cleanFolder(folder)})`.slice(0, 200);
}

/** Files of which is being asked whether parts have them; they are sent once that is known. */
const asking = new Set<string>();
const findPresence = createPresenceCheck();

/** Only what is missing is sent: a file that a part has already, byte for byte, is not. */
async function sendUnlessPresent(key: string, matches: readonly NameMatch[]): Promise<void> {
  const entry = find(key);
  const file = files.get(key);
  const presentIn = entry && file && (await findPresence(file, entry.folder, matches));
  // Its unit may not have been stated before the drop was broken off.
  const part = presentIn && (await readPartOfUpload(presentIn.partId).catch(() => undefined));
  if (!asking.delete(key) || find(key)?.phase !== 'waiting') return;
  if (!presentIn) return ship(key, 'send');
  if (part?.revision.setting.lengthUnit !== null) quickReaders.drop(key);
  apply({ type: 'found-present', key, presentIn, part });
}

async function askForMatches(projectId: string, added: readonly UploadEntry[], triesLeft = 3): Promise<void> {
  const tell = (matches: Awaited<ReturnType<typeof findNameMatches>>['matches']): void => {
    for (const { key, fileName, folder } of added) {
      const own = orderMatches(matches.filter((match) => match.fileName === fileName), folder);
      apply({ type: 'matched', key, matches: own });
      void sendUnlessPresent(key, own);
    }
  };
  try {
    tell((await findNameMatches(projectId, [...new Set(added.map(({ fileName }) => fileName))])).matches);
  } catch (error) {
    if (triesLeft > 0 && isWorthAnotherTry(error)) setTimeout(() => void askForMatches(projectId, added, triesLeft - 1), 2_000);
    else tell([]);
  }
}

export interface AddedFile extends DroppedFile {
  /** Known beforehand: the file replaces that of a part. */
  decision?: Decision;
}

/** Begins to send files as soon as it is known which of them are there already; what they are is asked meanwhile. Gives the drop's id. */
export function addUploads(projectId: string, chosen: readonly AddedFile[]): string {
  lastDrop += 1;
  const dropId = `drop ${lastDrop}`;
  const added = chosen.map((one): UploadEntry => {
    lastKey += 1;
    const key = `upload ${lastKey}`;
    const { file, folder, decision } = one;
    files.set(key, file);
    return {
      key,
      projectId,
      dropId,
      fileName: cleanFileName(file.name),
      folder: cleanFolder(folder),
      sizeBytes: file.size,
      partName: findPartName(one, chosen),
      phase: 'waiting',
      paused: false,
      sentBytes: 0,
      keptBytes: 0,
      stated: nothingStated,
      ...(decision ? { decision, matches: [] } : {}),
    };
  });
  entries.set((list) => [...list, ...added]);
  void transport?.then((ready) => ready.forgetBegun(projectId));
  for (const { key, matches } of added) {
    const file = files.get(key);
    if (file) quickReaders.read({ key, file });
    if (matches === undefined) asking.add(key);
    else ship(key, 'send');
  }
  void askForMatches(projectId, added.filter(({ matches }) => matches === undefined));
  return dropId;
}

/** What the person says of some files: of those that are parts by now, the server is told; the others take it with them. */
export function stateUploads(keys: readonly string[], stated: Partial<Stated>): void {
  const wanted = new Set(keys);
  for (const key of wanted) apply({ type: 'stated', key, stated });
  for (const projectId of new Set(entries.get().filter(({ key }) => wanted.has(key)).map((entry) => entry.projectId))) tellServer(projectId);
}

const telling = new Set<string>();

/** Tells the server what was stated of files that are parts already; parts of which the same was said are told about together. */
export function tellServer(projectId: string): void {
  if (telling.has(projectId)) return;
  const untold = entries.get().filter((entry) => entry.projectId === projectId && isToBeTold(entry));
  const [first] = untold;
  if (!first) {
    statingProblem.set(undefined);
    return;
  }
  const { stated } = first;
  const same = untold.filter((entry) => JSON.stringify(entry.stated) === JSON.stringify(stated));
  telling.add(projectId);
  stateSettings(projectId, { parts: { ids: same.flatMap(({ part }) => part?.id ?? []) }, change: writeIntakeSetting(stated) }).then(
    () => {
      telling.delete(projectId);
      for (const { key } of same) apply({ type: 'told', key, told: stated });
      tellServer(projectId);
    },
    (error: unknown) => {
      telling.delete(projectId);
      statingProblem.set({ projectId, sentence: getSentence(error) });
      if (isWorthAnotherTry(error)) setTimeout(() => tellServer(projectId), 4_000);
    },
  );
}

export function decideUploads(keys: readonly string[], decide: (entry: UploadEntry) => Decision): void {
  for (const key of keys) {
    const entry = find(key);
    if (!entry) continue;
    apply({ type: 'decided', key, decision: decide(entry) });
    storeIfReady(key);
  }
}

export function retryUpload(key: string): void {
  asking.delete(key);
  apply({ type: 'tried-again', key });
  if (find(key)?.phase === 'sent') storeIfReady(key);
  else ship(key, 'retry');
}

export function pauseUploads(keys: readonly string[], paused: boolean): void {
  for (const key of keys) {
    apply({ type: 'paused', key, paused });
    pace.forget(key);
    void transport?.then((ready) => (paused ? ready.pause(key) : ready.resume(key)));
  }
}

export function cancelUploads(keys: readonly string[]): void {
  for (const key of keys) {
    const entry = find(key);
    if (!entry || entry.phase === 'storing' || entry.phase === 'stored') continue;
    apply({ type: 'cancelled', key });
    pace.forget(key);
    quickReaders.drop(key);
    void transport?.then((ready) => ready.cancel(key));
  }
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
  cancelUploads(entries.get().filter(isUnfinished).map(({ key }) => key));
  entries.set([]);
  files.clear();
}

export function applyRunToUploads({ partId, state, stage, progress }: Extract<ServerEvent, { type: 'run' }>): void {
  if (!entries.get().some((entry) => entry.part?.id === partId)) return;
  apply({ type: 'run', partId, run: { state, stage, progress } });
  // The event says that it has ended; the part says why, or where its bytes are already.
  if (state === 'failed' || state === 'done') readAgain(partId);
}

/** After a gap in the event stream: asks about all that may have gone on meanwhile. */
export function readUploadsAgain(): void {
  for (const entry of entries.get()) if (entry.part && !isSettled(entry)) readAgain(entry.part.id);
}

const askBeforeLeaving = (event: BeforeUnloadEvent): void => event.preventDefault();

// The listener is there only while it is needed: a page with one can't be kept by the browser for going back.
entries.subscribe(() => {
  if (entries.get().some((entry) => isUnfinished(entry) || isToBeTold(entry))) addEventListener('beforeunload', askBeforeLeaving);
  else removeEventListener('beforeunload', askBeforeLeaving);
});

// An event can be lost and an answer can be old: what nothing more is heard of is asked about again.
const quietWatch = createQuietWatch(readAgain);
entries.subscribe(() => quietWatch.update(entries.get().flatMap((entry) => (entry.part && !isSettled(entry) ? [entry.part.id] : []))));

export const useUploads = (): readonly UploadEntry[] => useStore(entries);
export const useUnfinishedUploads = (): number => useUploads().filter(isUnfinished).length;
export const useStatingProblem = (): { projectId: string; sentence: string } | undefined => useStore(statingProblem);
