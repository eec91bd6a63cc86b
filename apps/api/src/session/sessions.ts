import { Inject, Injectable } from '@nestjs/common';
import type { Response } from 'express';
import { Database, deleteSession, findSessionByToken, insertSession, recordAudit, sweepSessionsOfUser, touchSession, type SessionRow, type Transaction } from '@masswright/drizzle';
import { hashToken } from '@masswright/jobs';
import { InjectApiSettings, type ApiSettings } from '../platform/api-settings';
import { createSessionToken, setSessionCookie } from './session-cookie';

const touchEveryMs = 60_000;

/** Sessions live in our own table: revocable at once, with an idle and an absolute end. */
@Injectable()
export class Sessions {
  constructor(
    @Inject(Database) private readonly database: Database,
    @InjectApiSettings() private readonly settings: ApiSettings,
  ) {}

  /** The session of a token, if it stands; its idle end moves on. */
  find(tokenHash: Buffer): Promise<SessionRow | undefined> {
    return this.database.transaction({ tokenHash }, async (tx) => {
      const session = await findSessionByToken(tx, tokenHash);
      // Not at each request: one row would be rewritten for every figure on a page.
      if (session !== undefined && Date.now() - session.lastSeenAt.getTime() > Math.min(touchEveryMs, this.idleMs / 4)) {
        await touchSession(tx, session.id, new Date(Date.now() + this.idleMs));
      }
      return session;
    });
  }

  /**
   * Begins a session under a new token. Needs the scope of the person in the organisation.
   * The cookie is set by {@link handOver} once the transaction is committed.
   */
  async begin(tx: Transaction, who: { userId: string; organisationId: string }): Promise<string> {
    const token = createSessionToken();
    await sweepSessionsOfUser(tx, who.userId);
    await insertSession(tx, {
      tokenHash: hashToken(token),
      ...who,
      idleEndsAt: new Date(Date.now() + this.idleMs),
      absoluteEndsAt: new Date(Date.now() + this.absoluteMs),
    });
    return token;
  }

  handOver(response: Response, token: string): void {
    setSessionCookie(response, token, this.absoluteMs / 1000);
  }

  /** Ends whatever session a token has. */
  async end(tokenHash: Buffer, requestId: string): Promise<void> {
    const session = await this.database.transaction({ tokenHash }, (tx) => findSessionByToken(tx, tokenHash));
    if (session === undefined) return;
    const { userId, organisationId } = session;
    await this.database.transaction({ userId, organisationId }, async (tx) => {
      await deleteSession(tx, session.id);
      await recordAudit(tx, { organisationId, actorId: userId, action: 'session.end', subject: { type: 'user', id: userId }, requestId });
    });
  }

  private get idleMs(): number {
    return this.settings.SESSION_IDLE_MINUTES * 60_000;
  }
  private get absoluteMs(): number {
    return this.settings.SESSION_ABSOLUTE_HOURS * 3_600_000;
  }
}
