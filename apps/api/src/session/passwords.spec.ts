import type * as argon2 from '@node-rs/argon2';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { Passwords } from './passwords';

const library = vi.hoisted(() => ({ verifications: [] as string[], running: 0, mostRunning: 0 }));
vi.mock('@node-rs/argon2', async (original) => {
  const real = await original<typeof argon2>();
  return {
    ...real,
    verify: async (hash: string, password: string) => {
      library.verifications.push(hash);
      library.running += 1;
      library.mostRunning = Math.max(library.mostRunning, library.running);
      try {
        return await real.verify(hash, password);
      } finally {
        library.running -= 1;
      }
    },
  };
});

beforeEach(() => {
  library.verifications = [];
  library.mostRunning = 0;
});

describe('passwords', () => {
  it('are hashed with Argon2id at 19 MiB, 2 passes and 1 lane, each with a salt of its own', async () => {
    const passwords = new Passwords();
    const [first, second] = [await passwords.hash('a long enough password'), await passwords.hash('a long enough password')];
    expect(first).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    expect(first).not.toBe(second);
    expect(await passwords.verify(first, 'a long enough password')).toBe(true);
    expect(await passwords.verify(first, 'another password')).toBe(false);
  });

  it('of an unknown account are verified against a dummy with the same parameters, and never right', async () => {
    const passwords = new Passwords();
    expect(await passwords.verify(undefined, 'a password that nobody has')).toBe(false);
    expect(library.verifications).toHaveLength(1);
    expect(library.verifications[0]).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
  });

  it('are checked two at a time, and a flood is turned away instead of queued without end', { timeout: 30_000 }, async () => {
    const passwords = new Passwords();
    const hash = await passwords.hash('a long enough password');
    const results = await Promise.allSettled(Array.from({ length: 80 }, () => passwords.verify(hash, 'wrong')));
    expect(library.mostRunning).toBe(2);
    const refused = results.filter((result) => result.status === 'rejected');
    expect(refused.length).toBeGreaterThan(0);
    expect(refused.every((result) => (result.reason as { code?: string }).code === 'unavailable')).toBe(true);
  });
});
