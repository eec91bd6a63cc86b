import { Button } from '@blueprintjs/core';
import { useId, useState } from 'react';
import { summariseUploads } from '../model/upload-summary';
import { clearSettledUploads, useUploads } from '../model/upload-queue';
import { useIsUploadDialogOpen } from '../model/dialog-state';
import { UploadList } from './upload-list';
import './uploads.css';

/** Uploads go on while a person looks at something else; the tray says how they do. */
export function UploadTray() {
  const entries = useUploads();
  const dialogOpen = useIsUploadDialogOpen();
  const [open, setOpen] = useState(false);
  const listId = useId();
  if (entries.length === 0 || dialogOpen) return null;
  const summary = summariseUploads(entries);
  return (
    <section className="upload-tray screen-only" aria-label="Meshes being added">
      {open && (
        <div id={listId} className="upload-tray-list">
          <UploadList entries={entries} />
        </div>
      )}
      <div className="upload-tray-line">
        <span role="status">{summary.sentence}</span>
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
