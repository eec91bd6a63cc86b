import { Inject, Injectable } from '@nestjs/common';
import { collectDefaultMetrics, Gauge, Registry } from 'prom-client';
import { Database, measureBacklog } from '@masswright/drizzle';
import { WorkQueues } from '../queue/work-queues';

/** What the worker counts, in the Prometheus text format. */
@Injectable()
export class Metrics {
  private readonly registry = new Registry();
  private readonly queueDepth = new Gauge({ name: 'masswright_queue_depth', help: 'Jobs that wait or run, by queue', labelNames: ['queue'], registers: [this.registry] });
  private readonly openRows = new Gauge({ name: 'masswright_outbox_open_rows', help: 'Outbox rows whose work is not done', registers: [this.registry] });
  private readonly oldestAge = new Gauge({
    name: 'masswright_outbox_oldest_age_seconds',
    help: 'Age of the oldest outbox row whose work is not done',
    registers: [this.registry],
  });

  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(WorkQueues) private readonly queues: WorkQueues,
  ) {
    collectDefaultMetrics({ register: this.registry });
  }

  async render(): Promise<string> {
    const [backlog, depths] = await Promise.all([this.database.transaction({ relay: true }, measureBacklog), this.queues.measureDepths()]);
    this.openRows.set(backlog.open);
    this.oldestAge.set(backlog.oldestAgeSeconds);
    for (const [queue, depth] of Object.entries(depths)) this.queueDepth.set({ queue }, depth);
    return this.registry.metrics();
  }
}
