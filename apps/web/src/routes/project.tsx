import { Button } from '@blueprintjs/core';
import { useState } from 'react';
import { useParams } from 'react-router-dom';
import { Failure } from '../components/failure';
import { Loading } from '../components/loading';
import { Crumbs, PageHeading } from '../components/page';
import { PageDrop } from '../components/page-drop';
import { useParts } from '../features/parts/api/parts';
import { PartTable } from '../features/parts/components/part-table';
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

function ProjectPage({ projectId }: { projectId: string }) {
  const session = useSignedIn();
  const { data: project, error, refetch } = useProject(projectId);
  const rename = useRenameProject(projectId);
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
    <PageDrop onFiles={can.addMeshes ? (files) => openUploadDialog(projectId, files) : undefined}>
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
      <Parts projectId={projectId} add={add} isCountedEmpty={project.parts === 0} />
      <AddMeshesDialog projectId={projectId} />
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

interface PartsProps {
  projectId: string;
  add: React.ReactNode;
  /** What the project itself says; the list may be older than that. */
  isCountedEmpty: boolean;
}

function Parts({ projectId, add, isCountedEmpty }: PartsProps) {
  const isSending = useUploads().some((entry) => entry.projectId === projectId && (isUnfinished(entry) || entry.phase === 'stored'));
  const { data, error, refetch, hasNextPage, fetchNextPage, isFetchingNextPage } = useParts(projectId);
  if (error && !data) return <Failure error={error} onRetry={() => void refetch()} />;
  if (!data) return <Loading what="the parts" />;
  const rows = data.pages.flatMap((page) => page.items);
  if (rows.length === 0 && (!isCountedEmpty || isSending)) return <Loading what="the parts" />;
  if (rows.length === 0) {
    return (
      <section className="no-parts">
        <h2>This project has no parts yet</h2>
        <p className="soft">
          {add
            ? 'Drop STL files anywhere on this page, or add them with the button. Each file becomes a part; its mass properties appear in its row a moment after it has arrived.'
            : 'An engineer or an administrator of your organisation can add meshes to it.'}
        </p>
      </section>
    );
  }
  return (
    <>
      <PartTable rows={rows} />
      {hasNextPage && (
        <div className="part-more screen-only">
          <Button loading={isFetchingNextPage} onClick={() => void fetchNextPage()}>
            Show more parts
          </Button>
        </div>
      )}
    </>
  );
}
