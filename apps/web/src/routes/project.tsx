import { Button } from '@blueprintjs/core';
import type { PartRow } from '@masswright/contracts';
import { useState } from 'react';
import { useParams } from 'react-router-dom';
import { Failure } from '../components/failure';
import { Loading } from '../components/loading';
import { Crumbs, PageHeading } from '../components/page';
import { PageDrop } from '../components/page-drop';
import { useMaterialItems } from '../features/materials/api/materials';
import { PartList } from '../features/parts/components/part-list';
import { useProject, useRenameProject } from '../features/projects/api/projects';
import { ProjectNameDialog } from '../features/projects/components/project-name-dialog';
import { useSignedIn } from '../features/session/api/session';
import { AddMeshesDialog } from '../features/uploads/components/add-meshes-dialog';
import { openUploadDialog } from '../features/uploads/model/dialog-state';
import { isUnfinished } from '../features/uploads/model/upload-entry';
import { useUploads } from '../features/uploads/model/upload-queue';
import { countOf } from '../lib/plural';

export function Component() {
  const { projectId = '' } = useParams();
  return <ProjectPage key={projectId} projectId={projectId} />;
}

const replaceFile = ({ id, projectId, number, name }: PartRow): void => openUploadDialog(projectId, [], { partId: id, number, name });

function ProjectPage({ projectId }: { projectId: string }) {
  const session = useSignedIn();
  const { data: project, error, refetch } = useProject(projectId);
  const rename = useRenameProject(projectId);
  const materials = useMaterialItems();
  const [renaming, setRenaming] = useState(false);
  if (error && !project) return <Failure error={error} onRetry={() => void refetch()} />;
  if (!project) return <Loading what="the project" />;
  const { can } = project;
  const add = can.addMeshes ? (
    <Button intent="primary" onClick={() => openUploadDialog(projectId)}>
      Add meshes
    </Button>
  ) : undefined;
  return (
    <PageDrop onFiles={can.addMeshes ? (files, unreadable) => openUploadDialog(projectId, files, undefined, unreadable) : undefined}>
      <div className="project-page">
        <Crumbs crumbs={[{ label: session.organisation.name, to: '/' }, { label: project.name }]} />
        <PageHeading
          title={project.name}
          beside={<span className="soft">{project.parts === 0 ? 'No parts yet' : countOf(project.parts, 'part')}</span>}
          actions={
            <>
              {can.rename && <Button onClick={() => setRenaming(true)}>Rename</Button>}
              {add}
            </>
          }
        />
        <PartList
          projectId={projectId}
          canEdit={can.addMeshes}
          materials={materials}
          onReplace={can.addMeshes ? replaceFile : undefined}
          empty={<NoParts projectId={projectId} add={add} />}
        />
      </div>
      <AddMeshesDialog projectId={projectId} materials={materials} />
      <ProjectNameDialog
        title="Rename the project"
        submitLabel="Rename"
        name={project.name}
        isOpen={renaming}
        isBusy={rename.isPending}
        error={rename.error}
        onSubmit={(name) => rename.mutate({ name }, { onSuccess: () => setRenaming(false) })}
        onClose={() => setRenaming(false)}
      />
    </PageDrop>
  );
}

/** A project before its first part; files that are on their way there are not nothing. */
function NoParts({ projectId, add }: { projectId: string; add: React.ReactNode }) {
  const isSending = useUploads().some((entry) => entry.projectId === projectId && (isUnfinished(entry) || entry.phase === 'stored'));
  if (isSending) return <Loading what="the parts" />;
  return (
    <section className="no-parts">
      <h2>This project has no parts yet</h2>
      <p className="soft">
        {add
          ? 'Drop mesh files (STL, OBJ, PLY, OFF, 3MF or glTF), or a folder of them, anywhere on this page, or add them with the button. Each file becomes a part; its mass properties appear in its row a moment after it has arrived.'
          : 'An engineer or an administrator of your organisation can add meshes to it.'}
      </p>
    </section>
  );
}
