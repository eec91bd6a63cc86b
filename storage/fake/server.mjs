import http from 'node:http';
import S3rver from 's3rver';
import S3Error from 's3rver/lib/models/error.js';
import { answerCors } from './cors.mjs';
import { admit, noteExpectation, parseTarget, prepareRead, wantsAbsence } from './guard.mjs';
import { answerListParts, answerListUploads } from './multipart.mjs';
import { DurableStore } from './store.mjs';

/**
 * An S3-compatible store for development and tests: s3rver's routes and documents, behind a layer of ours that verifies
 * signatures and mends what s3rver gets wrong, on a store whose writes are all or nothing. Loopback only.
 */

/**
 * @typedef {object} FakeOptions
 * @property {string} directory where buckets and open uploads are kept
 * @property {number} [port] 0 or nothing: any free one
 * @property {string} bucket made when it is not there
 * @property {string} region
 * @property {string} accessKeyId
 * @property {string} secretAccessKey
 * @property {string[]} [allowedOrigins] of web pages
 */

/** @typedef {import('s3rver').FakeContext} FakeContext */
/** @param {DurableStore} store @param {FakeOptions} options */
function guard(store, options) {
  const origins = new Set(options.allowedOrigins ?? []);
  return async (/** @type {FakeContext} */ ctx, /** @type {() => Promise<void>} */ next) => {
    if (answerCors(ctx, origins)) return;
    const payload = admit(ctx, options);
    const { bucket, key } = parseTarget(ctx);
    if (bucket !== options.bucket) throw new S3Error('NoSuchBucket', 'The specified bucket does not exist', { BucketName: bucket });
    const uploadId = ctx.query.uploadId === undefined ? undefined : String(ctx.query.uploadId);
    if (key === '') {
      if (ctx.method === 'GET' && 'uploads' in ctx.query) return answerListUploads(ctx, store, bucket);
      if (ctx.method === 'HEAD') {
        ctx.status = 200;
        ctx.body = '';
        return;
      }
      if (ctx.method !== 'GET' && !(ctx.method === 'POST' && 'delete' in ctx.query)) throw new S3Error('MethodNotAllowed', 'The specified method is not allowed against this resource.');
      return next();
    }
    if (uploadId !== undefined) {
      await store.uploads.checkBelongs(uploadId, bucket, key);
      if (ctx.method === 'GET') return answerListParts(ctx, store, bucket, key, uploadId);
      if (ctx.method === 'DELETE') {
        await store.uploads.remove(uploadId);
        ctx.status = 204;
        return;
      }
      if (ctx.method === 'POST' && wantsAbsence(ctx)) store.completeOnlyIfAbsent(uploadId);
    }
    if (ctx.method === 'PUT') noteExpectation(ctx, payload);
    if (ctx.method === 'GET' || ctx.method === 'HEAD') if (await prepareRead(ctx, store, bucket, key)) return;
    return next();
  };
}

/**
 * @param {FakeOptions} options
 * @returns {Promise<{ port: number, close: () => Promise<void> }>}
 */
export async function startFakeObjectStorage(options) {
  const store = new DurableStore(options.directory);
  store.addBucket(options.bucket);
  const app = new S3rver({ directory: options.directory, silent: true, vhostBuckets: false });
  app.store = app.context.store = store;
  app.silent = true;
  app.on('error', (error) => {
    const cutByClient = ['ECONNRESET', 'EPIPE', 'ERR_STREAM_PREMATURE_CLOSE', 'HPE_INVALID_EOF_STATE'].includes(error.code ?? '');
    if (!cutByClient && ![501, 503].includes(error.status ?? 500) && (error.status ?? 500) >= 500) console.error(JSON.stringify({ level: 'error', event: 'request-failed', message: error.message, stack: error.stack }));
  });
  // After s3rver's first two steps, which log and turn plain objects into XML; before its routes.
  app.middleware.splice(2, 0, guard(store, options));
  const server = http.createServer(app.callback());
  server.requestTimeout = 0;
  await new Promise((resolve, reject) => server.once('error', reject).listen(options.port ?? 0, '127.0.0.1', () => resolve(undefined)));
  const { port } = /** @type {import('node:net').AddressInfo} */ (server.address());
  return {
    port,
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  };
}
