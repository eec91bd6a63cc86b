import { Inject, Injectable, type OnApplicationBootstrap, type OnModuleDestroy } from '@nestjs/common';
import { Database, forgetDoneWork, sweepAttempts } from '@masswright/drizzle';
import type { Logger } from '@masswright/logs';
import { AbandonedUploads } from './abandoned-uploads';
import { DeletedParts } from './deleted-parts';
import { MissingSummaries } from './missing-summaries';
import { InjectLogger } from '../platform/inject-logger';

const everyMs = 3_600_000;
const keepDoneWorkDays = 7;

/** Forgets what nobody needs any more: outbox rows long done, counters whose time is over, abandoned uploads, parts deleted long ago. Several workers may do it at once. */
@Injectable()
export class Housekeeping implements OnApplicationBootstrap, OnModuleDestroy {
  private timer: NodeJS.Timeout | undefined;

  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(AbandonedUploads) private readonly abandonedUploads: AbandonedUploads,
    @Inject(DeletedParts) private readonly deletedParts: DeletedParts,
    @Inject(MissingSummaries) private readonly missingSummaries: MissingSummaries,
    @InjectLogger() private readonly logger: Logger,
  ) {}

  onApplicationBootstrap(): void {
    this.timer = setInterval(() => void this.sweep(), everyMs);
    void this.sweep();
  }

  onModuleDestroy(): void {
    clearInterval(this.timer);
  }

  private async sweep(): Promise<void> {
    try {
      await this.database.transaction({ relay: true }, async (tx) => {
        await forgetDoneWork(tx, keepDoneWorkDays);
        await sweepAttempts(tx);
      });
      await this.abandonedUploads.sweep();
      await this.deletedParts.forget();
      await this.missingSummaries.write();
    } catch (error) {
      this.logger.warn({ err: error }, 'housekeeping failed; it comes again');
    }
  }
}
