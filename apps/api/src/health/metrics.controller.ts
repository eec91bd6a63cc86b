import { timingSafeEqual } from 'node:crypto';
import { Controller, Get, Headers, Inject, Res, VERSION_NEUTRAL } from '@nestjs/common';
import { ApiExcludeController } from '@nestjs/swagger';
import type { Response } from 'express';
import { hashToken } from '@masswright/jobs';
import { InjectApiSettings, type ApiSettings } from '../platform/api-settings';
import { AppError } from '../platform/app-error';
import { Public } from '../session/session.guard';
import { Metrics } from './metrics';

/** For the installation's own monitoring: whoever has METRICS_TOKEN, and nobody where it is not set. */
@ApiExcludeController()
@Public()
@Controller({ path: 'metrics', version: VERSION_NEUTRAL })
export class MetricsController {
  constructor(
    @Inject(Metrics) private readonly metrics: Metrics,
    @InjectApiSettings() private readonly settings: ApiSettings,
  ) {}

  @Get()
  async read(@Headers('authorization') authorization: string | undefined, @Res() response: Response): Promise<void> {
    const token = this.settings.METRICS_TOKEN;
    // Hashes have one length, which is what a comparison in constant time needs.
    const isRight = token !== undefined && timingSafeEqual(hashToken(authorization ?? ''), hashToken(`Bearer ${token}`));
    if (!isRight) throw new AppError('not-found', 'There is nothing at this address.');
    response.type('text/plain; version=0.0.4').send(await this.metrics.render());
  }
}
