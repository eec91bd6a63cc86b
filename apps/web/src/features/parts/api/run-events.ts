import type { MeasuringRun, Part, PartList, ServerEvent } from '@masswright/contracts';
import type { QueryClient } from '@tanstack/react-query';
import { partKey, partsKey } from './keys';

type RunEvent = Extract<ServerEvent, { type: 'run' }>;

const withRun = (run: MeasuringRun, event: RunEvent): MeasuringRun => ({ ...run, state: event.state, stage: event.stage, progress: event.progress });

/** Shows at once how far a run is; its figures, or its reason, are then read from the api. */
export function applyRun(client: QueryClient, event: RunEvent): void {
  client.setQueryData<Part>(partKey(event.partId), (part) => part && { ...part, revision: { ...part.revision, run: withRun(part.revision.run, event) } });
  client.setQueriesData<PartList>({ queryKey: partsKey(event.projectId) }, (list) =>
    list?.items.some(({ id }) => id === event.partId)
      ? {
          ...list,
          items: list.items.map((row) => (row.id === event.partId ? { ...row, revision: { ...row.revision, run: withRun(row.revision.run, event) } } : row)),
        }
      : list,
  );
}

/** Whether an event is the first of a part's examination that this page hears of. */
export function beginsExamination(client: QueryClient, event: RunEvent): boolean {
  if (event.stage !== 'examining' || event.state !== 'running') return false;
  const isKnown = (run: MeasuringRun): boolean => run.state === 'running' && run.stage === 'examining';
  const part = client.getQueryData<Part>(partKey(event.partId));
  if (part !== undefined) return !isKnown(part.revision.run);
  const lists = client.getQueriesData<PartList>({ queryKey: partsKey(event.projectId) });
  return lists.some(([, list]) => list?.items.some((row) => row.id === event.partId && !isKnown(row.revision.run)));
}
