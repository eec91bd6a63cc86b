import { createHmac } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import { clearAttempts, countAttempt, Database, forgiveAttempt, type AttemptKey } from '@masswright/drizzle';
import { InjectApiSettings, type ApiSettings } from './api-settings';
import { AppError } from './app-error';

export interface AttemptLimit {
  kind: string;
  most: number;
  windowSeconds: number;
}

export const attemptLimits = {
  signInOfAccount: { kind: 'sign-in.account', most: 10, windowSeconds: 900 },
  signInFromAddress: { kind: 'sign-in.address', most: 100, windowSeconds: 900 },
  signUpFromAddress: { kind: 'sign-up.address', most: 100, windowSeconds: 3600 },
  passwordResetOfAccount: { kind: 'password-reset.account', most: 5, windowSeconds: 3600 },
  passwordResetFromAddress: { kind: 'password-reset.address', most: 100, windowSeconds: 3600 },
  linkFromAddress: { kind: 'link.address', most: 100, windowSeconds: 900 },
} satisfies Record<string, AttemptLimit>;

/** Limits what can be guessed or flooded, by account and by address, counted in PostgreSQL: across api processes and restarts. */
@Injectable()
export class AttemptLimits {
  constructor(
    @Inject(Database) private readonly database: Database,
    @InjectApiSettings() private readonly settings: ApiSettings,
  ) {}

  /** Counts an attempt before it is made. @throws AppError too-many-attempts, with the time to wait */
  async count(limit: AttemptLimit, subject: string): Promise<void> {
    const { count, windowEndsAt } = await this.database.transaction({}, (tx) => countAttempt(tx, this.keyOf(limit, subject), limit.windowSeconds));
    if (count <= limit.most) return;
    const retryAfterSeconds = Math.max(1, Math.ceil((windowEndsAt.getTime() - Date.now()) / 1000));
    const minutes = Math.ceil(retryAfterSeconds / 60);
    throw new AppError('too-many-attempts', `There were too many attempts. Try again in ${minutes} ${minutes === 1 ? 'minute' : 'minutes'}.`, { retryAfterSeconds });
  }

  /** Takes an attempt back that turned out right. */
  async forgive(limit: AttemptLimit, subject: string): Promise<void> {
    await this.database.transaction({}, (tx) => forgiveAttempt(tx, this.keyOf(limit, subject)));
  }

  async clear(limit: AttemptLimit, subject: string): Promise<void> {
    await this.database.transaction({}, (tx) => clearAttempts(tx, this.keyOf(limit, subject)));
  }

  private keyOf(limit: AttemptLimit, subject: string): AttemptKey {
    return { kind: limit.kind, keyHash: createHmac('sha256', this.settings.LINK_SECRET).update(`${limit.kind}:${subject}`).digest() };
  }
}
