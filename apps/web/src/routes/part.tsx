import { Button } from '@blueprintjs/core';
import type { Part } from '@masswright/contracts';
import { useState } from 'react';
import { useParams } from 'react-router-dom';
import { Failure } from '../components/failure';
import { Loading } from '../components/loading';
import { Crumbs, PageHeading } from '../components/page';
import { PageDrop } from '../components/page-drop';
import { PrintLine } from '../components/print-line';
import { useMaterialItems } from '../features/materials/api/materials';
import { usePart } from '../features/parts/api/parts';
import { DeletedNotice } from '../features/parts/components/deleted-notice';
import { PartStatement } from '../features/parts/components/part-statement';
import { RenamePartDialog } from '../features/parts/components/rename-part-dialog';
import { useSettingEditor } from '../features/parts/model/use-setting-editor';
import { useSignedIn } from '../features/session/api/session';
import { AddMeshesDialog } from '../features/uploads/components/add-meshes-dialog';
import { openUploadDialog } from '../features/uploads/model/dialog-state';

export function Component() {
  const { partId = '' } = useParams();
  const { data: part, error, refetch } = usePart(partId);
  if (error && !part) return <Failure error={error} onRetry={() => void refetch()} />;
  if (!part) return <Loading what="the part" />;
  return <PartPage key={part.id} part={part} />;
}

function PartPage({ part }: { part: Part }) {
  const session = useSignedIn();
  const { editor, state } = useSettingEditor(part);
  const materials = useMaterialItems();
  const [renaming, setRenaming] = useState(false);
  const replace = (): void => openUploadDialog(part.projectId, [], { partId: part.id, number: part.number, name: part.name });
  return (
    <PageDrop onFiles={part.can.edit ? (files, unreadable) => openUploadDialog(part.projectId, files, undefined, unreadable) : undefined}>
      <Crumbs
        crumbs={[
          { label: session.organisation.name, to: '/' },
          { label: part.projectName, to: `/projects/${part.projectId}` },
          { label: part.name },
        ]}
      />
      <PageHeading
        title={part.name}
        documentTitle={`${part.name} – ${part.projectName}`}
        above={
          <>
            Part <span className="figure">{part.number}</span> of {part.projectName}
          </>
        }
        beside={
          <span className="revision-tag">
            Revision <b className="figure">{part.revision.letter}</b>
          </span>
        }
        actions={
          part.can.edit && (
            <>
              <Button onClick={() => setRenaming(true)}>Rename</Button>
              <Button onClick={replace}>{part.state === 'failed' ? 'Replace the file' : 'New revision'}</Button>
            </>
          )
        }
      />
      {part.deletedAt !== null && <DeletedNotice part={part} deletedAt={part.deletedAt} canRestore={session.can.createProject} />}
      <PrintLine>
        {session.organisation.name}, {part.projectName}, part {part.number}, revision {part.revision.letter}, setting version {state.saved.version}
        {state.status !== 'saved' && ' with changes that are not saved'}
      </PrintLine>
      <PartStatement part={part} editor={editor} state={state} ownName={session.user.name} materials={materials} onReplace={part.can.edit ? replace : undefined} />
      <AddMeshesDialog projectId={part.projectId} materials={materials} />
      <RenamePartDialog part={part} isOpen={renaming} onClose={() => setRenaming(false)} />
    </PageDrop>
  );
}
