import { Inject, Injectable, type OnApplicationBootstrap, type OnModuleDestroy } from '@nestjs/common';
import type { Logger } from '@masswright/logs';
import { z } from 'zod';
import { serverEvent, type ServerEvent } from '@masswright/contracts';
import { Database, eventChannel, findOrganisationOfSession, Listener, sessionChannel, sessionMoveChannel } from '@masswright/drizzle';
import { InjectApiSettings, type ApiSettings } from '../platform/api-settings';
import { InjectLogger } from '../platform/inject-logger';

export interface EventStream {
  sessionId: string;
  userId: string;
  organisationId: string;
  send: (event: ServerEvent) => void;
  end: () => void;
}

const published = z.object({ organisationId: z.uuid(), event: serverEvent });

/**
 * The open event streams of this process. Events come from PostgreSQL's notifications, so they tell of committed changes only,
 * whichever process made them.
 */
@Injectable()
export class EventHub implements OnApplicationBootstrap, OnModuleDestroy {
  private readonly streams = new Set<EventStream>();
  private readonly listener: Listener;

  constructor(
    @InjectApiSettings() settings: ApiSettings,
    @Inject(Database) private readonly database: Database,
    @InjectLogger() private readonly logger: Logger,
  ) {
    this.listener = new Listener({
      url: settings.DATABASE_URL,
      applicationName: 'masswright-api-events',
      channels: [eventChannel, sessionChannel, sessionMoveChannel],
      onNotification: (channel, payload) => this.hear(channel, payload),
      onConnected: () => void this.resynchronise(),
      onError: (error) => logger.warn({ err: error }, 'event connection lost'),
    });
  }

  async onApplicationBootstrap(): Promise<void> {
    await this.listener.start();
  }

  async onModuleDestroy(): Promise<void> {
    this.endAll();
    await this.listener.stop();
  }

  /** Adds a stream; the returned function takes it out. */
  add(stream: EventStream): () => void {
    this.streams.add(stream);
    stream.send({ type: 'hello' });
    return () => this.streams.delete(stream);
  }

  endAll(): void {
    for (const stream of this.streams) stream.end();
    this.streams.clear();
  }

  get openStreams(): number {
    return this.streams.size;
  }

  private hear(channel: string, payload: string): void {
    if (channel === eventChannel) this.relay(payload);
    else for (const stream of this.streamsOf(payload)) if (channel === sessionChannel) this.signOut(stream); else this.drop(stream);
  }

  private streamsOf(sessionId: string): EventStream[] {
    return [...this.streams].filter((stream) => stream.sessionId === sessionId);
  }

  private relay(payload: string): void {
    const parsed = published.safeParse(JSON.parse(payload));
    if (!parsed.success) {
      this.logger.error('an event of unknown shape was published');
      return;
    }
    for (const stream of this.streams) {
      if (stream.organisationId === parsed.data.organisationId) stream.send(parsed.data.event);
    }
  }

  private signOut(stream: EventStream): void {
    stream.send({ type: 'signed-out' });
    this.drop(stream);
  }

  /** Ends a stream whose session is in another organisation now; the page opens one anew. */
  private drop(stream: EventStream): void {
    stream.end();
    this.streams.delete(stream);
  }

  /** After a gap: sessions may have ended and events gone by unheard. */
  private async resynchronise(): Promise<void> {
    for (const stream of [...this.streams]) {
      if (await this.checkSession(stream)) stream.send({ type: 'resync' });
    }
  }

  /** Whether a stream's session still stands where the stream is; one whose session doesn't is ended. While the database can't say, it is left. */
  async checkSession(stream: EventStream): Promise<boolean> {
    try {
      const organisationId = await this.database.transaction({ userId: stream.userId }, (tx) => findOrganisationOfSession(tx, stream.sessionId));
      if (organisationId === undefined) this.signOut(stream);
      else if (organisationId !== stream.organisationId) this.drop(stream);
      return organisationId === stream.organisationId;
    } catch (error) {
      this.logger.warn({ err: error }, 'a stream’s session could not be checked');
      return true;
    }
  }
}
