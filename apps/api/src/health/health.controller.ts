import { Controller, Get, Inject, Res, VERSION_NEUTRAL } from '@nestjs/common';
import { ApiExcludeController } from '@nestjs/swagger';
import { HealthCheckService, HealthIndicatorService, type HealthCheckResult, type HealthIndicatorResult } from '@nestjs/terminus';
import type { Response } from 'express';
import { Database } from '@masswright/drizzle';
import { ObjectStorage } from '@masswright/storage';
import { Public } from '../session/session.guard';
import { ShutdownState } from './shutdown-state';

/** Live: the process runs; if not, restart it. Ready: it can serve; if not, send people elsewhere and wait. */
@ApiExcludeController()
@Public()
@Controller({ path: 'health', version: VERSION_NEUTRAL })
export class HealthController {
  constructor(
    @Inject(HealthCheckService) private readonly health: HealthCheckService,
    @Inject(HealthIndicatorService) private readonly indicator: HealthIndicatorService,
    @Inject(Database) private readonly database: Database,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
    @Inject(ShutdownState) private readonly shutdown: ShutdownState,
  ) {}

  @Get('live')
  live(): { status: 'ok' } {
    return { status: 'ok' };
  }

  @Get('ready')
  async ready(@Res({ passthrough: true }) response: Response): Promise<Pick<HealthCheckResult, 'status'>> {
    const isReady = await this.health
      .check([() => this.probe('database', () => this.database.ping()), () => this.probe('storage', () => this.storage.checkReachable()), () => this.probe('process', () => this.shutdown.check())])
      .then((result) => result.status === 'ok')
      .catch(() => false);
    if (!isReady) response.status(503);
    return { status: isReady ? 'ok' : 'error' };
  }

  private async probe(name: string, run: () => Promise<void>): Promise<HealthIndicatorResult> {
    const check = this.indicator.check(name);
    try {
      await run();
      return check.up();
    } catch {
      return check.down();
    }
  }
}
