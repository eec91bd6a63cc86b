import type { CompleteUploadRequest, IntakeSetting, MeasuringRun, NamedMaterial, NameMatches, Part } from '@masswright/contracts';
import type { LengthUnit } from '@masswright/units';
import type { QuickAnswer } from './quick-figures';

/**
 * waiting: chosen, not yet begun. sending: on its way to the storage. sent: all of it is there, and a decision of the person is awaited.
 * present: a part has this very file, so it is not sent. storing: the server makes a part of it. stored: a part; from here on its run says how far it is. failed: can be tried again. cancelled: by the person.
 */
export type UploadPhase = 'waiting' | 'sending' | 'sent' | 'storing' | 'stored' | 'present' | 'failed' | 'cancelled';

/** What a person has said of a mesh; null is not said, and never assumed. */
export interface Stated {
  lengthUnit: LengthUnit | null;
  material: NamedMaterial | null;
  densityKgM3: number | null;
}
export const nothingStated: Stated = { lengthUnit: null, material: null, densityKgM3: null };

export type NameMatch = NameMatches['matches'][number];
export type Decision = { as: 'part' } | { as: 'revision'; partId: string; reason: string };

export interface UploadEntry {
  key: string;
  projectId: string;
  /** Files that came together are asked about together. */
  dropId: string;
  fileName: string;
  folder: string;
  sizeBytes: number;
  /** Given where two files of the drop would make parts of one name. */
  partName?: string;
  phase: UploadPhase;
  paused: boolean;
  sentBytes: number;
  /** Of those, what was in the storage before and was not sent again. */
  keptBytes: number;
  sent?: { uploadId: string; partHashes: string[] };
  stated: Stated;
  /** What the server has been told of it. */
  told?: Stated;
  /** Parts with a file of that name; undefined while the server is being asked. */
  matches?: readonly NameMatch[];
  decision?: Decision;
  /** Whose file it is already. */
  presentIn?: NameMatch;
  quick?: QuickAnswer;
  /** Why it failed, for people. */
  problem?: string;
  part?: { id: string; isRevision: boolean; lengthUnit: LengthUnit | null; isDefensible: boolean | null; sameBytes: Part['sameBytes']; run: Pick<MeasuringRun, 'state' | 'stage' | 'progress'>; problem?: string };
}

export type UploadEvent =
  | { type: 'begun'; key: string }
  | { type: 'sent'; key: string; bytes: number; keptBytes: number }
  | { type: 'all-sent'; key: string; uploadId: string; partHashes: string[] }
  | { type: 'storing'; key: string }
  | { type: 'stored'; key: string; part: Part; told: Stated }
  | { type: 'told'; key: string; told: Stated }
  /** `unsent`: what the storage has is not this file, so it is to be sent again. `undecided`: it could not become what was decided. */
  | { type: 'failed'; key: string; problem: string; unsent?: boolean; undecided?: boolean }
  | { type: 'cancelled'; key: string }
  | { type: 'paused'; key: string; paused: boolean }
  | { type: 'tried-again'; key: string }
  | { type: 'stated'; key: string; stated: Partial<Stated> }
  | { type: 'matched'; key: string; matches: readonly NameMatch[] }
  | { type: 'found-present'; key: string; presentIn: NameMatch; part: Part | undefined }
  | { type: 'decided'; key: string; decision: Decision }
  | { type: 'read-quickly'; key: string; quick: QuickAnswer }
  | { type: 'run'; partId: string; run: Pick<MeasuringRun, 'state' | 'stage' | 'progress'> }
  | { type: 'read'; part: Part };

const running: readonly UploadPhase[] = ['waiting', 'sending', 'sent', 'storing'];

const isOver = ({ state }: Pick<MeasuringRun, 'state'>): boolean => state === 'done' || state === 'failed';

/** Still to be sent, or to be decided about: leaving the page now would lose it. */
export function isUnfinished(entry: UploadEntry): boolean {
  return running.includes(entry.phase);
}

/** Nothing more will happen to it by itself. */
export function isSettled(entry: UploadEntry): boolean {
  if (isUnfinished(entry)) return false;
  return entry.phase !== 'stored' || (entry.part !== undefined && isOver(entry.part.run));
}

/** The person has to say whether it is a new part or the next revision of one. */
export function awaitsDecision(entry: UploadEntry): boolean {
  return isUnfinished(entry) && (entry.matches?.length ?? 0) > 0 && entry.decision === undefined;
}

/** All of it is in the storage, and nothing is open that must be decided first. */
export function isReadyToStore(entry: UploadEntry): boolean {
  return entry.phase === 'sent' && entry.matches !== undefined && !awaitsDecision(entry);
}

const isSameStated = (one: Stated, other: Stated): boolean =>
  one.lengthUnit === other.lengthUnit && one.densityKgM3 === other.densityKgM3 && one.material?.id === other.material?.id;

/** The person has said something since the server was told; a revision keeps what it took over from the one before. */
export function isToBeTold(entry: UploadEntry): boolean {
  if ((entry.phase !== 'stored' && entry.phase !== 'present') || !entry.part || !entry.told) return false;
  if (entry.part.isRevision && entry.part.lengthUnit !== null) return false;
  return !isSameStated(entry.stated, entry.told);
}

/** What is stated, as a request says it: a material is named, and its density is the library's. */
export function writeIntakeSetting({ lengthUnit, material, densityKgM3 }: Stated): IntakeSetting {
  return material ? { lengthUnit, material: { id: material.id } } : { lengthUnit, densityKgM3 };
}

/** What makes a part of an entry. */
export function writeCompletion(entry: UploadEntry): CompleteUploadRequest {
  const { decision } = entry;
  return {
    partName: entry.partName,
    setting: writeIntakeSetting(entry.stated),
    revisionOf: decision?.as === 'revision' ? { partId: decision.partId, reason: decision.reason } : undefined,
    partHashes: entry.sent?.partHashes,
  };
}

function takePart({ id, revision, sameBytes }: Part): NonNullable<UploadEntry['part']> {
  const { state, stage, progress, error } = revision.run;
  const isDefensible = revision.measurement?.soundness.defensible ?? null;
  return { id, isRevision: revision.letter !== 'A', lengthUnit: revision.setting.lengthUnit, isDefensible, sameBytes, run: { state, stage, progress }, problem: error?.message };
}

/** The part that it was to be a revision of is gone: what is left is to be decided anew. */
function giveUpDecision({ decision, matches }: UploadEntry): Pick<UploadEntry, 'decision' | 'matches'> {
  const gone = decision?.as === 'revision' ? decision.partId : undefined;
  return { decision: undefined, matches: matches?.filter(({ partId }) => partId !== gone) };
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
      return entry.phase === 'sending' ? { ...entry, sentBytes: Math.min(event.bytes, entry.sizeBytes), keptBytes: event.keptBytes } : entry;
    case 'all-sent':
      return entry.phase === 'sending' ? { ...entry, phase: 'sent', paused: false, sentBytes: entry.sizeBytes, sent: { uploadId: event.uploadId, partHashes: event.partHashes } } : entry;
    case 'storing':
      return entry.phase === 'sent' ? { ...entry, phase: 'storing' } : entry;
    case 'stored':
      // Even after a cancel that came too late: the part exists, and the person must see it.
      return { ...entry, phase: 'stored', paused: false, sentBytes: entry.sizeBytes, problem: undefined, part: takePart(event.part), told: event.told };
    case 'told':
      return { ...entry, told: event.told };
    case 'failed':
      return isUnfinished(entry) ? { ...entry, phase: 'failed', paused: false, problem: event.problem, ...(event.unsent ? { sent: undefined } : {}), ...(event.undecided ? giveUpDecision(entry) : {}) } : entry;
    case 'cancelled':
      return isUnfinished(entry) || entry.phase === 'failed' ? { ...entry, phase: 'cancelled', paused: false, problem: undefined } : entry;
    case 'paused':
      return entry.phase === 'waiting' || entry.phase === 'sending' ? { ...entry, paused: event.paused } : entry;
    case 'tried-again':
      if (entry.phase === 'failed' && entry.sent) return { ...entry, phase: 'sent', problem: undefined };
      return entry.phase === 'failed' || entry.phase === 'cancelled' || entry.phase === 'present'
        ? { ...entry, phase: 'waiting', sentBytes: 0, keptBytes: 0, sent: undefined, presentIn: undefined, part: undefined, told: undefined, problem: undefined }
        : entry;
    case 'stated':
      return { ...entry, stated: { ...entry.stated, ...event.stated } };
    case 'matched':
      return { ...entry, matches: event.matches };
    case 'found-present':
      return entry.phase === 'waiting' ? { ...entry, phase: 'present', paused: false, presentIn: event.presentIn, ...(event.part ? { part: takePart(event.part), told: nothingStated } : {}) } : entry;
    case 'decided':
      return isUnfinished(entry) ? { ...entry, decision: event.decision } : entry;
    case 'read-quickly':
      return { ...entry, quick: event.quick };
    case 'run':
      return entry.part ? takeNews(entry, { ...entry.part, id: event.partId, run: event.run }) : entry;
    case 'read':
      return takeNews(entry, takePart(event.part));
  }
}

export function changeEntries(entries: readonly UploadEntry[], event: UploadEvent): readonly UploadEntry[] {
  let changed = false;
  const next = entries.map((entry) => {
    if ('key' in event && entry.key !== event.key) return entry;
    if (event.type === 'run' && entry.part?.id !== event.partId) return entry;
    const after = changeEntry(entry, event);
    changed ||= after !== entry;
    return after;
  });
  return changed ? next : entries;
}
