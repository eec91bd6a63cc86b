import { Inject, Injectable, type OnApplicationBootstrap, type OnModuleDestroy } from '@nestjs/common';
import { Database, forgetDoneWork, sweepAttempts } from '@masswright/drizzle';
import type { Logger } from '@masswright/logs';
import { AbandonedUploads } from './abandoned-uploads';
import { DeletedParts } from './deleted-parts';
import { MissingSummaries } from './missing-summaries';
import { InjectLogger } from '../platform/inject-logger';

const everyMs = 3_600_000;
const keepDoneWorkDays = 7;

/**
 * Forgets what nobody needs any more: outbox rows long done, counters whose time is over, abandoned uploads, parts deleted long ago; and summarises parts
 * that have no summary. Several workers may do it at once.
 */
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
    await this.attempt(() =>
      this.database.transaction({ relay: true }, async (tx) => {
        await forgetDoneWork(tx, keepDoneWorkDays);
        await sweepAttempts(tx);
      }),
    );
    await this.attempt(() => this.missingSummaries.write());
    await this.attempt(() => this.deletedParts.forget());
    await this.attempt(() => this.abandonedUploads.sweep());
  }

  /** Each by itself: a storage that can't be reached keeps nobody's parts out of their list until the next time. */
  private async attempt(work: () => Promise<void>): Promise<void> {
    try {
      await work();
    } catch (error) {
      this.logger.warn({ err: error }, 'housekeeping failed; it comes again');
    }
  }
}
