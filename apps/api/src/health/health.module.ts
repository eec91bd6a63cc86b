import { Module } from '@nestjs/common';
import { TerminusModule } from '@nestjs/terminus';
import { EventsModule } from '../events/events.module';
import { HealthController } from './health.controller';
import { Metrics } from './metrics';
import { MetricsController } from './metrics.controller';
import { ShutdownState } from './shutdown-state';

@Module({
  imports: [TerminusModule.forRoot({ logger: false }), EventsModule],
  controllers: [HealthController, MetricsController],
  providers: [Metrics, ShutdownState],
  exports: [Metrics, ShutdownState],
})
export class HealthModule {}
