import type { RedisOptions } from 'bullmq';

/** How BullMQ reaches Redis. Commands that wait for work must wait without end; those that hand work out must not. */
export function redisOptions(url: string, use: 'wait' | 'hand-out'): RedisOptions {
  const { hostname, port, username, password, pathname, protocol } = new URL(url);
  const database = pathname.length > 1 ? Number(pathname.slice(1)) : 0;
  return {
    host: hostname,
    port: port === '' ? 6379 : Number(port),
    db: database,
    ...(username === '' ? {} : { username: decodeURIComponent(username) }),
    ...(password === '' ? {} : { password: decodeURIComponent(password) }),
    ...(protocol === 'rediss:' ? { tls: {} } : {}),
    maxRetriesPerRequest: use === 'wait' ? null : 1,
    enableOfflineQueue: use === 'wait',
    retryStrategy: (times) => Math.min(100 * 2 ** Math.min(times, 5), 2_000),
  };
}
