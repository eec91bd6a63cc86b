import { Inject, Injectable, type OnApplicationBootstrap } from '@nestjs/common';
import { Database } from '@masswright/drizzle';
import { queueNames } from '@masswright/jobs';
import type { Logger } from '@masswright/logs';
import { MailHandler } from '../mail/mail.handler';
import { MeasuringHandler } from '../measuring/measuring.handler';
import { ObjectDeletionHandler } from '../objects/object-deletion.handler';
import { InjectLogger } from '../platform/inject-logger';
import { InjectWorkerSettings, type WorkerSettings } from '../platform/worker-settings';
import type { JobHandlers } from './job-handlers';
import { QueueConsumer } from './queue-consumer';

/** One consumer a queue, and one handler a job. */
@Injectable()
export class QueueConsumers implements OnApplicationBootstrap {
  private readonly handlers: JobHandlers;
  private consumers: QueueConsumer[] = [];

  constructor(
    @Inject(MeasuringHandler) measuring: MeasuringHandler,
    @Inject(MailHandler) mail: MailHandler,
    @Inject(ObjectDeletionHandler) objectDeletion: ObjectDeletionHandler,
    @Inject(Database) private readonly database: Database,
    @InjectWorkerSettings() private readonly settings: WorkerSettings,
    @InjectLogger() private readonly logger: Logger,
  ) {
    this.handlers = {
      'measurement.run': (payload, context) => measuring.handle(payload, context),
      'mail.send': (payload, context) => mail.handle(payload, context),
      'object.delete': (payload) => objectDeletion.handle(payload),
    };
  }

  onApplicationBootstrap(): void {
    const { database, settings, handlers, logger } = this;
    this.consumers = queueNames.map(
      (queue) => new QueueConsumer({ queue, concurrency: settings.WORKER_CONCURRENCY, settings, database, handlers, logger }),
    );
  }

  async stop(patienceMs: number): Promise<void> {
    await Promise.all(this.consumers.map((consumer) => consumer.stop(patienceMs)));
  }
}
