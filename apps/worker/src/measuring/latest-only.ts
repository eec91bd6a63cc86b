/** Runs one task at a time for the latest of the values pushed; those in between are passed over. A failed one is too: the next tells more. */
export class LatestOnly<Value> {
  private waiting: { value: Value } | undefined;
  private running: Promise<void> | undefined;

  constructor(private readonly task: (value: Value) => Promise<void>) {}

  push(value: Value): void {
    this.waiting = { value };
    this.running ??= this.drain().finally(() => {
      this.running = undefined;
    });
  }

  /** Drops what waits and resolves when nothing runs any more. */
  async settle(): Promise<void> {
    this.waiting = undefined;
    await this.running;
  }

  private async drain(): Promise<void> {
    while (this.waiting !== undefined) {
      const { value } = this.waiting;
      this.waiting = undefined;
      await this.task(value).catch(() => undefined);
    }
  }
}
