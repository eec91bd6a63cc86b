import { Inject, Injectable } from '@nestjs/common';
import type { NextFunction, Request, Response } from 'express';
import { collectDefaultMetrics, Gauge, Histogram, Registry } from 'prom-client';
import { Database, measureBacklog } from '@masswright/drizzle';
import { EventHub } from '../events/event-hub';

/** What the api counts, in the Prometheus text format. */
@Injectable()
export class Metrics {
  private readonly registry = new Registry();
  private readonly requestSeconds = new Histogram({
    name: 'masswright_request_seconds',
    help: 'Duration of requests by route pattern and status',
    labelNames: ['method', 'route', 'status'],
    buckets: [0.005, 0.02, 0.05, 0.1, 0.5, 2, 10],
    registers: [this.registry],
  });

  constructor(@Inject(Database) database: Database, @Inject(EventHub) hub: EventHub) {
    collectDefaultMetrics({ register: this.registry });
    const openRows = new Gauge({ name: 'masswright_outbox_open_rows', help: 'Outbox rows whose work is not done', registers: [this.registry] });
    const oldestAge = new Gauge({ name: 'masswright_outbox_oldest_age_seconds', help: 'Age of the oldest outbox row whose work is not done', registers: [this.registry] });
    new Gauge({ name: 'masswright_event_streams', help: 'Open event streams', registers: [this.registry], collect() { this.set(hub.openStreams); } });
    this.readBacklog = async () => {
      const backlog = await database.transaction({ relay: true }, measureBacklog);
      openRows.set(backlog.open);
      oldestAge.set(backlog.oldestAgeSeconds);
    };
  }

  private readonly readBacklog: () => Promise<void>;

  observe = (request: Request, response: Response, next: NextFunction): void => {
    const stop = this.requestSeconds.startTimer();
    response.once('finish', () => {
      const route: unknown = (request as { route?: { path?: unknown } }).route?.path;
      stop({ method: request.method, route: typeof route === 'string' ? route : 'unmatched', status: String(response.statusCode) });
    });
    next();
  };

  async render(): Promise<string> {
    await this.readBacklog();
    return this.registry.metrics();
  }
}
