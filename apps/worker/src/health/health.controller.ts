import { timingSafeEqual } from 'node:crypto';
import { Controller, Get, Headers, Inject, NotFoundException, Res, ServiceUnavailableException } from '@nestjs/common';
import type { Response } from 'express';
import { Database } from '@masswright/drizzle';
import { hashToken } from '@masswright/jobs';
import { ObjectStorage } from '@masswright/storage';
import { InjectWorkerSettings, type WorkerSettings } from '../platform/worker-settings';
import { WorkQueues } from '../queue/work-queues';
import { Metrics } from './metrics';

/** Live: the process runs. Ready: it can do work. Metrics: for whoever has METRICS_TOKEN. */
@Controller()
export class HealthController {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
    @Inject(WorkQueues) private readonly queues: WorkQueues,
    @Inject(Metrics) private readonly metrics: Metrics,
    @InjectWorkerSettings() private readonly settings: WorkerSettings,
  ) {}

  @Get('health/live')
  live(): { status: 'ok' } {
    return { status: 'ok' };
  }

  @Get('health/ready')
  async ready(): Promise<{ status: 'ok' }> {
    try {
      await Promise.all([this.database.ping(), this.storage.checkReachable(), this.queues.ping()]);
    } catch {
      throw new ServiceUnavailableException({ status: 'error' });
    }
    return { status: 'ok' };
  }

  @Get('metrics')
  async readMetrics(@Headers('authorization') authorization: string | undefined, @Res() response: Response): Promise<void> {
    const token = this.settings.METRICS_TOKEN;
    const isRight = token !== undefined && timingSafeEqual(hashToken(authorization ?? ''), hashToken(`Bearer ${token}`));
    if (!isRight) throw new NotFoundException();
    response.type('text/plain; version=0.0.4').send(await this.metrics.render());
  }
}
