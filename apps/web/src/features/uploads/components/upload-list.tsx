import { Button } from '@blueprintjs/core';
import { memo } from 'react';
import { Link } from 'react-router-dom';
import { StatusTag, type Tone } from '../../../components/status-tag';
import { formatBytes } from '../../../lib/format-bytes';
import { describeTimeLeft } from '../model/pace';
import { isRefusal } from '../model/quick-figures';
import { awaitsDecision, isSettled, isUnfinished, type UploadEntry } from '../model/upload-entry';
import { cancelUploads, pace, pauseUploads, retryUpload } from '../model/upload-queue';
import { computeShareDone, describeEntry, describeSameBytes } from '../model/upload-words';
import './uploads.css';

function chooseTone(entry: UploadEntry): Tone {
  if (entry.phase === 'failed' || entry.part?.run.state === 'failed') return 'wrong';
  if (entry.phase === 'cancelled' || entry.paused) return 'neutral';
  if (awaitsDecision(entry) || entry.part?.isDefensible === false) return 'doubt';
  return isSettled(entry) ? 'agreement' : 'busy';
}

/** How much of it has gone, how fast, and how long it will take. */
function describeSending(entry: UploadEntry): string {
  const { sentBytes, sizeBytes, keptBytes } = entry;
  if (entry.phase !== 'sending') return formatBytes(sizeBytes);
  const rate = pace.read(entry.key);
  return [
    `${formatBytes(sentBytes)} of ${formatBytes(sizeBytes)}`,
    keptBytes > 0 && `${formatBytes(keptBytes)} were there`,
    rate !== undefined && `${formatBytes(Math.round(rate))}/s`,
    describeTimeLeft(sizeBytes - sentBytes, rate),
  ]
    .filter(Boolean)
    .join(', ');
}

function UploadActions({ entry }: { entry: UploadEntry }) {
  const { key, fileName, phase } = entry;
  const canPause = phase === 'waiting' || phase === 'sending';
  return (
    <span className="upload-action">
      {canPause && (
        <Button size="small" variant="minimal" onClick={() => pauseUploads([key], !entry.paused)} aria-label={`${entry.paused ? 'Continue' : 'Pause'} ${fileName}`}>
          {entry.paused ? 'Continue' : 'Pause'}
        </Button>
      )}
      {isUnfinished(entry) && phase !== 'storing' && (
        <Button size="small" variant="minimal" onClick={() => cancelUploads([key])} aria-label={`Cancel ${fileName}`}>
          Cancel
        </Button>
      )}
      {phase === 'present' && (
        <Button size="small" variant="minimal" onClick={() => retryUpload(key)} aria-label={`Send all the same: ${fileName}`}>
          Send all the same
        </Button>
      )}
      {(phase === 'failed' || phase === 'cancelled') && (
        <Button size="small" onClick={() => retryUpload(key)} aria-label={`Try again: ${fileName}`}>
          Try again
        </Button>
      )}
    </span>
  );
}

/** `tick` changes once a second while files are sent: rates and times go on also when nothing arrives. */
const UploadRow = memo(function UploadRow({ entry }: { entry: UploadEntry; tick: number }) {
  const foreseen = isUnfinished(entry) && isRefusal(entry.quick) ? `It can’t be measured: ${entry.quick.error.message}` : undefined;
  const problem = entry.problem ?? entry.part?.problem ?? foreseen;
  const share = computeShareDone(entry);
  const sameBytes = describeSameBytes(entry);
  const partId = entry.part?.id ?? entry.presentIn?.partId;
  return (
    <li className="upload-row">
      <span className="figure file-name" title={entry.folder ? `${entry.folder}/${entry.fileName}` : entry.fileName}>
        {partId ? <Link to={`/projects/${entry.projectId}/parts/${partId}`}>{entry.fileName}</Link> : entry.fileName}
        {entry.folder && <span className="soft upload-folder"> {entry.folder}</span>}
      </span>
      <span className="figure soft upload-bytes">{describeSending(entry)}</span>
      <StatusTag tone={chooseTone(entry)} plain>
        {describeEntry(entry)}
      </StatusTag>
      <UploadActions entry={entry} />
      {!isSettled(entry) && (
        <progress className="upload-progress" value={share} max={1} aria-label={`${entry.fileName}: ${describeEntry(entry)}`}>
          {Math.round(share * 100)} %
        </progress>
      )}
      {sameBytes && <p className="upload-note soft">{sameBytes}</p>}
      {problem && <p className="upload-problem">{problem}</p>}
    </li>
  );
});

export function UploadList({ entries, tick }: { entries: readonly UploadEntry[]; tick: number }) {
  return (
    <ul className="upload-list" aria-label="Files">
      {entries.map((entry) => (
        <UploadRow key={entry.key} entry={entry} tick={entry.phase === 'sending' ? tick : 0} />
      ))}
    </ul>
  );
}
