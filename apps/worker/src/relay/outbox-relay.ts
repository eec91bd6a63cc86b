import { Inject, Injectable, type OnApplicationBootstrap } from '@nestjs/common';
import { Database, Listener, makeWorkDue, takeDueWork, workChannel, type DueWork } from '@masswright/drizzle';
import { isJobName } from '@masswright/jobs';
import type { Logger } from '@masswright/logs';
import { InjectLogger } from '../platform/inject-logger';
import { InjectWorkerSettings, type WorkerSettings } from '../platform/worker-settings';
import { WorkQueues } from '../queue/work-queues';

const batch = 100;
const lookEveryMs = 1_000;
const tryAgainAfterMs = 500;

/**
 * Hands the outbox's rows to the queue. A row stays open until its work is done; one that is still open some time after it was handed out
 * is handed out again, which adds nothing while its job is in the queue and brings it back when Redis has forgotten it.
 */
@Injectable()
export class OutboxRelay implements OnApplicationBootstrap {
  private readonly listener: Listener;
  private readonly againAfterMs: number;
  private timer: NodeJS.Timeout | undefined;
  private running: Promise<void> | undefined;
  private isWanted = false;
  private isStopped = false;

  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(WorkQueues) private readonly queues: WorkQueues,
    @InjectWorkerSettings() settings: WorkerSettings,
    @InjectLogger() private readonly logger: Logger,
  ) {
    this.againAfterMs = Math.max(2_000, settings.QUEUE_LOCK_MS);
    this.listener = new Listener({
      url: settings.DATABASE_URL,
      applicationName: 'masswright-worker-relay',
      channels: [workChannel],
      onNotification: () => this.look(),
      onConnected: () => this.look(),
      onError: (error) => logger.warn({ err: error }, 'relay connection lost'),
    });
  }

  async onApplicationBootstrap(): Promise<void> {
    await this.listener.start();
    this.timer = setInterval(() => this.look(), lookEveryMs);
  }

  async stop(): Promise<void> {
    this.isStopped = true;
    clearInterval(this.timer);
    await this.listener.stop();
    await this.running;
  }

  private look(): void {
    this.isWanted = true;
    this.running ??= this.run().finally(() => {
      this.running = undefined;
    });
  }

  private async run(): Promise<void> {
    while (this.isWanted && !this.isStopped) {
      this.isWanted = false;
      try {
        const handedOut = await this.handOut();
        if (handedOut === batch) this.isWanted = true;
      } catch (error) {
        this.logger.warn({ err: error }, 'the outbox could not be relayed; trying again');
      }
    }
  }

  private async handOut(): Promise<number> {
    const due = await this.database.transaction({ relay: true }, (tx) => takeDueWork(tx, { limit: batch, againAfterMs: this.againAfterMs }));
    await Promise.all(due.map((work) => this.enqueue(work)));
    return due.length;
  }

  private async enqueue(work: DueWork): Promise<void> {
    if (!isJobName(work.job)) {
      this.logger.error({ job: work.job, outboxId: work.id }, 'the outbox has a job that this worker does not know');
      return;
    }
    try {
      await this.queues.add(work.job, { outboxId: work.id, requestId: work.requestId, payload: work.payload, handedOut: work.handedOut });
    } catch (error) {
      this.logger.warn({ err: error, outboxId: work.id }, 'the queue did not take a job; trying again');
      await this.database.transaction({ relay: true }, (tx) => makeWorkDue(tx, work.id, tryAgainAfterMs)).catch(() => undefined);
    }
  }
}
