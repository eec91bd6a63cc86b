import { randomBytes } from 'node:crypto';
import net from 'node:net';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { findFreePort } from './ports.mjs';
import { Service, stopOrder } from './service.mjs';

const program = fileURLToPath(new URL('../../storage/fake/main.mjs', import.meta.url));

/** @param {number} port @returns {Promise<boolean>} */
export function isListening(port) {
  return new Promise((resolve) => {
    const socket = net.connect(port, '127.0.0.1');
    socket.once('connect', () => {
      socket.destroy();
      resolve(true);
    });
    socket.once('error', () => resolve(false));
  });
}

/**
 * @typedef {object} ObjectStorageServiceOptions
 * @property {string} directory
 * @property {number} [port]
 * @property {string} [bucket]
 * @property {string} [region]
 * @property {string} [accessKeyId]
 * @property {string} [secretAccessKey]
 * @property {string[]} [allowedOrigins] of the pages that may put and get
 * @property {string} [logFile]
 */

/** The local object storage on loopback, not started yet. @param {ObjectStorageServiceOptions} options */
export async function prepareObjectStorage({ directory, port: wanted, bucket = 'masswright', region = 'local', accessKeyId = `local-${randomBytes(6).toString('hex')}`, secretAccessKey = randomBytes(24).toString('hex'), allowedOrigins = [], logFile = path.join(directory, 'object-storage.log') }) {
  const port = wanted ?? (await findFreePort());
  const service = new Service({
    name: 'Object storage',
    command: process.execPath,
    args: [program],
    env: {
      PATH: process.env.PATH,
      FAKE_S3_DIRECTORY: directory,
      FAKE_S3_PORT: String(port),
      FAKE_S3_ORIGINS: allowedOrigins.join(','),
      S3_BUCKET: bucket,
      S3_REGION: region,
      S3_ACCESS_KEY_ID: accessKeyId,
      S3_SECRET_ACCESS_KEY: secretAccessKey,
    },
    logFile,
    order: stopOrder.objectStorage,
    isReady: () => isListening(port),
  });
  const url = `http://127.0.0.1:${port}`;
  return Object.assign(service, { port, url, bucket, region, accessKeyId, secretAccessKey, forcePathStyle: true });
}

/** @param {ObjectStorageServiceOptions} options */
export async function startObjectStorage(options) {
  const service = await prepareObjectStorage(options);
  await service.start();
  return service;
}
