import { Button, InputGroup } from '@blueprintjs/core';
import type { Material } from '@masswright/contracts';
import { useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { Failure } from '../components/failure';
import { Loading } from '../components/loading';
import { Crumbs, PageHeading } from '../components/page';
import { ProblemNotice } from '../components/problem-notice';
import { materialsExportHref, useChangeMaterial, useCreateMaterial, useMaterials } from '../features/materials/api/materials';
import { ImportDialog } from '../features/materials/components/import-dialog';
import { MaterialDialog } from '../features/materials/components/material-dialog';
import { MaterialTable } from '../features/materials/components/material-table';
import { useSignedIn } from '../features/session/api/session';
import { filterMaterials } from '../lib/material-words';
import { countOf } from '../lib/plural';

/** Text and archived ones, as the address says them. */
function useMaterialFilter() {
  const [parameters, setParameters] = useSearchParams();
  const text = parameters.get('text') ?? '';
  const archived = parameters.get('archived') === 'true';
  const write = (next: { text: string; archived: boolean }): void => {
    const written = new URLSearchParams();
    if (next.text !== '') written.set('text', next.text);
    if (next.archived) written.set('archived', 'true');
    setParameters(written, { replace: true });
  };
  return { text, archived, setText: (typed: string) => write({ text: typed, archived }), setArchived: (shown: boolean) => write({ text, archived: shown }) };
}

type Asked = { kind: 'new' } | { kind: 'change'; material: Material } | { kind: 'import' };

export function Component() {
  const session = useSignedIn();
  const { data, error, refetch } = useMaterials();
  const { text, archived, setText, setArchived } = useMaterialFilter();
  const [asked, setAsked] = useState<Asked>();
  const create = useCreateMaterial();
  const change = useChangeMaterial();
  const close = (): void => {
    setAsked(undefined);
    create.reset();
    change.reset();
  };
  if (error && !data) return <Failure error={error} onRetry={() => void refetch()} />;
  if (!data) return <Loading what="the materials" />;
  const archivedCount = data.items.filter(({ archivedAt }) => archivedAt !== null).length;
  const shown = filterMaterials(archived ? data.items : data.items.filter(({ archivedAt }) => archivedAt === null), text);
  return (
    <>
      <Crumbs crumbs={[{ label: session.organisation.name, to: '/' }, { label: 'Materials' }]} />
      <PageHeading
        title="Materials"
        beside={<span className="soft">{countOf(data.items.length - archivedCount, 'material')}, each with how far its density may be off</span>}
        actions={
          <>
            <a className="bp6-button material-export" href={materialsExportHref} download>
              Export as CSV
            </a>
            {data.can.create && <Button onClick={() => setAsked({ kind: 'import' })}>Import a CSV</Button>}
            {data.can.create && (
              <Button intent="primary" onClick={() => setAsked({ kind: 'new' })}>
                New material
              </Button>
            )}
          </>
        }
      />
      <div className="material-tools screen-only" role="search">
        <InputGroup type="search" value={text} onValueChange={setText} placeholder="Search by name or family" aria-label="Search the materials" autoComplete="off" spellCheck={false} />
        {archivedCount > 0 && (
          <label>
            <input type="checkbox" checked={archived} onChange={(event) => setArchived(event.currentTarget.checked)} /> Show {countOf(archivedCount, 'archived one')}
          </label>
        )}
      </div>
      <ArchiveLine>{(archive) => <MaterialTable materials={shown} onChange={(material) => setAsked({ kind: 'change', material })} onArchive={archive} />}</ArchiveLine>
      {shown.length === 0 && (
        <div className="material-gap">
          <h2>No material has that in its name</h2>
          <p className="soft">
            {archivedCount > 0 && !archived ? 'It may be an archived one. ' : ''}
            {data.can.create ? 'Add it with its density and how far that may be off, or search for less.' : 'Search for less.'}
          </p>
          <Button onClick={() => setText('')}>Clear the search</Button>
        </div>
      )}
      <MaterialDialog
        material={asked?.kind === 'change' ? asked.material : undefined}
        isOpen={asked?.kind === 'new' || asked?.kind === 'change'}
        isBusy={create.isPending || change.isPending}
        error={create.error ?? change.error}
        onClose={close}
        onSubmit={(material) => {
          if (asked?.kind === 'change') change.mutate({ materialId: asked.material.id, version: asked.material.version, ...material }, { onSuccess: close });
          else create.mutate(material, { onSuccess: close });
        }}
      />
      <ImportDialog isOpen={asked?.kind === 'import'} onClose={close} />
    </>
  );
}

/** Archives, says so in a line that stays, and takes it back. */
function ArchiveLine({ children }: { children: (archive: (material: Material, archived: boolean) => void) => React.ReactNode }) {
  const change = useChangeMaterial();
  const [last, setLast] = useState<Material>();
  const archive = (material: Material, archived: boolean): void => change.mutate({ materialId: material.id, version: material.version, archived }, { onSuccess: setLast });
  return (
    <>
      {change.error && <ProblemNotice error={change.error} />}
      <div role="status" className={last ? 'material-line screen-only' : undefined}>
        {last && (
          <>
            <span>
              {last.name} is {last.archivedAt === null ? 'offered again' : 'archived: it is offered no more, and what is set to it stays so'}.
            </span>
            <Button size="small" disabled={change.isPending} onClick={() => archive(last, last.archivedAt === null)}>
              Undo
            </Button>
            <Button size="small" variant="minimal" onClick={() => setLast(undefined)}>
              Put away
            </Button>
          </>
        )}
      </div>
      {children(archive)}
    </>
  );
}
