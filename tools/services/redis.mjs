import { mkdirSync, writeFileSync } from 'node:fs';
import net from 'node:net';
import path from 'node:path';
import { randomBytes } from 'node:crypto';
import { findFreePort } from './ports.mjs';
import { Service, stopOrder } from './service.mjs';

/** @param {number} port @param {string} password @returns {Promise<boolean>} true when it has loaded its data and answers */
function ping(port, password) {
  return new Promise((resolve) => {
    const socket = net.connect(port, '127.0.0.1', () => socket.write(`AUTH ${password}\r\nPING\r\n`));
    let answer = '';
    const end = (/** @type {boolean} */ ready) => {
      socket.destroy();
      resolve(ready);
    };
    socket.setTimeout(1_000, () => end(false));
    socket.once('error', () => end(false));
    socket.once('close', () => end(false));
    socket.on('data', (chunk) => {
      answer += chunk.toString();
      if (answer.includes('+PONG')) end(true);
      else if (/^-.*\r\n.*\r\n/s.test(answer)) end(false);
    });
  });
}

/**
 * @typedef {object} RedisOptions
 * @property {string} directory
 * @property {number} [port]
 * @property {string} [password] made up where it is not given
 * @property {string} [logFile]
 */

/** A Redis server on loopback that writes every change to its log and never evicts a key, not started yet. @param {RedisOptions} options */
export async function prepareRedis({ directory, port: wanted, password = randomBytes(24).toString('hex'), logFile = path.join(directory, 'redis.log') }) {
  const port = wanted ?? (await findFreePort());
  mkdirSync(path.dirname(directory), { recursive: true });
  mkdirSync(directory, { recursive: true, mode: 0o700 });
  const settings = path.join(directory, 'redis.conf');
  const lines = ['bind 127.0.0.1', `port ${port}`, `requirepass ${password}`, `dir "${directory}"`, 'appendonly yes', 'appendfsync everysec', 'save ""', 'maxmemory-policy noeviction', 'daemonize no', 'logfile ""'];
  // In a file of mode 0600, not on the command line, which every user of the machine can read.
  writeFileSync(settings, `${lines.join('\n')}\n`, { mode: 0o600 });
  const service = new Service({
    name: 'Redis',
    command: 'redis-server',
    args: [settings],
    cwd: directory,
    logFile,
    order: stopOrder.redis,
    retryStart: true,
    isReady: () => ping(port, password),
  });
  return Object.assign(service, { port, url: `redis://:${password}@127.0.0.1:${port}` });
}

/** @param {RedisOptions} options */
export async function startRedis(options) {
  const service = await prepareRedis(options);
  await service.start();
  return service;
}
