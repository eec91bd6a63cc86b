import { Worker, type Job } from 'bullmq';
import { isWorkOpen, makeWorkDue, markWorkDone, type Database } from '@masswright/drizzle';
import { isJobName, parseJobPayload, queuedJob, UnknownJobError, type JobName, type QueuedJob, type QueueName } from '@masswright/jobs';
import type { Logger } from '@masswright/logs';
import type { WorkerSettings } from '../platform/worker-settings';
import { HandedBackError, SupersededError, PostponedError, type JobContext, type JobHandlers } from './job-handlers';
import { redisOptions } from './redis-connection';
import { queuePrefix } from './work-queues';

const firstPauseMs = 500;
const longestPauseMs = 60_000;
/** A worker that lost Redis and has not come back after so long is replaced: several reports tell of ones that never do. */
const replaceAfterMs = 10_000;

export interface QueueConsumerOptions {
  queue: QueueName;
  concurrency: number;
  settings: WorkerSettings;
  database: Database;
  handlers: JobHandlers;
  logger: Logger;
}

/**
 * The receiving end of one queue. A job may come twice (a lost lock, a flushed Redis), so what is done already is passed over,
 * and handlers must bear it that two of them run at once.
 */
export class QueueConsumer {
  private worker: Worker;
  private readonly stopping = new AbortController();
  /** Workers that were replaced and have not ended yet. */
  private readonly former = new Set<Promise<void>>();
  private lostAt: number | undefined;
  private readonly watch: NodeJS.Timeout;

  constructor(private readonly options: QueueConsumerOptions) {
    this.worker = this.createWorker();
    this.watch = setInterval(() => this.replaceIfLost(), 1_000);
    this.watch.unref();
  }

  /** Takes no more jobs, lets those at hand finish, and after `patienceMs` makes them hand back what they hold. */
  async stop(patienceMs: number): Promise<void> {
    clearInterval(this.watch);
    const timer = setTimeout(() => this.stopping.abort(), patienceMs);
    await Promise.all([this.worker.close().catch(() => undefined), ...this.former]);
    clearTimeout(timer);
  }

  private createWorker(): Worker {
    const { queue, concurrency, settings, logger } = this.options;
    const worker = new Worker(queue, (job) => this.process(job), {
      connection: redisOptions(settings.REDIS_URL, 'wait'),
      prefix: queuePrefix,
      concurrency,
      lockDuration: settings.QUEUE_LOCK_MS,
      stalledInterval: settings.QUEUE_LOCK_MS,
      maxStalledCount: 1,
    });
    worker.on('error', (error) => {
      this.lostAt ??= Date.now();
      logger.debug({ err: error, queue }, 'queue connection');
    });
    worker.on('ready', () => {
      this.lostAt = undefined;
    });
    worker.on('active', () => {
      this.lostAt = undefined;
    });
    return worker;
  }

  private replaceIfLost(): void {
    if (this.lostAt === undefined || Date.now() - this.lostAt < replaceAfterMs || this.former.size > 0) return;
    this.lostAt = undefined;
    const former = this.worker;
    if (former.isRunning() && !former.isPaused()) {
      this.options.logger.warn({ queue: this.options.queue }, 'the queue was lost for long; its worker is replaced');
    }
    this.worker = this.createWorker();
    const closing = former.close().catch(() => undefined);
    this.former.add(closing);
    void closing.finally(() => this.former.delete(closing));
  }

  private async process(job: Job): Promise<void> {
    const { database, handlers, logger } = this.options;
    const begunAt = performance.now();
    const envelope = queuedJob.safeParse(job.data);
    if (!envelope.success || !isJobName(job.name)) {
      logger.error({ job: job.name }, 'a job of unknown shape was dropped');
      return;
    }
    const { outboxId, requestId } = envelope.data;
    const log = logger.child({ job: job.name, outboxId, requestId });
    try {
      if (!(await database.transaction({ relay: true }, (tx) => isWorkOpen(tx, outboxId)))) return;
      await this.handle(handlers, job.name, envelope.data, { outboxId, requestId, signal: this.stopping.signal });
      await database.transaction({ relay: true }, (tx) => markWorkDone(tx, outboxId));
      log.info({ durationMs: Math.round(performance.now() - begunAt) }, 'done');
    } catch (error) {
      if (error instanceof SupersededError) {
        log.info('another worker has taken it up');
        return;
      }
      const isOrderly = error instanceof HandedBackError || error instanceof PostponedError;
      if (isOrderly) log.info(error instanceof HandedBackError ? 'handed back' : 'postponed');
      else log.warn({ err: error }, 'failed; it will be tried again');
      await this.postpone(job, outboxId, this.choosePauseMs(error, envelope.data.handedOut ?? 0), error).catch(() => undefined);
      throw error;
    }
  }

  private async handle<Name extends JobName>(handlers: JobHandlers, name: Name, data: QueuedJob, context: JobContext): Promise<void> {
    await handlers[name](parseJobPayload(name, data.payload), context);
  }

  private choosePauseMs(error: unknown, handedOut: number): number {
    if (error instanceof HandedBackError) return 0;
    if (error instanceof PostponedError) return error.pauseMs;
    return Math.min(firstPauseMs * 2 ** Math.min(handedOut, 10), longestPauseMs);
  }

  private async postpone(job: Job, outboxId: number, pauseMs: number, error: unknown): Promise<void> {
    await this.options.database.transaction({ relay: true }, async (tx) => {
      if (error instanceof UnknownJobError) {
        this.options.logger.error({ job: job.name, outboxId }, 'a payload that cannot be read was given up');
        await markWorkDone(tx, outboxId);
      } else {
        await makeWorkDue(tx, outboxId, pauseMs);
      }
    });
  }
}
