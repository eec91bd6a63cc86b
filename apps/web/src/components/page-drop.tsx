import { useEffect, useRef, useState, type DragEvent, type ReactNode } from 'react';
import { collectDrop, type DroppedFile } from '../lib/dropped-files';

const carriesFiles = (event: { dataTransfer: DataTransfer | null }): boolean => event.dataTransfer?.types.includes('Files') ?? false;

interface PageDropProps {
  /** `unreadable`: names of what the browser could not read. */
  onFiles: ((files: readonly DroppedFile[], unreadable: readonly string[]) => void) | undefined;
  children: ReactNode;
}

/** A whole page on which files and folders can be dropped, the band above it too; beside it a browser would open the file and leave the page. */
export function PageDrop({ onFiles, children }: PageDropProps) {
  const depth = useRef(0);
  const [over, setOver] = useState(false);
  useEffect(() => {
    if (!onFiles) return;
    const allow = (event: globalThis.DragEvent): void => {
      if (carriesFiles(event)) event.preventDefault();
    };
    const take = (event: globalThis.DragEvent): void => {
      // What a dialog of the page has taken already is prevented by now.
      if (!carriesFiles(event) || event.defaultPrevented || !event.dataTransfer) return;
      event.preventDefault();
      void collectDrop(event.dataTransfer).then(({ files, unreadable }) => onFiles(files, unreadable));
    };
    const end = (): void => {
      depth.current = 0;
      setOver(false);
    };
    addEventListener('dragover', allow);
    addEventListener('drop', take);
    addEventListener('drop', end, true);
    return () => {
      removeEventListener('dragover', allow);
      removeEventListener('drop', take);
      removeEventListener('drop', end, true);
    };
  }, [onFiles]);
  if (!onFiles) return <>{children}</>;
  const move = (event: DragEvent, step: 1 | -1): void => {
    if (!carriesFiles(event)) return;
    // Entering a child leaves its parent: only the outermost leave counts.
    depth.current = Math.max(0, depth.current + step);
    setOver(depth.current > 0);
  };
  return (
    <div className={`page-drop${over ? ' page-drop-over' : ''}`} onDragEnter={(event) => move(event, 1)} onDragLeave={(event) => move(event, -1)}>
      {children}
    </div>
  );
}
