import { Button, Dialog, DialogFooter } from '@blueprintjs/core';
import { useState } from 'react';
import { DensityField } from '../../../components/density-field';
import { readDensity } from '../../../lib/density';
import { countOf } from '../../../lib/plural';
import { closeUploadDialog, useUploadDialog } from '../model/dialog-state';
import { isUnfinished } from '../model/upload-entry';
import { addUploads, useUploads } from '../model/upload-queue';
import { FilePicker } from './file-picker';
import { UnitQuestion, type UnitAnswer } from './unit-question';
import { UploadList } from './upload-list';
import './uploads.css';

/** Where a project's page puts it; it opens by `openUploadDialog`. */
export function AddMeshesDialog({ projectId }: { projectId: string }) {
  const dialog = useUploadDialog();
  const isOpen = dialog?.projectId === projectId;
  return (
    <Dialog title="Add meshes" isOpen={isOpen} onClose={closeUploadDialog} className="add-meshes" canOutsideClickClose={false}>
      {isOpen && <Steps projectId={projectId} dropped={dialog.files} />}
    </Dialog>
  );
}

function Steps({ projectId, dropped }: { projectId: string; dropped: readonly File[] }) {
  const [sent, setSent] = useState(false);
  return sent ? <Progress projectId={projectId} onMore={() => setSent(false)} /> : <Questions projectId={projectId} dropped={dropped} onSent={() => setSent(true)} />;
}

function Questions({ projectId, dropped, onSent }: { projectId: string; dropped: readonly File[]; onSent: () => void }) {
  const [files, setFiles] = useState<readonly File[]>(dropped);
  const [unit, setUnit] = useState<UnitAnswer>();
  const [density, setDensity] = useState('');
  const [asked, setAsked] = useState(false);
  const typed = readDensity(density);
  const missing = [
    files.length === 0 && 'Choose at least one file.',
    unit === undefined && 'Say in which unit the meshes are.',
    typed.error !== undefined && typed.error,
  ].filter((sentence) => sentence !== false);
  const submit = (): void => {
    if (missing.length > 0 || unit === undefined || typed.densityKgM3 === undefined) {
      setAsked(true);
      return;
    }
    addUploads(projectId, files, { lengthUnit: unit === 'later' ? null : unit, densityKgM3: typed.densityKgM3 });
    onSent();
  };
  return (
    <form
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
    >
      <div className="bp6-dialog-body add-meshes-body">
        <FilePicker
          files={files}
          onAdd={(added) => setFiles([...files, ...added])}
          onRemove={(file) => setFiles(files.filter((candidate) => candidate !== file))}
        />
        <UnitQuestion answer={unit} onAnswer={setUnit} files={files.length} />
        <DensityField
          text={density}
          onChange={setDensity}
          emptyHint="With its unit: 2.7 g/cm3, 7850 kg/m3. Leave it empty to state it later."
        />
      </div>
      <DialogFooter
        actions={
          <>
            <Button onClick={closeUploadDialog}>Cancel</Button>
            <Button type="submit" intent="primary">
              {files.length === 0 ? 'Add' : `Add ${countOf(files.length, 'mesh', 'meshes')}`}
            </Button>
          </>
        }
      >
        <span role="alert" className="add-meshes-missing">
          {asked && missing.join(' ')}
        </span>
      </DialogFooter>
    </form>
  );
}

function Progress({ projectId, onMore }: { projectId: string; onMore: () => void }) {
  const entries = useUploads().filter((entry) => entry.projectId === projectId);
  const sending = entries.filter(isUnfinished).length;
  return (
    <>
      <div className="bp6-dialog-body add-meshes-progress">
        <UploadList entries={entries} />
      </div>
      <DialogFooter
        actions={
          <>
            <Button onClick={onMore}>Add more</Button>
            <Button onClick={closeUploadDialog}>Close</Button>
          </>
        }
      >
        <span className="soft">{sending > 0 ? 'You can close this: they go on being sent.' : 'All are sent.'}</span>
      </DialogFooter>
    </>
  );
}
