/** How fast bytes go, from what was sent in the last seconds. */
export interface Pace {
  note: (key: string, sentBytes: number, keptBytes: number) => void;
  forget: (key: string) => void;
  /** Bytes a second of one file, or of all; undefined where too little is known. */
  read: (key?: string) => number | undefined;
}

const windowMs = 8_000;
const leastMs = 700;

interface Sample {
  at: number;
  bytes: number;
}

/** What was in the storage before a file was begun doesn't count: it was not sent. */
export function createPace(now: () => number = () => performance.now()): Pace {
  const samples = new Map<string, Sample[]>();

  const readOne = (list: readonly Sample[]): number | undefined => {
    const recent = list.filter(({ at }) => now() - at <= windowMs);
    const [first] = recent;
    const last = recent.at(-1);
    // Up to now, not to the last sample: a line that has gone silent gets slower and slower.
    if (!first || !last || now() - first.at < leastMs) return undefined;
    return Math.max(0, last.bytes - first.bytes) / ((now() - first.at) / 1000);
  };

  return {
    note(key, sentBytes, keptBytes) {
      const list = samples.get(key) ?? [];
      const bytes = Math.max(0, sentBytes - keptBytes);
      const kept = list.filter(({ at }) => now() - at <= windowMs);
      // A retry begins anew: what was sent before says nothing of its pace.
      samples.set(key, (kept.at(-1)?.bytes ?? 0) > bytes ? [{ at: now(), bytes }] : [...kept, { at: now(), bytes }]);
    },
    forget: (key) => void samples.delete(key),
    read(key) {
      if (key !== undefined) return readOne(samples.get(key) ?? []);
      const rates = [...samples.values()].map(readOne).filter((rate) => rate !== undefined);
      return rates.length === 0 ? undefined : rates.reduce((sum, rate) => sum + rate, 0);
    },
  };
}

/** Seconds that are left, in words; undefined where nothing can be said. */
export function describeTimeLeft(bytesLeft: number, bytesPerSecond: number | undefined): string | undefined {
  if (bytesPerSecond === undefined || !(bytesPerSecond > 0) || bytesLeft <= 0) return undefined;
  const seconds = bytesLeft / bytesPerSecond;
  if (seconds < 5) return 'a few seconds left';
  if (seconds < 60) return `${Math.ceil(seconds / 5) * 5} s left`;
  if (seconds < 3600) return `${Math.ceil(seconds / 60)} min left`;
  return seconds < 360_000 ? `${Math.floor(seconds / 3600)} h ${Math.ceil((seconds % 3600) / 60)} min left` : 'more than four days left';
}
