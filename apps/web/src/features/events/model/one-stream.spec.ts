import type { ServerEvent } from '@masswright/contracts';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { startOneStream, type Channel, type OneStreamParts, type Source } from './one-stream';

/** A browser: its tabs share one queue for a lock and one channel a name. */
class Browser {
  sources: (Source & { open: boolean })[] = [];
  private readonly channels = new Map<Channel, string>();
  private readonly waiting: (() => Promise<void>)[] = [];
  private held = false;

  locks: NonNullable<OneStreamParts['locks']> = {
    request: (_name, { signal }, callback) =>
      new Promise((resolve, reject) => {
        const turn = async (): Promise<void> => {
          this.held = true;
          await callback();
          this.held = false;
          resolve(undefined);
          void this.waiting.shift()?.();
        };
        signal.addEventListener('abort', () => {
          const index = this.waiting.indexOf(turn);
          if (index >= 0) this.waiting.splice(index, 1);
          reject(new Error('given up'));
        });
        if (this.held) this.waiting.push(turn);
        else void turn();
      }),
  };

  openChannel = (name: string): Channel => {
    const channel: Channel = {
      onmessage: null,
      postMessage: (data) => {
        for (const [other, otherName] of this.channels) if (other !== channel && otherName === name) other.onmessage?.(new MessageEvent('message', { data }));
      },
      close: () => void this.channels.delete(channel),
    };
    this.channels.set(channel, name);
    return channel;
  };

  openSource = (): Source => {
    const source = { readyState: 1, onmessage: null, onerror: null, open: true, close: () => void (source.open = false) } as Source & { open: boolean };
    this.sources.push(source);
    return source;
  };

  openTab({ name = 'stream of organisation 1', withLocks = true } = {}) {
    const events: ServerEvent[] = [];
    const stop = startOneStream(name, { locks: withLocks ? this.locks : undefined, openChannel: this.openChannel, openSource: this.openSource, onEvent: (event) => events.push(event) });
    return { events, stop };
  }

  get openSources() {
    return this.sources.filter((source) => source.open);
  }

  say(event: unknown): void {
    for (const source of this.openSources) source.onmessage?.(new MessageEvent('message', { data: JSON.stringify(event) }));
  }
}

const settle = () => vi.advanceTimersByTimeAsync(0);

describe('one event stream a browser', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());

  it('seven tabs share one stream, and each hears each event once', async () => {
    const browser = new Browser();
    const tabs = Array.from({ length: 7 }, () => browser.openTab());
    await settle();
    expect(browser.sources).toHaveLength(1);
    browser.say({ type: 'people' });
    for (const tab of tabs) expect(tab.events).toEqual([{ type: 'people' }]);
  });

  it('when the tab with the stream closes, another takes over', async () => {
    const browser = new Browser();
    const [first, second, third] = [browser.openTab(), browser.openTab(), browser.openTab()];
    await settle();
    first.stop();
    await settle();
    expect(browser.openSources).toHaveLength(1);
    browser.say({ type: 'hello' });
    expect(first.events).toEqual([]);
    expect(second.events).toEqual([{ type: 'hello' }]);
    expect(third.events).toEqual([{ type: 'hello' }]);
  });

  it('a tab that closes while it waits for its turn leaves the stream alone', async () => {
    const browser = new Browser();
    const first = browser.openTab();
    const waiting = browser.openTab();
    await settle();
    waiting.stop();
    await settle();
    browser.say({ type: 'people' });
    expect(browser.openSources).toHaveLength(1);
    expect(first.events).toEqual([{ type: 'people' }]);
    expect(waiting.events).toEqual([]);
  });

  it('a refused stream has everything read again and is tried again, less and less often', async () => {
    const browser = new Browser();
    const tab = browser.openTab();
    await settle();
    const refuse = (): void => {
      const source = browser.sources.at(-1);
      if (!source) throw new Error('no stream was opened');
      source.readyState = 2;
      source.onerror?.(new Event('error'));
    };
    refuse();
    expect(tab.events).toEqual([{ type: 'resync' }]);
    await vi.advanceTimersByTimeAsync(1_000);
    expect(browser.sources).toHaveLength(2);
    refuse();
    await vi.advanceTimersByTimeAsync(1_999);
    expect(browser.sources).toHaveLength(2);
    await vi.advanceTimersByTimeAsync(1);
    expect(browser.sources).toHaveLength(3);
  });

  it('a short break that the browser mends by itself is left to it', async () => {
    const browser = new Browser();
    const tab = browser.openTab();
    await settle();
    const source = browser.sources[0];
    if (!source) throw new Error('no stream was opened');
    source.readyState = 0;
    source.onerror?.(new Event('error'));
    await vi.advanceTimersByTimeAsync(60_000);
    expect(browser.sources).toHaveLength(1);
    expect(tab.events).toEqual([]);
  });

  it('an event that this page does not know is passed over', async () => {
    const browser = new Browser();
    const tab = browser.openTab();
    await settle();
    browser.say({ type: 'weather' });
    browser.sources[0]?.onmessage?.(new MessageEvent('message', { data: 'no JSON' }));
    expect(tab.events).toEqual([]);
  });

  it('tabs of two organisations do not hear each other', async () => {
    const browser = new Browser();
    const one = browser.openTab({ name: 'stream of organisation 1', withLocks: false });
    const two = browser.openTab({ name: 'stream of organisation 2', withLocks: false });
    await settle();
    browser.sources[0]?.onmessage?.(new MessageEvent('message', { data: '{"type":"people"}' }));
    expect(one.events).toHaveLength(1);
    expect(two.events).toHaveLength(0);
  });

  it('without locks each tab has a stream of its own, and stopping closes it', async () => {
    const browser = new Browser();
    const tab = browser.openTab({ withLocks: false });
    browser.openTab({ withLocks: false });
    await settle();
    expect(browser.openSources).toHaveLength(2);
    tab.stop();
    expect(browser.openSources).toHaveLength(1);
  });

  it('a tab that is stopped in the very moment when its lock is granted lets the lock go', async () => {
    let grant: (() => Promise<void>) | undefined;
    const openSource = vi.fn();
    const locks: NonNullable<OneStreamParts['locks']> = {
      request: (_name, _options, callback) => {
        grant = callback;
        return new Promise(() => undefined);
      },
    };
    const channel: Channel = { onmessage: null, postMessage: () => undefined, close: () => undefined };
    startOneStream('stream', { locks, openChannel: () => channel, openSource, onEvent: () => undefined })();
    await grant?.();
    expect(openSource).not.toHaveBeenCalled();
  });
});
