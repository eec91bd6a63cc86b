import { Button } from '@blueprintjs/core';
import { useId, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { countOf } from '../../../lib/plural';
import { openUploadDialog, useIsUploadDialogOpen } from '../model/dialog-state';
import { summariseUploads } from '../model/upload-summary';
import { clearSettledUploads, useUploads } from '../model/upload-queue';
import { useTick } from '../model/use-tick';
import { UploadList } from './upload-list';
import { describeTotals } from './upload-totals';
import './uploads.css';

/** Uploads go on while a person looks at something else; the tray says how they do, and what they want. */
export function UploadTray() {
  const navigate = useNavigate();
  const entries = useUploads();
  const dialogOpen = useIsUploadDialogOpen();
  const [open, setOpen] = useState(false);
  const listId = useId();
  const summary = summariseUploads(entries);
  const tick = useTick(summary.sending > 0);
  if (entries.length === 0 || dialogOpen) return null;
  const wanting = entries.find((entry) => entry.matches !== undefined && entry.matches.length > 0 && entry.decision === undefined) ?? entries.find((entry) => entry.stated.lengthUnit === null);
  const question = summary.undecided > 0 ? `Decide about ${countOf(summary.undecided, 'file')}` : summary.unitMissing > 0 ? 'State the unit' : undefined;
  return (
    <section className="upload-tray screen-only" aria-label="Meshes being added">
      {open && (
        <div id={listId} className="upload-tray-list">
          <UploadList entries={entries} tick={tick} />
        </div>
      )}
      <div className="upload-tray-line">
        <span role="status">{summary.sentence}</span>
        {summary.bytesLeft > 0 && <span className="figure soft upload-tray-bytes">{describeTotals(summary)}</span>}
        {question && wanting && (
          <Button
            size="small"
            intent="primary"
            onClick={() => {
              void navigate(`/projects/${wanting.projectId}`);
              openUploadDialog(wanting.projectId);
            }}
          >
            {question}
          </Button>
        )}
        <Button size="small" variant="minimal" aria-expanded={open} aria-controls={listId} onClick={() => setOpen(!open)}>
          {open ? 'Hide' : 'Show'}
        </Button>
        {summary.settled && (
          <Button size="small" variant="minimal" onClick={clearSettledUploads}>
            Clear
          </Button>
        )}
      </div>
      {!summary.settled && <progress className="upload-progress" value={summary.share} max={1} aria-label={summary.sentence} />}
    </section>
  );
}
