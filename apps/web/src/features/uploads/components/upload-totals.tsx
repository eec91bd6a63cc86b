import { Button } from '@blueprintjs/core';
import { formatBytes } from '../../../lib/format-bytes';
import { describeTimeLeft, type Pace } from '../model/pace';
import { isUnfinished, type UploadEntry } from '../model/upload-entry';
import { cancelUploads, pace, pauseUploads } from '../model/upload-queue';
import type { UploadSummary } from '../model/upload-summary';

/** All files together: bytes, rate and time left. */
export function describeTotals({ sentBytes, totalBytes, bytesLeft, sending }: UploadSummary, { read }: Pick<Pace, 'read'> = pace): string {
  if (bytesLeft <= 0) return formatBytes(totalBytes);
  const rate = sending > 0 ? read() : undefined;
  return [`${formatBytes(sentBytes)} of ${formatBytes(totalBytes)}`, rate !== undefined && `${formatBytes(Math.round(rate))}/s`, describeTimeLeft(bytesLeft, rate)].filter(Boolean).join(', ');
}

export function UploadTotals({ entries, summary }: { entries: readonly UploadEntry[]; summary: UploadSummary; tick: number }) {
  const underWay = entries.filter((entry) => entry.phase === 'waiting' || entry.phase === 'sending').map(({ key }) => key);
  const isPaused = summary.sending === 0 && summary.paused > 0;
  return (
    <div className="upload-totals">
      <span role="status">{summary.sentence}</span>
      <span className="figure soft">{describeTotals(summary)}</span>
      <span className="upload-action">
        {underWay.length > 0 && (
          <>
            <Button size="small" variant="minimal" onClick={() => pauseUploads(underWay, !isPaused)}>
              {isPaused ? 'Continue all' : 'Pause all'}
            </Button>
            <Button size="small" variant="minimal" onClick={() => cancelUploads(entries.filter(isUnfinished).map(({ key }) => key))}>
              Cancel all
            </Button>
          </>
        )}
      </span>
      {!summary.settled && <progress className="upload-progress" value={summary.share} max={1} aria-label={summary.sentence} />}
    </div>
  );
}
