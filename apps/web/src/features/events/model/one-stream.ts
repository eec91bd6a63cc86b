import { serverEvent, type ServerEvent } from '@masswright/contracts';

/** What is used of an EventSource, so that tests can stand one up. */
export interface Source {
  readyState: number;
  onmessage: ((message: MessageEvent<string>) => void) | null;
  onerror: ((event: Event) => void) | null;
  close: () => void;
}

export interface Channel {
  onmessage: ((message: MessageEvent<unknown>) => void) | null;
  postMessage: (message: unknown) => void;
  close: () => void;
}

export interface OneStreamParts {
  /** Missing where the browser has no locks (a plain-http page of another host): each tab then has a stream of its own. */
  locks?: { request: (name: string, options: { signal: AbortSignal }, callback: () => Promise<void>) => Promise<unknown> };
  openChannel: (name: string) => Channel;
  openSource: () => Source;
  onEvent: (event: ServerEvent) => void;
}

const closedState = 2;
const shortestWaitMs = 1_000;
const longestWaitMs = 30_000;

/** An event of a newer server that this page doesn't know is nobody's harm: it is passed over. */
function findEvent(text: string): ServerEvent | undefined {
  try {
    const parsed = serverEvent.safeParse(JSON.parse(text));
    return parsed.success ? parsed.data : undefined;
  } catch {
    return undefined;
  }
}

/** Keeps one source open for as long as it is wanted; `EventSource` itself gives up for good on an answer other than 200. */
function keepSource(openSource: () => Source, deliver: (event: ServerEvent) => void, signal: AbortSignal): void {
  let source: Source | undefined;
  let waitMs = shortestWaitMs;
  let timer: ReturnType<typeof setTimeout> | undefined;
  const open = (): void => {
    const opened = openSource();
    source = opened;
    opened.onmessage = (message) => {
      waitMs = shortestWaitMs;
      const event = findEvent(message.data);
      if (event) deliver(event);
    };
    opened.onerror = () => {
      if (opened.readyState !== closedState || signal.aborted) return;
      // Refused: perhaps the session ended. Reading everything again finds out, and the page then says so.
      deliver({ type: 'resync' });
      timer = setTimeout(open, waitMs);
      waitMs = Math.min(longestWaitMs, waitMs * 2);
    };
  };
  signal.addEventListener('abort', () => {
    clearTimeout(timer);
    source?.close();
  });
  open();
}

/**
 * One event stream a browser: HTTP/1.1 allows six connections to a host, so a seventh tab with its own stream would stall.
 * The tab that holds the lock reads the stream and passes each event on to the others; when it goes, the next in line takes over.
 * `name` tells streams of different organisations apart. Returns how to stop.
 */
export function startOneStream(name: string, parts: OneStreamParts): () => void {
  const stopping = new AbortController();
  const channel = parts.openChannel(name);
  channel.onmessage = (message) => {
    const parsed = serverEvent.safeParse(message.data);
    if (parsed.success) parts.onEvent(parsed.data);
  };
  const lead = (): Promise<void> =>
    new Promise((resolve) => {
      // The lock may be granted in the very moment of stopping; who is stopped must let it go, or no tab ever hears an event again.
      if (stopping.signal.aborted) {
        resolve();
        return;
      }
      stopping.signal.addEventListener('abort', () => resolve());
      keepSource(
        parts.openSource,
        (event) => {
          parts.onEvent(event);
          channel.postMessage(event);
        },
        stopping.signal,
      );
    });
  if (parts.locks) {
    // Rejects when the wait for the lock is given up, which is what stopping asks for.
    parts.locks.request(name, { signal: stopping.signal }, lead).catch(() => undefined);
  } else {
    void lead();
  }
  return () => {
    stopping.abort();
    channel.close();
  };
}
