/** What is done; where it takes its time, the next one of the same key waits for its end. */
export type GatheredAction = () => void | Promise<unknown>;

/**
 * Gathers calls of one key within a short time into one: two hundred parts that change at once read the list again once or twice,
 * not two hundred times. The first call of a quiet key runs at once; a later one never before the one under way has ended, so that
 * a slow answer is not overtaken for ever by the next question.
 */
export function createCoalescer(waitMs: number): { run: (key: string, action: GatheredAction) => void; stop: () => void } {
  const waiting = new Map<string, { next: GatheredAction | undefined }>();
  let stopped = false;

  const start = (key: string, action: GatheredAction): void => {
    const entry: { next: GatheredAction | undefined } = { next: undefined };
    waiting.set(key, entry);
    const pause = new Promise<void>((resolve) => setTimeout(resolve, waitMs));
    const proceed = (): void => {
      if (stopped) return;
      waiting.delete(key);
      if (entry.next) start(key, entry.next);
    };
    // An action that failed has ended too; whoever asked for it says so.
    void Promise.allSettled([Promise.resolve(action()), pause]).then(proceed);
  };

  return {
    run: (key, action) => {
      if (stopped) return;
      const entry = waiting.get(key);
      if (entry) entry.next = action;
      else start(key, action);
    },
    stop: () => {
      stopped = true;
      waiting.clear();
    },
  };
}
