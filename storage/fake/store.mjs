import { createHash } from 'node:crypto';
import { createReadStream, mkdirSync, rmSync } from 'node:fs';
import { link, mkdir, open, rename, rm, writeFile } from 'node:fs/promises';
import path from 'node:path';
import S3Error from 's3rver/lib/models/error.js';
import S3Object from 's3rver/lib/models/object.js';
import FilesystemStore from 's3rver/lib/stores/filesystem.js';
import { getExpectation, joinFiles, takeIn } from './intake.mjs';
import { OpenUploads } from './open-uploads.mjs';

/**
 * s3rver's store on disk, with writes that are all or nothing: a body is taken in under a name of its own, checked,
 * and only then moved to where readers look. A kill at any moment leaves the old object, the new one or none.
 */
export class DurableStore extends FilesystemStore {
  /** @param {string} directory */
  constructor(directory) {
    const objects = path.join(directory, 'buckets');
    super(objects);
    this.objects = objects;
    this.incoming = path.join(directory, 'incoming');
    rmSync(this.incoming, { recursive: true, force: true });
    for (const folder of [this.objects, this.incoming]) mkdirSync(folder, { recursive: true });
    /** @type {Set<string>} */
    this.onlyIfAbsent = new Set();
    this.uploads = new OpenUploads(path.join(directory, 'uploads'), this.incoming);
  }

  /** @param {string} bucket */
  addBucket(bucket) {
    mkdirSync(path.join(this.objects, bucket), { recursive: true });
  }

  /** @param {S3Object} object */
  async putObject(object) {
    const body = /** @type {import('node:stream').Readable} */ (object.content);
    const expectation = getExpectation(body);
    const taken = await takeIn(this.incoming, body, expectation);
    await this.#publish(object, taken.file, taken.md5, expectation.onlyIfAbsent === true);
    return { size: taken.sizeBytes, md5: taken.md5 };
  }

  /** @param {S3Object} object @param {string} file @param {string} etag @param {boolean} onlyIfAbsent */
  async #publish(object, file, etag, onlyIfAbsent) {
    const at = (/** @type {string} */ resource) => this.getResourcePath(object.bucket, object.key, resource);
    const { 'last-modified': _modified, 'content-length': _length, etag: _etag, ...metadata } = object.metadata;
    try {
      await mkdir(path.dirname(at('object')), { recursive: true });
      if (onlyIfAbsent) {
        // `link` refuses to replace: of two writers of one key exactly one gets it.
        await link(file, at('object')).catch((error) => {
          throw /** @type {NodeJS.ErrnoException} */ (error).code === 'EEXIST' ? new S3Error('PreconditionFailed', 'The object is there already.') : error;
        });
      }
      await this.#replace(at('metadata.json'), JSON.stringify(metadata));
      // A reader between these steps finds no note of the hash and computes it; it never finds the hash of other bytes.
      await rm(at('object.md5'), { force: true });
      if (!onlyIfAbsent) await rename(file, at('object'));
      await this.#replace(at('object.md5'), etag);
    } finally {
      await rm(file, { force: true });
    }
  }

  /** @param {string} file @param {string} text */
  async #replace(file, text) {
    const draft = path.join(this.incoming, createHash('sha256').update(`${file}${process.hrtime.bigint()}`).digest('hex'));
    await writeFile(draft, text);
    await rename(draft, file);
  }

  /**
   * @param {string} bucket
   * @param {string} key
   * @param {{ start?: number, end?: number }} [wanted]
   */
  async getObject(bucket, key, wanted = {}) {
    const handle = await open(this.getResourcePath(bucket, key, 'object')).catch((error) => {
      if (/** @type {NodeJS.ErrnoException} */ (error).code === 'ENOENT') return undefined;
      throw error;
    });
    if (handle === undefined) return null;
    try {
      const metadata = await this.getMetadata(bucket, key);
      const { size } = await handle.stat();
      const start = wanted.start ?? 0;
      const end = Math.min(wanted.end ?? Infinity, size - 1);
      const ranged = wanted.start !== undefined || wanted.end !== undefined;
      const satisfiable = !ranged || (start < size && start <= end);
      if (!satisfiable || size === 0) await handle.close();
      const content = !satisfiable ? null : size === 0 ? createReadStream('/dev/null') : handle.createReadStream({ start, end, highWaterMark: 1 << 18 });
      const object = new S3Object(bucket, key, content, { ...metadata, 'content-length': size });
      if (ranged) object.range = { start, end };
      return object;
    } catch (error) {
      await handle.close();
      if (/** @type {NodeJS.ErrnoException} */ (error).code === 'ENOENT') return null;
      throw error;
    }
  }

  /** @param {string} bucket @param {string} key @param {string} uploadId @param {Record<string, unknown>} headers */
  async initiateUpload(bucket, key, uploadId, headers) {
    const algorithm = headers['x-amz-checksum-algorithm'];
    if (algorithm !== undefined && algorithm !== 'SHA256') throw new S3Error('NotImplemented', 'Only SHA256 checksums of parts are supported here.');
    await this.uploads.add(bucket, key, uploadId, new S3Object(bucket, key, null, headers).metadata, algorithm);
  }

  /** @param {string} _bucket @param {string} uploadId @param {string} partNumber @param {import('node:stream').Readable} body */
  async putPart(_bucket, uploadId, partNumber, body) {
    return this.uploads.putPart(uploadId, Number(partNumber), body);
  }

  /** s3rver's controller passes no headers on; the guard leaves word here that a completion must not replace anything. @param {string} uploadId */
  completeOnlyIfAbsent(uploadId) {
    this.onlyIfAbsent.add(uploadId);
  }

  /** @param {string} bucket @param {string} uploadId @param {{ number: number, etag: string }[]} named */
  async putObjectMultipart(bucket, uploadId, named) {
    const onlyIfAbsent = this.onlyIfAbsent.delete(uploadId);
    const upload = await this.uploads.get(uploadId);
    const parts = await this.uploads.choose(uploadId, named);
    const joined = await joinFiles(this.incoming, parts.map((part) => part.file));
    // As in S3: the hash of the hashes of the parts, so that nobody takes it for the hash of the file.
    const etag = `${createHash('md5').update(Buffer.from(parts.map((part) => part.etag).join(''), 'hex')).digest('hex')}-${parts.length}`;
    await this.#publish(new S3Object(bucket, upload.key, null, upload.metadata), joined.file, etag, onlyIfAbsent);
    await this.uploads.remove(uploadId);
    return { md5: etag, size: joined.sizeBytes };
  }
}
