import type { CompleteUploadRequest, MeasuringRun, Part } from '@masswright/contracts';

/**
 * waiting: chosen, not yet begun. sending: on its way to the storage. storing: all sent, the server makes a part of it.
 * stored: a part; from here on its run says how far it is. failed: can be tried again. cancelled: by the person.
 */
export type UploadPhase = 'waiting' | 'sending' | 'storing' | 'stored' | 'failed' | 'cancelled';

export interface UploadEntry {
  key: string;
  projectId: string;
  fileName: string;
  sizeBytes: number;
  setting: CompleteUploadRequest['setting'];
  phase: UploadPhase;
  sentBytes: number;
  /** Why it failed, for people. */
  problem?: string;
  part?: { id: string; run: Pick<MeasuringRun, 'state' | 'stage' | 'progress'>; problem?: string };
}

export type UploadEvent =
  | { type: 'begun'; key: string }
  | { type: 'sent'; key: string; bytes: number }
  | { type: 'all-sent'; key: string }
  | { type: 'stored'; key: string; part: Part }
  | { type: 'failed'; key: string; problem: string }
  | { type: 'cancelled'; key: string }
  | { type: 'tried-again'; key: string }
  | { type: 'run'; partId: string; run: Pick<MeasuringRun, 'state' | 'stage' | 'progress'> }
  | { type: 'read'; part: Part };

const running: readonly UploadPhase[] = ['waiting', 'sending', 'storing'];

const isOver = ({ state }: Pick<MeasuringRun, 'state'>): boolean => state === 'done' || state === 'failed';

/** Still to be sent: leaving the page now would lose it. */
export function isUnfinished(entry: UploadEntry): boolean {
  return running.includes(entry.phase);
}

/** Nothing more will happen to it by itself. */
export function isSettled(entry: UploadEntry): boolean {
  if (isUnfinished(entry)) return false;
  return entry.phase !== 'stored' || (entry.part !== undefined && isOver(entry.part.run));
}

function takePart({ id, revision }: Part): NonNullable<UploadEntry['part']> {
  const { state, stage, progress, error } = revision.run;
  return { id, run: { state, stage, progress }, problem: error?.message };
}

/** What was heard of a run takes the place of what was known, unless it was said before the end that is known already. */
function takeNews(entry: UploadEntry, news: NonNullable<UploadEntry['part']>): UploadEntry {
  const { part } = entry;
  if (part?.id !== news.id) return entry;
  if (isOver(part.run) && !isOver(news.run)) return entry;
  return { ...entry, part: news };
}

/** What an event makes of an entry. What comes too late (progress of a cancelled file, say) changes nothing. */
function changeEntry(entry: UploadEntry, event: UploadEvent): UploadEntry {
  switch (event.type) {
    case 'begun':
      return entry.phase === 'waiting' ? { ...entry, phase: 'sending' } : entry;
    case 'sent':
      return entry.phase === 'sending' ? { ...entry, sentBytes: Math.min(event.bytes, entry.sizeBytes) } : entry;
    case 'all-sent':
      return entry.phase === 'sending' ? { ...entry, phase: 'storing', sentBytes: entry.sizeBytes } : entry;
    case 'stored': {
      // Even after a cancel that came too late: the part exists, and the person must see it.
      return { ...entry, phase: 'stored', sentBytes: entry.sizeBytes, problem: undefined, part: takePart(event.part) };
    }
    case 'failed':
      return isUnfinished(entry) ? { ...entry, phase: 'failed', problem: event.problem } : entry;
    case 'cancelled':
      return isUnfinished(entry) || entry.phase === 'failed' ? { ...entry, phase: 'cancelled', problem: undefined } : entry;
    case 'tried-again':
      return entry.phase === 'failed' || entry.phase === 'cancelled' ? { ...entry, phase: 'waiting', sentBytes: 0, problem: undefined } : entry;
    case 'run':
      return takeNews(entry, { id: event.partId, run: event.run, problem: entry.part?.problem });
    case 'read':
      return takeNews(entry, takePart(event.part));
  }
}

export function changeEntries(entries: readonly UploadEntry[], event: UploadEvent): readonly UploadEntry[] {
  let changed = false;
  const next = entries.map((entry) => {
    if ('key' in event && entry.key !== event.key) return entry;
    const after = changeEntry(entry, event);
    changed ||= after !== entry;
    return after;
  });
  return changed ? next : entries;
}

const stageWords: Record<MeasuringRun['stage'], string> = {
  waiting: 'Waiting to be measured',
  hashing: 'Comparing with known files',
  reading: 'Reading the file',
  measuring: 'Measuring',
  storing: 'Storing the figures',
};

/** Where an entry is, in words. */
export function describeEntry(entry: UploadEntry): string {
  switch (entry.phase) {
    case 'waiting':
      return 'Waiting';
    case 'sending':
      return 'Sending';
    case 'storing':
      return 'Sent, being stored';
    case 'failed':
      return 'Not sent';
    case 'cancelled':
      return 'Cancelled';
    case 'stored':
      if (entry.part?.run.state === 'done') return 'Measured';
      if (entry.part?.run.state === 'failed') return 'Could not be measured';
      return stageWords[entry.part?.run.stage ?? 'waiting'];
  }
}

/** How far an entry is on its whole way, from 0 to 1; half of the way is sending, half measuring. */
export function computeShareDone(entry: UploadEntry): number {
  if (entry.phase === 'stored') return entry.part?.run.state === 'done' ? 1 : 0.5 + (entry.part?.run.progress ?? 0) / 2;
  return entry.sizeBytes > 0 ? (entry.sentBytes / entry.sizeBytes) * 0.5 : 0;
}
