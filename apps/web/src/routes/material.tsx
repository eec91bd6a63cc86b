import { Button } from '@blueprintjs/core';
import type { Material } from '@masswright/contracts';
import { useState } from 'react';
import { useParams } from 'react-router-dom';
import { Failure } from '../components/failure';
import { Loading } from '../components/loading';
import { NotFound } from '../components/not-found';
import { Crumbs, PageHeading } from '../components/page';
import { PrintLine } from '../components/print-line';
import { ProblemNotice } from '../components/problem-notice';
import { StatusTag } from '../components/status-tag';
import { useChangeMaterial, useMaterials } from '../features/materials/api/materials';
import { MaterialDialog } from '../features/materials/components/material-dialog';
import { MaterialUsesSection } from '../features/materials/components/material-uses';
import { basisWords } from '../features/materials/model/material-form';
import { useSignedIn } from '../features/session/api/session';
import { materialGroupNames, writePlain, writeSpreadDensity } from '../lib/material-words';

export function Component() {
  const { materialId = '' } = useParams();
  const { data, error, refetch } = useMaterials();
  if (error && !data) return <Failure error={error} onRetry={() => void refetch()} />;
  if (!data) return <Loading what="the material" />;
  const material = data.items.find(({ id }) => id === materialId);
  return material ? <MaterialPage key={material.id} material={material} /> : <NotFound />;
}

function MaterialPage({ material }: { material: Material }) {
  const session = useSignedIn();
  const change = useChangeMaterial();
  const [changing, setChanging] = useState(false);
  const isArchived = material.archivedAt !== null;
  return (
    <>
      <Crumbs crumbs={[{ label: session.organisation.name, to: '/' }, { label: 'Materials', to: '/materials' }, { label: material.name }]} />
      <PageHeading
        title={material.name}
        documentTitle={`${material.name} – Materials`}
        above={`${materialGroupNames[material.group]}, ${material.origin === 'own' ? `of ${session.organisation.name}` : 'of the library that every installation has'}`}
        beside={isArchived && <StatusTag tone="neutral">archived</StatusTag>}
        actions={
          material.can.edit && (
            <>
              <Button loading={change.isPending && !changing} onClick={() => change.mutate({ materialId: material.id, version: material.version, archived: !isArchived })}>
                {isArchived ? 'Unarchive' : 'Archive'}
              </Button>
              {!isArchived && <Button onClick={() => setChanging(true)}>Change</Button>}
            </>
          )
        }
      />
      <PrintLine>
        {session.organisation.name}, material {material.name}
      </PrintLine>
      {change.error && !changing && <ProblemNotice error={change.error} />}
      <dl className="material-facts">
        <dt>Density</dt>
        <dd className="figure">{writeSpreadDensity(material)}</dd>
        <dt>Spread</dt>
        <dd>
          <span className="figure">± {writePlain((material.densitySpreadKgM3 / material.densityKgM3) * 100, 2)} %,</span>{' '}
          <span className="soft">{basisWords[material.spreadBasis]}; every density within it is held to be as likely as any other</span>
        </dd>
        <dt>Source</dt>
        <dd>{material.source || <span className="soft">not said</span>}</dd>
      </dl>
      <MaterialUsesSection material={material} canEdit={session.can.createProject} />
      <MaterialDialog
        material={material}
        isOpen={changing}
        isBusy={change.isPending}
        error={change.error}
        onClose={() => {
          setChanging(false);
          change.reset();
        }}
        onSubmit={(typed) => change.mutate({ materialId: material.id, version: material.version, ...typed }, { onSuccess: () => setChanging(false) })}
      />
    </>
  );
}
