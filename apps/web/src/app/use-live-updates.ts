import type { ServerEvent } from '@masswright/contracts';
import { useQueryClient, type QueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { startBrowserStream } from '../features/events/model/browser-stream';
import { createCoalescer } from '../features/events/model/coalesce';
import { applyRun, partKey, partsKey } from '../features/parts/api/parts';
import { peopleKey } from '../features/people/api/people';
import { projectKey, projectsKey } from '../features/projects/api/projects';
import { sessionKey } from '../features/session/api/session';
import { applyRunToUploads, readUploadsAgain } from '../features/uploads/model/upload-queue';

const gatherMs = 300;

/** What each event makes the page read again. */
function createEventHandler(client: QueryClient, coalesce: (key: string, action: () => void) => void): (event: ServerEvent) => void {
  const readAgain = (...queryKey: readonly unknown[]): void => {
    coalesce(JSON.stringify(queryKey), () => void client.invalidateQueries({ queryKey }));
  };
  return (event) => {
    switch (event.type) {
      case 'hello':
      case 'resync':
        coalesce('everything', () => {
          void client.invalidateQueries();
          readUploadsAgain();
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
        return;
      case 'run':
        applyRun(client, event);
        applyRunToUploads(event);
        if (event.state === 'done' || event.state === 'failed') {
          readAgain(...partKey(event.partId));
          readAgain(...partsKey(event.projectId));
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
