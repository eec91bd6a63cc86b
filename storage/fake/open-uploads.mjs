import { mkdir, readFile, readdir, rename, rm, stat, writeFile } from 'node:fs/promises';
import path from 'node:path';
import S3Error from 's3rver/lib/models/error.js';
import { getExpectation, takeIn } from './intake.mjs';

/** Every part but the last of a finished upload is at least this large. */
export const smallestPartBytes = 5 * 1024 * 1024;
const mostParts = 10_000;

/** @typedef {{ bucket: string, key: string, metadata: Record<string, unknown>, initiated: string, checksumAlgorithm?: string }} Upload */
/** @typedef {{ number: number, etag: string, sha256?: string, sizeBytes: number, modified: Date, file: string }} Part */

const noSuchUpload = () => new S3Error('NoSuchUpload', 'The specified upload does not exist. It may have been aborted or completed.');

/** Multipart uploads that are neither completed nor aborted, each in a folder of its own; they outlive a restart. */
export class OpenUploads {
  /** @param {string} folder @param {string} incoming */
  constructor(folder, incoming) {
    this.folder = folder;
    this.incoming = incoming;
  }

  /** @param {string} uploadId */
  #at(uploadId) {
    if (!/^[0-9a-f]{32}$/.test(uploadId)) throw noSuchUpload();
    return path.join(this.folder, uploadId);
  }

  /** @param {string} bucket @param {string} key @param {string} uploadId @param {Record<string, unknown>} metadata @param {string | undefined} checksumAlgorithm */
  async add(bucket, key, uploadId, metadata, checksumAlgorithm) {
    const draft = path.join(this.incoming, uploadId);
    await mkdir(draft, { recursive: true });
    await mkdir(this.folder, { recursive: true });
    await writeFile(path.join(draft, 'upload.json'), JSON.stringify({ bucket, key, metadata, initiated: new Date().toISOString(), checksumAlgorithm }));
    await rename(draft, this.#at(uploadId));
  }

  /** @param {string} uploadId @returns {Promise<Upload>} */
  async get(uploadId) {
    const text = await readFile(path.join(this.#at(uploadId), 'upload.json'), 'utf8').catch((error) => {
      throw /** @type {NodeJS.ErrnoException} */ (error).code === 'ENOENT' ? noSuchUpload() : error;
    });
    return JSON.parse(text);
  }

  /** Refuses an id that belongs to another key, as S3 does. @param {string} uploadId @param {string} bucket @param {string} key */
  async checkBelongs(uploadId, bucket, key) {
    const upload = await this.get(uploadId);
    if (upload.bucket !== bucket || upload.key !== key) throw noSuchUpload();
  }

  /** @param {string} uploadId @param {number} number @param {import('node:stream').Readable} body */
  async putPart(uploadId, number, body) {
    if (!Number.isInteger(number) || number < 1 || number > mostParts) throw new S3Error('InvalidArgument', `Part number must be an integer between 1 and ${mostParts}.`);
    const expectation = getExpectation(body);
    const isChecked = await this.#checksumsOf(uploadId, expectation.sha256Base64 !== undefined);
    const taken = await takeIn(this.incoming, body, expectation);
    const name = `${number}-${taken.md5}${isChecked ? `-${taken.sha256}` : ''}`;
    try {
      await rename(taken.file, path.join(this.#at(uploadId), name));
    } catch {
      // Completed or aborted while the part was on its way.
      await rm(taken.file, { force: true });
      throw noSuchUpload();
    }
    const replaced = (await readdir(this.#at(uploadId))).filter((other) => other.startsWith(`${number}-`) && other !== name);
    await Promise.all(replaced.map((other) => rm(path.join(this.#at(uploadId), other), { force: true })));
    return { size: taken.sizeBytes, md5: taken.md5 };
  }

  /** As S3: an upload is begun with checksums of its parts or without, and then every part has one or none. @param {string} uploadId @param {boolean} given */
  async #checksumsOf(uploadId, given) {
    const { checksumAlgorithm } = await this.get(uploadId);
    if (checksumAlgorithm !== undefined && !given) throw new S3Error('InvalidRequest', `The upload was created using a ${checksumAlgorithm} checksum. The upload part request must include it.`);
    if (checksumAlgorithm === undefined && given) throw new S3Error('InvalidRequest', 'Checksum Type mismatch occurred, expected checksum Type: null, actual checksum Type: sha256');
    return given;
  }

  /** @param {string} uploadId @returns {Promise<Part[]>} in the order of their numbers */
  async listParts(uploadId) {
    await this.get(uploadId);
    const folder = this.#at(uploadId);
    const found = (await readdir(folder)).flatMap((name) => {
      const match = /^(\d+)-([0-9a-f]{32})(?:-([0-9a-f]{64}))?$/.exec(name);
      return match === null ? [] : [{ number: Number(match[1]), etag: match[2] ?? '', sha256: match[3], file: path.join(folder, name) }];
    });
    const parts = await Promise.all(
      found.map(async (part) => {
        const { size, mtime } = await stat(part.file);
        return { ...part, sizeBytes: size, modified: mtime };
      }),
    );
    // A kill between the arrival of a part and the removal of the one it replaces leaves two: the later one counts.
    const latest = new Map(parts.sort((a, b) => a.modified.getTime() - b.modified.getTime()).map((part) => [part.number, part]));
    return [...latest.values()].sort((a, b) => a.number - b.number);
  }

  /** The parts that a completion names, checked as S3 checks them. @param {string} uploadId @param {{ number: number, etag: string }[]} named */
  async choose(uploadId, named) {
    const stored = new Map((await this.listParts(uploadId)).map((part) => [part.number, part]));
    return named.map(({ number, etag }, index) => {
      if (index > 0 && number <= (named[index - 1]?.number ?? 0)) throw new S3Error('InvalidPartOrder', 'The list of parts was not in ascending order.');
      const part = stored.get(number);
      if (part === undefined || part.etag !== etag) throw new S3Error('InvalidPart', 'One or more of the specified parts could not be found, or its ETag does not match.', { PartNumber: number });
      if (index < named.length - 1 && part.sizeBytes < smallestPartBytes) {
        throw new S3Error('EntityTooSmall', 'Your proposed upload is smaller than the minimum allowed size.', { PartNumber: number, ProposedSize: part.sizeBytes, MinSizeAllowed: smallestPartBytes });
      }
      return part;
    });
  }

  /** @param {string} uploadId */
  async remove(uploadId) {
    const gone = path.join(this.incoming, `gone-${uploadId}`);
    await rename(this.#at(uploadId), gone).catch((error) => {
      throw /** @type {NodeJS.ErrnoException} */ (error).code === 'ENOENT' ? noSuchUpload() : error;
    });
    await rm(gone, { recursive: true, force: true });
  }

  /** @param {string} bucket @returns {Promise<(Upload & { uploadId: string })[]>} by key, then by time */
  async list(bucket) {
    const ids = await readdir(this.folder).catch(() => []);
    const uploads = await Promise.all(ids.map((uploadId) => this.get(uploadId).then((upload) => ({ ...upload, uploadId }), () => undefined)));
    return uploads
      .flatMap((upload) => (upload !== undefined && upload.bucket === bucket ? [upload] : []))
      .sort((a, b) => (a.key === b.key ? a.initiated.localeCompare(b.initiated) : a.key < b.key ? -1 : 1));
  }
}
