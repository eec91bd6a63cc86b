import { countOf } from '../../../lib/plural';
import { awaitsDecision, isSettled, isUnfinished, type UploadEntry } from './upload-entry';
import { computeShareDone } from './upload-words';

export interface UploadSummary {
  sentence: string;
  share: number;
  settled: boolean;
  wrong: boolean;
  /** Of what is still to be sent. */
  bytesLeft: number;
  sentBytes: number;
  totalBytes: number;
  sending: number;
  paused: number;
  undecided: number;
  unitMissing: number;
}

/** It is a part, or becomes one. */
const isCounted = ({ phase }: UploadEntry): boolean => phase !== 'cancelled' && phase !== 'failed' && phase !== 'present';

/** Nothing was said of its unit, and it needs one. */
export function lacksUnit(entry: UploadEntry): boolean {
  if (entry.phase === 'present') return entry.part?.lengthUnit === null && entry.stated.lengthUnit === null && entry.part.run.state !== 'failed';
  if (!isCounted(entry)) return false;
  if (entry.decision?.as === 'revision' || entry.part?.isRevision) return false;
  return entry.stated.lengthUnit === null && entry.part?.run.state !== 'failed';
}

/** All uploads in one line: how many are under way, and what became of the others. */
export function summariseUploads(entries: readonly UploadEntry[]): UploadSummary {
  const unfinished = entries.filter(isUnfinished);
  const measuring = entries.filter((entry) => !isUnfinished(entry) && !isSettled(entry)).length;
  const failed = entries.filter((entry) => entry.phase === 'failed' || entry.part?.run.state === 'failed').length;
  const done = entries.filter((entry) => entry.part?.run.state === 'done').length;
  const undecided = entries.filter(awaitsDecision).length;
  const paused = unfinished.filter((entry) => entry.paused).length;
  const waiting = unfinished.filter((entry) => entry.phase === 'sent' && awaitsDecision(entry)).length;
  const sending = unfinished.length - paused - waiting;
  const present = entries.filter(({ phase }) => phase === 'present').length;
  const words = [
    sending > 0 && `${sending} being sent`,
    paused > 0 && `${paused} paused`,
    waiting > 0 && `${waiting} sent and waiting for you`,
    measuring > 0 && `${measuring} being measured`,
    done > 0 && `${done} measured`,
    present > 0 && `${present} there already`,
    failed > 0 && `${failed} with a problem`,
  ].filter((word) => word !== false);
  const counted = entries.filter(isCounted);
  const share = counted.length === 0 ? 1 : counted.reduce((sum, entry) => sum + (isSettled(entry) ? 1 : computeShareDone(entry)), 0) / counted.length;
  const meshes = countOf(entries.length, 'mesh', 'meshes');
  return {
    sentence: words.length > 0 ? `${meshes}: ${words.join(', ')}` : meshes,
    share,
    settled: unfinished.length === 0 && measuring === 0,
    wrong: failed > 0,
    bytesLeft: unfinished.reduce((sum, entry) => sum + entry.sizeBytes - entry.sentBytes, 0),
    sentBytes: counted.reduce((sum, entry) => sum + entry.sentBytes, 0),
    totalBytes: counted.reduce((sum, entry) => sum + entry.sizeBytes, 0),
    sending,
    paused,
    undecided,
    unitMissing: entries.filter(lacksUnit).length,
  };
}
