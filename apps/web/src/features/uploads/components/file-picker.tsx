import { Button } from '@blueprintjs/core';
import { meshFileEndings } from '@masswright/contracts';
import { useRef, type InputHTMLAttributes } from 'react';
import { collectChosen, type DroppedFile } from '../../../lib/dropped-files';

interface FilePickerProps {
  onFiles: (files: readonly DroppedFile[]) => void;
  /** One file only, for a part's next revision. */
  single?: boolean;
  /** A line of buttons, where files were chosen already. */
  small?: boolean;
}

const types = ['model/stl', 'model/obj', 'model/3mf', 'model/gltf+json', 'model/gltf-binary', 'application/sla', 'application/gzip'];
const accepted = [...meshFileEndings.map((ending) => `.${ending}`), '.gz', ...types].join(',');
/** Browsers know it; the types of React do not. */
const folderField = { webkitdirectory: '' } as InputHTMLAttributes<HTMLInputElement>;

export function FilePicker({ onFiles, single = false, small = false }: FilePickerProps) {
  const files = useRef<HTMLInputElement>(null);
  const folder = useRef<HTMLInputElement>(null);
  const take = (input: HTMLInputElement): void => {
    onFiles(collectChosen(input.files ?? []));
    input.value = '';
  };
  return (
    <div className={small ? 'file-picker-small' : 'drop-place'}>
      {!small && <p>{single ? 'Drop the new file here, or' : 'Drop meshes or a folder here, or'}</p>}
      <p className="drop-place-buttons">
        <Button size={small ? 'small' : 'medium'} onClick={() => files.current?.click()} autoFocus={!small && !single}>
          {single ? 'Choose the file' : small ? 'Add files' : 'Choose files'}
        </Button>
        {!single && (
          <Button size={small ? 'small' : 'medium'} onClick={() => folder.current?.click()}>
            {small ? 'Add a folder' : 'Choose a folder'}
          </Button>
        )}
      </p>
      {!small && <p className="soft">STL, OBJ, PLY, OFF, 3MF and glTF; each may be packed with gzip.{single ? '' : ' One file is one part.'}</p>}
      <input ref={files} type="file" multiple={!single} accept={accepted} className="hidden-visually" tabIndex={-1} aria-label="Mesh files" onChange={(event) => take(event.currentTarget)} />
      {!single && <input ref={folder} type="file" multiple {...folderField} className="hidden-visually" tabIndex={-1} aria-label="Folder of meshes" onChange={(event) => take(event.currentTarget)} />}
    </div>
  );
}
