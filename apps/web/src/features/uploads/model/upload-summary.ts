import { countOf } from '../../../lib/plural';
import { computeShareDone, isSettled, isUnfinished, type UploadEntry } from './upload-entry';

/** All uploads in one line: how many are under way, and what became of the others. */
export function summariseUploads(entries: readonly UploadEntry[]): { sentence: string; share: number; settled: boolean; wrong: boolean } {
  const sending = entries.filter(isUnfinished).length;
  const measuring = entries.filter((entry) => !isUnfinished(entry) && !isSettled(entry)).length;
  const failed = entries.filter((entry) => entry.phase === 'failed' || entry.part?.run.state === 'failed').length;
  const done = entries.filter((entry) => entry.part?.run.state === 'done').length;
  const words = [
    sending > 0 && `${sending} being sent`,
    measuring > 0 && `${measuring} being measured`,
    done > 0 && `${done} measured`,
    failed > 0 && `${failed} with a problem`,
  ].filter((word) => word !== false);
  const counted = entries.filter((entry) => entry.phase !== 'cancelled' && entry.phase !== 'failed');
  const share = counted.length === 0 ? 1 : counted.reduce((sum, entry) => sum + (isSettled(entry) ? 1 : computeShareDone(entry)), 0) / counted.length;
  return {
    sentence: words.length > 0 ? `${countOf(entries.length, 'mesh', 'meshes')}: ${words.join(', ')}` : countOf(entries.length, 'mesh', 'meshes'),
    share,
    settled: sending === 0 && measuring === 0,
    wrong: failed > 0,
  };
}
