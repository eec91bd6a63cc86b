/**
 * Gathers calls of one key within a short time into one: two hundred parts that change at once read the list again once or twice,
 * not two hundred times. The first call of a quiet key runs at once.
 */
export function createCoalescer(waitMs: number): { run: (key: string, action: () => void) => void; stop: () => void } {
  const waiting = new Map<string, { timer: ReturnType<typeof setTimeout>; action: (() => void) | undefined }>();
  const arm = (key: string): void => {
    const timer = setTimeout(() => {
      const action = waiting.get(key)?.action;
      waiting.delete(key);
      if (action) {
        arm(key);
        action();
      }
    }, waitMs);
    waiting.set(key, { timer, action: undefined });
  };
  return {
    run: (key, action) => {
      const entry = waiting.get(key);
      if (entry) entry.action = action;
      else {
        arm(key);
        action();
      }
    },
    stop: () => {
      for (const { timer } of waiting.values()) clearTimeout(timer);
      waiting.clear();
    },
  };
}
