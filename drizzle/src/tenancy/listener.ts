import pg from 'pg';

export interface ListenerOptions {
  url: string;
  applicationName: string;
  channels: readonly string[];
  onNotification: (channel: string, payload: string) => void;
  /** Called each time that the connection stands: what was announced meanwhile is lost, so look for yourself. */
  onConnected: () => void;
  onError?: (error: Error) => void;
}

/** A connection that a firewall or a failover has silently taken away looks well until it is asked. */
const askEveryMs = 15_000;
const answerWithinMs = 5_000;
const firstPauseMs = 50;
const longestPauseMs = 2_000;

/** Hears PostgreSQL's notifications on a connection of its own, and comes back by itself when that is lost. */
export class Listener {
  private client: pg.Client | undefined;
  private stopped = false;
  private pauseMs = firstPauseMs;
  private timer: NodeJS.Timeout | undefined;

  constructor(private readonly options: ListenerOptions) {}

  async start(): Promise<void> {
    await this.connect();
  }

  async stop(): Promise<void> {
    this.stopped = true;
    clearTimeout(this.timer);
    await this.client?.end().catch(() => undefined);
  }

  private async connect(): Promise<void> {
    if (this.stopped) return;
    const client = new pg.Client({
      connectionString: this.options.url,
      application_name: this.options.applicationName,
      keepAlive: true,
      connectionTimeoutMillis: 5_000,
      query_timeout: answerWithinMs,
    });
    this.client = client;
    let ended = false;
    let asking: NodeJS.Timeout | undefined;
    const again = (error?: Error) => {
      if (ended) return;
      ended = true;
      clearInterval(asking);
      if (error !== undefined) this.options.onError?.(error);
      client.end().catch(() => undefined);
      if (this.stopped) return;
      this.timer = setTimeout(() => void this.connect(), this.pauseMs);
      this.pauseMs = Math.min(this.pauseMs * 2, longestPauseMs);
    };
    client.on('error', again);
    client.on('end', () => again());
    client.on('notification', (message) => this.options.onNotification(message.channel, message.payload ?? ''));
    try {
      await client.connect();
      for (const channel of this.options.channels) await client.query(`listen ${client.escapeIdentifier(channel)}`);
      this.pauseMs = firstPauseMs;
      asking = setInterval(() => {
        client.query('select 1').catch((error: unknown) => again(error instanceof Error ? error : new Error(String(error))));
      }, askEveryMs);
      asking.unref();
      this.options.onConnected();
    } catch (error) {
      again(error instanceof Error ? error : new Error(String(error)));
    }
  }
}
