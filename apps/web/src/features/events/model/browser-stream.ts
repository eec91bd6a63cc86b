import type { ServerEvent } from '@masswright/contracts';
import { startOneStream } from './one-stream';

/** The event stream of an organisation with the means of this browser. */
export function startBrowserStream(organisationId: string, onEvent: (event: ServerEvent) => void): () => void {
  const locks: LockManager | undefined = 'locks' in navigator ? navigator.locks : undefined;
  return startOneStream(`masswright.events.${organisationId}`, {
    locks: locks && { request: (name, options, callback) => locks.request(name, options, callback) },
    openChannel: (name) => new BroadcastChannel(name),
    openSource: () => new EventSource('/api/v1/events'),
    onEvent,
  });
}
