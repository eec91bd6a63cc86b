import type { ServerEvent } from '@masswright/contracts';
import { useQueryClient, type QueryClient, type QueryKey } from '@tanstack/react-query';
import { useEffect } from 'react';
import { startBrowserStream } from '../features/events/model/browser-stream';
import { createCoalescer, type GatheredAction } from '../features/events/model/coalesce';
import { materialsKey } from '../features/materials/api/materials';
import { partKey, partsKey } from '../features/parts/api/keys';
import { applyRun, beginsExamination } from '../features/parts/api/run-events';
import { peopleKey } from '../features/people/api/people';
import { projectKey, projectsKey } from '../features/projects/api/projects';
import { sessionKey } from '../features/session/api/session';
import { applyRunToUploads, readUploadsAgain } from '../features/uploads/model/upload-queue';

const gatherMs = 300;

/**
 * Reads again what is stale by now. A read under way is never broken off: while many parts arrive none would come to its end.
 * It may have been answered before the change, though, so after it the same is read once more.
 */
async function readAnew(client: QueryClient, queryKey?: QueryKey): Promise<void> {
  const underWay = client.isFetching({ queryKey }) > 0;
  await client.invalidateQueries({ queryKey }, { cancelRefetch: false });
  if (underWay) await client.invalidateQueries({ queryKey }, { cancelRefetch: false });
}

/** What each event makes the page read again. */
function createEventHandler(client: QueryClient, coalesce: (key: string, action: GatheredAction) => void): (event: ServerEvent) => void {
  const readAgain = (...queryKey: readonly unknown[]): void => {
    coalesce(JSON.stringify(queryKey), () => readAnew(client, queryKey));
  };
  return (event) => {
    switch (event.type) {
      case 'hello':
      case 'resync':
        coalesce('everything', () => {
          readUploadsAgain();
          return readAnew(client);
        });
        return;
      case 'signed-out':
        client.setQueryData(sessionKey, null);
        return;
      case 'people':
        readAgain(...peopleKey);
        readAgain(...sessionKey);
        return;
      case 'project':
        readAgain(...projectsKey);
        readAgain(...projectKey(event.projectId));
        return;
      case 'part':
        readAgain(...partKey(event.partId));
        readAgain(...partsKey(event.projectId));
        // They say how many parts there are.
        readAgain(...projectKey(event.projectId));
        readAgain(...projectsKey);
        // And how many parts are set to each material.
        readAgain(...materialsKey);
        return;
      case 'parts':
        readAgain(...partsKey(event.projectId));
        // Any of them may be the part that a page is open on.
        readAgain('part');
        readAgain(...projectKey(event.projectId));
        readAgain(...projectsKey);
        readAgain(...materialsKey);
        return;
      case 'materials':
        readAgain(...materialsKey);
        return;
      case 'run': {
        // Its figures stand as soon as the rest is examined, and are read then, and again at the end.
        const isNews = event.state === 'done' || event.state === 'failed' || beginsExamination(client, event);
        applyRun(client, event);
        applyRunToUploads(event);
        if (isNews) {
          readAgain(...partKey(event.partId));
          readAgain(...partsKey(event.projectId));
        }
      }
    }
  };
}

/** Keeps what the page shows in step with the server, by the browser's one event stream. */
export function useLiveUpdates(organisationId: string): void {
  const client = useQueryClient();
  useEffect(() => {
    const coalescer = createCoalescer(gatherMs);
    const stop = startBrowserStream(organisationId, createEventHandler(client, coalescer.run));
    return () => {
      stop();
      coalescer.stop();
    };
  }, [client, organisationId]);
}
