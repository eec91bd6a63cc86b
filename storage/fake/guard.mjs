import S3Error from 's3rver/lib/models/error.js';
import { expectOf } from './intake.mjs';
import { checkSignature } from './signature.mjs';

/** @typedef {import('s3rver').FakeContext} FakeContext */
/** @typedef {import('./store.mjs').DurableStore} DurableStore */

/**
 * Refuses what is not signed by our key, then hides the signature from s3rver, which would read it in its own way.
 * @param {FakeContext} ctx
 * @param {{ accessKeyId: string, secretAccessKey: string, region: string }} key
 * @returns {string} the hash of the body that the signature declares, or a word such as UNSIGNED-PAYLOAD
 */
export function admit(ctx, key) {
  const verdict = checkSignature(ctx.req, key);
  if ('code' in verdict) throw new S3Error(verdict.code, verdict.message);
  delete ctx.req.headers.authorization;
  ctx.query = Object.fromEntries(Object.entries(ctx.query).filter(([name]) => !name.startsWith('X-Amz-')));
  ctx.state.account = {};
  return verdict.payload;
}

/** @param {FakeContext} ctx @returns {{ bucket: string, key: string }} */
export function parseTarget(ctx) {
  const [, bucket = '', ...segments] = ctx.path.split('/').map(decodeURIComponent);
  const key = segments.join('/');
  if ([bucket, ...segments].some((segment) => segment === '.' || segment === '..' || segment.includes('\0'))) throw new S3Error('InvalidURI', 'The key has a segment that is not allowed.');
  if (Buffer.byteLength(key) > 1024 || segments.some((segment) => Buffer.byteLength(segment) > 200)) throw new S3Error('KeyTooLongError', 'Your key is too long.');
  return { bucket, key };
}

/** Notes what the headers of a PUT promise about its body, for the intake to check. @param {FakeContext} ctx @param {string} payload */
export function noteExpectation(ctx, payload) {
  const header = (/** @type {string} */ name) => ctx.get(name) || undefined;
  if (payload.startsWith('STREAMING-') || ctx.get('content-encoding').includes('aws-chunked')) {
    throw new S3Error('NotImplemented', 'Chunked signatures are not supported here; send the body as it is.');
  }
  const unknown = Object.keys(ctx.req.headers).find((name) => name.startsWith('x-amz-checksum-') && !['x-amz-checksum-crc32', 'x-amz-checksum-sha256'].includes(name));
  if (unknown !== undefined) throw new S3Error('NotImplemented', `${unknown} is not supported here.`);
  const length = header('content-length');
  if (length === undefined) throw new S3Error('MissingContentLength', 'You must provide the Content-Length HTTP header.');
  const md5 = header('content-md5');
  if (md5 !== undefined && Buffer.from(md5, 'base64').length !== 16) throw new S3Error('InvalidDigest', 'The Content-MD5 you specified is not valid.');
  expectOf(ctx.req, {
    sizeBytes: Number(length),
    md5Base64: md5,
    sha256Hex: /^[0-9a-f]{64}$/.test(payload) ? payload : undefined,
    crc32Base64: header('x-amz-checksum-crc32'),
    sha256Base64: header('x-amz-checksum-sha256'),
    onlyIfAbsent: wantsAbsence(ctx),
  });
}

/** @param {FakeContext} ctx */
export function wantsAbsence(ctx) {
  const condition = ctx.get('if-none-match');
  if (condition === '') return false;
  if (condition !== '*') throw new S3Error('NotImplemented', 'Only If-None-Match: * is supported for writing.');
  return true;
}

/**
 * s3rver misreads `bytes=-5` and answers conditional reads without closing the file, so both are settled here.
 * @param {FakeContext} ctx
 * @param {DurableStore} store
 * @param {string} bucket
 * @param {string} key
 * @returns {Promise<boolean>} true when the answer is complete
 */
export async function prepareRead(ctx, store, bucket, key) {
  if (!(await store.existsObject(bucket, key))) return false;
  const metadata = await store.getMetadata(bucket, key);
  const size = Number(metadata['content-length']);
  const known = ctx.get('if-none-match');
  delete ctx.req.headers['if-none-match'];
  delete ctx.req.headers['if-modified-since'];
  if (known !== '' && (known === '*' || known === metadata['etag'])) {
    ctx.status = 304;
    return true;
  }
  const range = /^bytes=(\d*)-(\d*)$/.exec(ctx.get('range'));
  if (range === null || (range[1] === '' && range[2] === '')) {
    delete ctx.req.headers.range;
  } else if (range[1] === '') {
    const length = Number(range[2]);
    if (length === 0 || size === 0) throw new S3Error('InvalidRange', 'The requested range is not satisfiable');
    ctx.req.headers.range = `bytes=${Math.max(0, size - length)}-${size - 1}`;
  }
  return false;
}
