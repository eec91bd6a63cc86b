import S3Error from 's3rver/lib/models/error.js';

/** @typedef {import('s3rver').FakeContext} FakeContext */
/** @typedef {import('./store.mjs').DurableStore} DurableStore */

const xmlns = 'http://s3.amazonaws.com/doc/2006-03-01/';

/** @param {FakeContext} ctx @param {string} name @param {number} most */
function readLimit(ctx, name, most) {
  const text = ctx.query[name];
  const limit = text === undefined ? most : Number(text);
  if (!Number.isInteger(limit) || limit < 1) throw new S3Error('InvalidArgument', `${name} must be a positive integer.`);
  return Math.min(limit, most);
}

/** @param {FakeContext} ctx @param {DurableStore} store @param {string} bucket @param {string} key @param {string} uploadId */
export async function answerListParts(ctx, store, bucket, key, uploadId) {
  const limit = readLimit(ctx, 'max-parts', 1000);
  const after = Number(ctx.query['part-number-marker'] ?? 0);
  const rest = (await store.uploads.listParts(uploadId)).filter((part) => part.number > after);
  const page = rest.slice(0, limit);
  ctx.status = 200;
  ctx.body = {
    ListPartsResult: {
      '@': { xmlns },
      Bucket: bucket,
      Key: key,
      UploadId: uploadId,
      PartNumberMarker: after,
      NextPartNumberMarker: page.at(-1)?.number ?? 0,
      MaxParts: limit,
      IsTruncated: rest.length > page.length,
      Part: page.map((part) => ({ PartNumber: part.number, LastModified: part.modified.toISOString(), ETag: `"${part.etag}"`, Size: part.sizeBytes, ...(part.sha256 === undefined ? {} : { ChecksumSHA256: Buffer.from(part.sha256, 'hex').toString('base64') }) })),
    },
  };
}

/** @param {FakeContext} ctx @param {DurableStore} store @param {string} bucket */
export async function answerListUploads(ctx, store, bucket) {
  const limit = readLimit(ctx, 'max-uploads', 1000);
  const prefix = String(ctx.query.prefix ?? '');
  const keyMarker = String(ctx.query['key-marker'] ?? '');
  const idMarker = String(ctx.query['upload-id-marker'] ?? '');
  const all = (await store.uploads.list(bucket)).filter((upload) => upload.key.startsWith(prefix));
  const at = idMarker === '' ? -1 : all.findIndex((upload) => upload.key === keyMarker && upload.uploadId === idMarker);
  const rest = at >= 0 ? all.slice(at + 1) : all.filter((upload) => upload.key > keyMarker);
  const page = rest.slice(0, limit);
  const last = page.at(-1);
  ctx.status = 200;
  ctx.body = {
    ListMultipartUploadsResult: {
      '@': { xmlns },
      Bucket: bucket,
      KeyMarker: keyMarker,
      UploadIdMarker: idMarker,
      NextKeyMarker: last?.key ?? '',
      NextUploadIdMarker: last?.uploadId ?? '',
      MaxUploads: limit,
      Prefix: prefix,
      IsTruncated: rest.length > page.length,
      Upload: page.map((upload) => ({ Key: upload.key, UploadId: upload.uploadId, Initiated: upload.initiated, StorageClass: 'STANDARD' })),
    },
  };
}
