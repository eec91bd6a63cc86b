import { useRef, useState, type DragEvent, type ReactNode } from 'react';
import { collectDrop, type DroppedFile } from '../lib/dropped-files';

const carriesFiles = (event: DragEvent): boolean => event.dataTransfer.types.includes('Files');

/** A whole page on which files and folders can be dropped. */
export function PageDrop({ onFiles, children }: { onFiles: ((files: readonly DroppedFile[]) => void) | undefined; children: ReactNode }) {
  const depth = useRef(0);
  const [over, setOver] = useState(false);
  if (!onFiles) return <>{children}</>;
  return (
    <div
      className={`page-drop${over ? ' page-drop-over' : ''}`}
      onDragEnter={(event) => {
        if (!carriesFiles(event)) return;
        depth.current += 1;
        setOver(true);
      }}
      onDragOver={(event) => {
        if (carriesFiles(event)) event.preventDefault();
      }}
      onDragLeave={(event) => {
        if (!carriesFiles(event)) return;
        // Entering a child leaves its parent: only the outermost leave counts.
        depth.current = Math.max(0, depth.current - 1);
        if (depth.current === 0) setOver(false);
      }}
      onDrop={(event) => {
        if (!carriesFiles(event)) return;
        // What happens in a dialog of the page comes here too, and there the files may have been taken already.
        const isTaken = event.isDefaultPrevented();
        event.preventDefault();
        depth.current = 0;
        setOver(false);
        if (!isTaken) void collectDrop(event.dataTransfer).then(onFiles);
      }}
    >
      {children}
    </div>
  );
}
