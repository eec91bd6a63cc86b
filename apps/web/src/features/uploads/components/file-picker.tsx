import { Button } from '@blueprintjs/core';
import { useRef, useState, type DragEvent } from 'react';
import { formatBytes } from '../../../lib/format-bytes';
import { countOf } from '../../../lib/plural';

interface FilePickerProps {
  files: readonly File[];
  onAdd: (files: readonly File[]) => void;
  onRemove: (file: File) => void;
}

export function FilePicker({ files, onAdd, onRemove }: FilePickerProps) {
  const input = useRef<HTMLInputElement>(null);
  const [over, setOver] = useState(false);
  const drop = (event: DragEvent): void => {
    event.preventDefault();
    setOver(false);
    onAdd([...event.dataTransfer.files]);
  };
  return (
    <div>
      <div
        className={`drop-place${over ? ' drop-place-over' : ''}`}
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={drop}
      >
        <p>
          Drop STL files here, or{' '}
          <Button size="small" onClick={() => input.current?.click()}>
            choose files
          </Button>
        </p>
        <p className="soft">Binary or text. One file becomes one part.</p>
        <input
          ref={input}
          type="file"
          multiple
          accept=".stl,model/stl,application/sla"
          className="hidden-visually"
          tabIndex={-1}
          aria-label="Mesh files"
          onChange={(event) => {
            onAdd([...(event.currentTarget.files ?? [])]);
            event.currentTarget.value = '';
          }}
        />
      </div>
      {files.length > 1 && (
        <p className="soft file-count">
          {countOf(files.length, 'file')}, {formatBytes(files.reduce((sum, { size }) => sum + size, 0))}
        </p>
      )}
      {files.length > 0 && (
        <ul className="file-list" aria-label="Chosen files" tabIndex={0}>
          {files.map((file, index) => (
            <li key={`${file.name} ${file.size} ${index}`}>
              <span className="figure file-name">{file.name}</span>
              <span className="figure soft">{formatBytes(file.size)}</span>
              <Button size="small" variant="minimal" onClick={() => onRemove(file)} aria-label={`Leave out ${file.name}`}>
                Leave out
              </Button>
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}
