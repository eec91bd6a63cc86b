import { useRef, useState, type DragEvent, type ReactNode } from 'react';

const carriesFiles = (event: DragEvent): boolean => event.dataTransfer.types.includes('Files');

/** A whole page on which files can be dropped. */
export function PageDrop({ onFiles, children }: { onFiles: ((files: readonly File[]) => void) | undefined; children: ReactNode }) {
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
        event.preventDefault();
        depth.current = 0;
        setOver(false);
        onFiles([...event.dataTransfer.files]);
      }}
    >
      {children}
    </div>
  );
}
