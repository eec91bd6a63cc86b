import { Button } from '@blueprintjs/core';
import { Link } from 'react-router-dom';
import { StatusTag, type Tone } from '../../../components/status-tag';
import { formatBytes } from '../../../lib/format-bytes';
import { computeShareDone, describeEntry, isSettled, isUnfinished, type UploadEntry } from '../model/upload-entry';
import { cancelOneUpload, retryUpload } from '../model/upload-queue';
import './uploads.css';

function chooseTone(entry: UploadEntry): Tone {
  if (entry.phase === 'failed' || entry.part?.run.state === 'failed') return 'wrong';
  if (entry.phase === 'cancelled') return 'neutral';
  return isSettled(entry) ? 'agreement' : 'busy';
}

function UploadRow({ entry }: { entry: UploadEntry }) {
  const problem = entry.problem ?? entry.part?.problem;
  const share = computeShareDone(entry);
  return (
    <li className="upload-row">
      <span className="figure file-name">
        {entry.part ? <Link to={`/projects/${entry.projectId}/parts/${entry.part.id}`}>{entry.fileName}</Link> : entry.fileName}
      </span>
      <span className="figure soft upload-bytes">
        {entry.phase === 'sending' ? `${formatBytes(entry.sentBytes)} of ${formatBytes(entry.sizeBytes)}` : formatBytes(entry.sizeBytes)}
      </span>
      <StatusTag tone={chooseTone(entry)} plain>
        {describeEntry(entry)}
      </StatusTag>
      <span className="upload-action">
        {isUnfinished(entry) && (
          <Button size="small" variant="minimal" onClick={() => cancelOneUpload(entry.key)} aria-label={`Cancel ${entry.fileName}`}>
            Cancel
          </Button>
        )}
        {(entry.phase === 'failed' || entry.phase === 'cancelled') && (
          <Button size="small" onClick={() => retryUpload(entry.key)} aria-label={`Send ${entry.fileName} again`}>
            Try again
          </Button>
        )}
      </span>
      {!isSettled(entry) && (
        <progress className="upload-progress" value={share} max={1} aria-label={`${entry.fileName}: ${describeEntry(entry)}`}>
          {Math.round(share * 100)} %
        </progress>
      )}
      {problem && <p className="upload-problem">{problem}</p>}
    </li>
  );
}

export function UploadList({ entries }: { entries: readonly UploadEntry[] }) {
  return (
    <ul className="upload-list">
      {entries.map((entry) => (
        <UploadRow key={entry.key} entry={entry} />
      ))}
    </ul>
  );
}
