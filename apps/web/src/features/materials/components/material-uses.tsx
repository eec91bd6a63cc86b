import { Button } from '@blueprintjs/core';
import type { Material } from '@masswright/contracts';
import { formatCount } from '@masswright/units';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { Loading } from '../../../components/loading';
import { ProblemNotice } from '../../../components/problem-notice';
import { writePlain } from '../../../lib/material-words';
import { countOf } from '../../../lib/plural';
import { findStep } from '../../../lib/undo-keys';
import { materialsKey, useMaterialUses } from '../api/materials';
import { takeBack, takePresentDensity } from '../api/take-density';
import type { DensityOutcome } from '../model/change-each';
import { isBehind } from '../model/use-figures';
import { UseTable } from './use-table';

/** What was done last with the parts, and how it came about. */
interface Done extends DensityOutcome {
  by: 'take' | 'undo' | 'redo';
}

function useDensityChange(material: Material) {
  const client = useQueryClient();
  const [done, setDone] = useState<Done>();
  const change = useMutation({
    mutationFn: async ({ by, run }: { by: Done['by']; run: () => Promise<DensityOutcome> }) => ({ by, ...(await run()) }),
    onSuccess: setDone,
    onSettled: () => {
      void client.invalidateQueries({ queryKey: materialsKey });
      void client.invalidateQueries({ queryKey: ['parts'] });
      void client.invalidateQueries({ queryKey: ['part'] });
    },
  });
  const turn = (): void => {
    if (done) change.mutate({ by: done.by === 'undo' ? 'redo' : 'undo', run: () => takeBack(done.changes) });
  };
  return { done, change, turn, take: (uses: Parameters<typeof takePresentDensity>[1]) => change.mutate({ by: 'take', run: () => takePresentDensity(material, uses) }) };
}

function describe({ changes, by }: Done): string {
  const count = changes.reduce((sum, { changed }) => sum + changed, 0);
  const left = changes.flatMap(({ left: names }) => names).map(({ name }) => name);
  const sentence = by === 'undo' ? `${countOf(count, 'part')} put back to the density of before.` : `${countOf(count, 'part')} took the present density.`;
  return left.length === 0 ? sentence : `${sentence} Left as they are, because they were changed or deleted meanwhile: ${left.slice(0, 5).join(', ')}${left.length > 5 ? ` and ${left.length - 5} more` : ''}.`;
}

/** Which parts are set to a material, and a way to have them follow it. */
export function MaterialUsesSection({ material, canEdit }: { material: Material; canEdit: boolean }) {
  const { data, error, refetch } = useMaterialUses(material.id);
  const { done, change, turn, take } = useDensityChange(material);
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set());
  const { mutate, isPending } = change;
  useEffect(() => {
    const press = (event: KeyboardEvent): void => {
      const step = findStep(event);
      if (!step || !done || isPending || (step === 'redo') !== (done.by === 'undo')) return;
      event.preventDefault();
      mutate({ by: done.by === 'undo' ? 'redo' : 'undo', run: () => takeBack(done.changes) });
    };
    document.addEventListener('keydown', press);
    return () => document.removeEventListener('keydown', press);
  }, [done, isPending, mutate]);
  if (error && !data) return <ProblemNotice error={error} onRetry={() => void refetch()} />;
  if (!data) return <Loading what="the parts" />;
  const behind = data.items.filter((use) => isBehind(use, material.densityKgM3));
  const wanted = behind.filter(({ partId }) => chosen.has(partId));
  const density = `${writePlain(material.densityKgM3, 6)} kg/m³`;
  return (
    <section className="material-uses" aria-labelledby="material-uses-title">
      <header>
        <div>
          <h2 id="material-uses-title">Parts of this material</h2>
          <span className="soft">
            {data.total === 0
              ? 'No part is set to it.'
              : behind.length === 0
                ? `All ${formatCount(data.total)} were made with the present density.`
                : `${formatCount(behind.length)} of ${formatCount(data.items.length)} were made with another density than ${density}.`}
            {data.total > data.items.length && ` Shown are the first ${formatCount(data.items.length)} of ${formatCount(data.total)}.`}
          </span>
        </div>
        {canEdit && behind.length > 0 && (
          <span className="screen-only">
            <Button onClick={() => setChosen(new Set(behind.map(({ partId }) => partId)))}>Choose those</Button>{' '}
            <Button intent="primary" disabled={wanted.length === 0} loading={change.isPending} onClick={() => take(wanted)}>
              {wanted.length === 0 ? 'Take the present density' : `Take ${density} for ${countOf(wanted.length, 'part')}`}
            </Button>
          </span>
        )}
      </header>
      {(change.error ?? done?.error) ? <ProblemNotice error={change.error ?? done?.error} /> : null}
      <div role="status" className={done ? 'material-line screen-only' : undefined}>
        {done && (
          <>
            <span>{describe(done)}</span>
            <Button size="small" disabled={change.isPending} onClick={turn}>
              {done.by === 'undo' ? 'Do again' : 'Undo'} <kbd>{done.by === 'undo' ? 'Ctrl Shift Z' : 'Ctrl Z'}</kbd>
            </Button>
          </>
        )}
      </div>
      {data.items.length > 0 && <UseTable uses={data.items} chosen={chosen} canChoose={canEdit && behind.length > 0} onChoose={setChosen} />}
    </section>
  );
}
