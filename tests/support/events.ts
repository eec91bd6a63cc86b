import type { ServerEvent } from '@masswright/contracts';
import type { ApiUser } from './api-user';

export interface HeardEvents {
  events: ServerEvent[];
  /** Resolves when the server ends the stream. */
  ended: Promise<void>;
  /** Waits for an event. */
  wait: (isIt: (event: ServerEvent) => boolean, timeoutMs?: number) => Promise<ServerEvent>;
  close: () => void;
}

/** Listens to the event stream as somebody signed in. */
export async function listen(user: ApiUser): Promise<HeardEvents> {
  const stop = new AbortController();
  const response = await fetch(`${user.url}/api/v1/events`, { headers: { Cookie: user.cookie ?? '' }, signal: stop.signal });
  if (response.status !== 200 || response.body === null) throw new Error(`The stream was refused: ${response.status}`);
  const events: ServerEvent[] = [];
  let waiters: (() => void)[] = [];
  const reader = response.body.pipeThrough(new TextDecoderStream()).getReader();
  const ended = (async () => {
    let rest = '';
    for (;;) {
      const { done, value } = await reader.read();
      if (done) return;
      const blocks = (rest + value).split('\n\n');
      rest = blocks.pop() ?? '';
      for (const block of blocks) if (block.startsWith('data: ')) events.push(JSON.parse(block.slice('data: '.length)) as ServerEvent);
      for (const wake of waiters.splice(0)) wake();
    }
  })().catch(() => undefined);
  return {
    events,
    ended,
    wait: async (isIt, timeoutMs = 10_000) => {
      const end = Date.now() + timeoutMs;
      for (;;) {
        const found = events.find(isIt);
        if (found !== undefined) return found;
        const left = end - Date.now();
        if (left <= 0) throw new Error(`The event did not come within ${timeoutMs} ms; heard: ${JSON.stringify(events)}`);
        await new Promise<void>((resolve) => {
          const timer = setTimeout(resolve, left);
          waiters.push(() => {
            clearTimeout(timer);
            resolve();
          });
        });
      }
    },
    close: () => {
      waiters = [];
      stop.abort();
    },
  };
}
