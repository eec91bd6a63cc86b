import { Injectable, type OnModuleDestroy } from '@nestjs/common';
import { Queue } from 'bullmq';
import { queueNames, queueOfJob, type JobName, type QueuedJob, type QueueName } from '@masswright/jobs';
import type { Logger } from '@masswright/logs';
import { InjectLogger } from '../platform/inject-logger';
import { InjectWorkerSettings, type WorkerSettings } from '../platform/worker-settings';
import { redisOptions } from './redis-connection';

export const queuePrefix = 'masswright';
const addTimeoutMs = 5_000;

/** The sending end of the queues. Redis holds nothing that the outbox could not hand out again. */
@Injectable()
export class WorkQueues implements OnModuleDestroy {
  private readonly queues: Map<QueueName, Queue>;

  constructor(@InjectWorkerSettings() settings: WorkerSettings, @InjectLogger() logger: Logger) {
    const connection = redisOptions(settings.REDIS_URL, 'hand-out');
    this.queues = new Map(
      queueNames.map((name) => {
        const queue = new Queue(name, { connection, prefix: queuePrefix });
        queue.on('error', (error) => logger.debug({ err: error, queue: name }, 'queue connection'));
        return [name, queue];
      }),
    );
  }

  async onModuleDestroy(): Promise<void> {
    await Promise.all([...this.queues.values()].map((queue) => queue.close().catch(() => undefined)));
  }

  /** Adds a job under the id of its outbox row: while it is there already, nothing is added. Rejects when Redis doesn't take it in time. */
  async add(job: JobName, data: QueuedJob): Promise<void> {
    const added = this.get(queueOfJob[job]).add(job, data, {
      jobId: `outbox-${data.outboxId}`,
      // Retries are the outbox's; a job that is over must not stand in the way of its next handing out.
      attempts: 1,
      removeOnComplete: true,
      removeOnFail: true,
    });
    await withTimeout(added, addTimeoutMs);
  }

  /** How many jobs wait or run, by queue. */
  async measureDepths(): Promise<Record<QueueName, number>> {
    const depths = await Promise.all(
      queueNames.map(async (name) => {
        const counts = await withTimeout(this.get(name).getJobCounts('waiting', 'active', 'delayed', 'prioritized'), addTimeoutMs);
        return [name, Object.values(counts).reduce((sum, count) => sum + count, 0)] as const;
      }),
    );
    return Object.fromEntries(depths) as Record<QueueName, number>;
  }

  async ping(): Promise<void> {
    await withTimeout(this.get('measuring').getJobCounts('active'), addTimeoutMs);
  }

  private get(name: QueueName): Queue {
    const queue = this.queues.get(name);
    if (queue === undefined) throw new Error(`There is no queue ${name}.`);
    return queue;
  }
}

async function withTimeout<Result>(promise: Promise<Result>, milliseconds: number): Promise<Result> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new Error(`Redis did not answer within ${milliseconds} ms.`)), milliseconds);
  });
  try {
    return await Promise.race([promise, late]);
  } finally {
    clearTimeout(timer);
    promise.catch(() => undefined);
  }
}
