const firstWaitMs = 3_000;
const longestWaitMs = 30_000;
/** Runs are taken in the order of their parts, so one that was missed stands at the front. */
const askedAtOnce = 12;

export interface QuietWatch {
  /** The parts that are not known to be measured, oldest first. */
  update: (partIds: readonly string[]) => void;
}

/** Asks again about parts whose measuring does not seem to end, less and less often while their number stays the same. */
export function createQuietWatch(ask: (partId: string) => void): QuietWatch {
  let open: readonly string[] = [];
  let openBefore = 0;
  let waitMs = firstWaitMs;
  let timer: ReturnType<typeof setTimeout> | undefined;

  const arm = (): void => {
    openBefore = open.length;
    timer = setTimeout(() => {
      waitMs = open.length === openBefore ? Math.min(waitMs * 2, longestWaitMs) : firstWaitMs;
      for (const partId of open.slice(0, askedAtOnce)) ask(partId);
      arm();
    }, waitMs);
  };

  return {
    update: (partIds) => {
      open = partIds;
      if (open.length === 0) {
        clearTimeout(timer);
        timer = undefined;
        waitMs = firstWaitMs;
      } else if (timer === undefined) arm();
    },
  };
}
