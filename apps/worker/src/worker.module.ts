import { Module, type DynamicModule } from '@nestjs/common';
import type { Logger } from '@masswright/logs';
import { HealthController } from './health/health.controller';
import { Metrics } from './health/metrics';
import { MailHandler } from './mail/mail.handler';
import { Mailer } from './mail/mailer';
import { MeasuringHandler } from './measuring/measuring.handler';
import { MeasuringThreads } from './measuring/measuring-threads';
import { ObjectDeletionHandler } from './objects/object-deletion.handler';
import { PlatformModule } from './platform/platform.module';
import type { WorkerSettings } from './platform/worker-settings';
import { QueueConsumers } from './queue/queue-consumers';
import { WorkQueues } from './queue/work-queues';
import { OutboxRelay } from './relay/outbox-relay';
import { AbandonedUploads } from './schedules/abandoned-uploads';
import { DeletedParts } from './schedules/deleted-parts';
import { Housekeeping } from './schedules/housekeeping';
import { MissingSummaries } from './schedules/missing-summaries';

@Module({})
export class WorkerModule {
  static with(settings: WorkerSettings, logger: Logger): DynamicModule {
    return {
      module: WorkerModule,
      imports: [PlatformModule.with(settings, logger)],
      controllers: [HealthController],
      providers: [WorkQueues, MeasuringThreads, MeasuringHandler, Mailer, MailHandler, ObjectDeletionHandler, QueueConsumers, OutboxRelay, AbandonedUploads, DeletedParts, MissingSummaries, Housekeeping, Metrics],
    };
  }
}
