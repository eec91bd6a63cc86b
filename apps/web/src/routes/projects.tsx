import { Button } from '@blueprintjs/core';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Failure } from '../components/failure';
import { Loading } from '../components/loading';
import { Crumbs, PageHeading } from '../components/page';
import { useCreateProject, useProjects } from '../features/projects/api/projects';
import { FirstProject } from '../features/projects/components/first-project';
import { ProjectList } from '../features/projects/components/project-list';
import { ProjectNameDialog } from '../features/projects/components/project-name-dialog';
import { useSignedIn } from '../features/session/api/session';
import { countOf } from '../lib/plural';

export function Component() {
  const session = useSignedIn();
  const { data: projects, error, refetch } = useProjects();
  const create = useCreateProject();
  const navigate = useNavigate();
  const [asking, setAsking] = useState(false);
  const ask = session.can.createProject ? (
    <Button intent="primary" onClick={() => setAsking(true)}>
      New project
    </Button>
  ) : undefined;
  const submit = (name: string): void => create.mutate({ name }, { onSuccess: (project) => void navigate(`/projects/${project.id}`) });
  const empty = projects?.length === 0;
  return (
    <>
      <Crumbs crumbs={[{ label: session.organisation.name }]} />
      <PageHeading
        title="Projects"
        above={session.organisation.name}
        beside={projects && !empty && <span className="soft">{countOf(projects.length, 'project')}</span>}
        actions={empty ? undefined : ask}
      />
      {error && !projects && <Failure error={error} onRetry={() => void refetch()} />}
      {!projects && !error && <Loading what="the projects" />}
      {empty && <FirstProject action={ask} />}
      {projects && !empty && <ProjectList projects={projects} />}
      <ProjectNameDialog
        title="New project"
        submitLabel="Make the project"
        name=""
        isOpen={asking}
        isBusy={create.isPending}
        error={create.error}
        onSubmit={submit}
        onClose={() => setAsking(false)}
      />
    </>
  );
}
