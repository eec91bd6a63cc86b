import { hash, verify, type Options } from '@node-rs/argon2';
import { Injectable } from '@nestjs/common';
import pLimit from 'p-limit';
import { AppError } from '../platform/app-error';

/** Argon2id with 19 MiB, 2 passes, 1 lane: OWASP Password Storage Cheat Sheet (from memory). */
// The algorithm's number: the package's enum can't be read where files are compiled one by one.
const argon2id = 2;
const parameters: Options = { algorithm: argon2id, memoryCost: 19_456, timeCost: 2, parallelism: 1 };
const atOnce = 2;
const mostWaiting = 64;

/** Hashes and checks passwords, a few at a time: each takes memory and a core, and a flood must not take all of them. */
@Injectable()
export class Passwords {
  private readonly limit = pLimit(atOnce);
  private readonly dummyHash = hash('a password that nobody has', parameters);

  hash(password: string): Promise<string> {
    return this.inTurn(() => hash(password, parameters));
  }

  /** Checks against a dummy where there is no account, so that the time taken doesn't tell. */
  async verify(passwordHash: string | undefined, password: string): Promise<boolean> {
    const against = passwordHash ?? (await this.dummyHash);
    const isRight = await this.inTurn(() => verify(against, password));
    return isRight && passwordHash !== undefined;
  }

  private inTurn<Result>(task: () => Promise<Result>): Promise<Result> {
    if (this.limit.pendingCount >= mostWaiting) {
      throw new AppError('unavailable', 'Too many people are signing in at this moment. Try again in a few seconds.', { retryAfterSeconds: 3 });
    }
    return this.limit(task);
  }
}
