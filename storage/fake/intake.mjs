import { createHash } from 'node:crypto';
import { createReadStream, createWriteStream } from 'node:fs';
import { rm, stat } from 'node:fs/promises';
import path from 'node:path';
import { Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { randomBytes } from 'node:crypto';
import { crc32 } from 'node:zlib';
import S3Error from 's3rver/lib/models/error.js';

/**
 * What the sender says about the bytes of a body; checked when the last one is there.
 * @typedef {object} Expectation
 * @property {number} [sizeBytes]
 * @property {string} [md5Base64]
 * @property {string} [sha256Hex]
 * @property {string} [crc32Base64]
 * @property {string} [sha256Base64]
 * @property {boolean} [onlyIfAbsent]
 */

/** @type {WeakMap<object, Expectation>} */
const expectations = new WeakMap();

/** @param {object} body @param {Expectation} expectation */
export function expectOf(body, expectation) {
  expectations.set(body, expectation);
}
/** @param {object} body @returns {Expectation} */
export function getExpectation(body) {
  return expectations.get(body) ?? {};
}

/** @param {string} message */
function badDigest(message) {
  return new S3Error('BadDigest', message);
}

/**
 * Writes a body to a file of its own below `folder` and checks it. Whatever goes wrong, an interruption by the sender too, nothing is left behind.
 * @param {string} folder
 * @param {import('node:stream').Readable} body
 * @param {Expectation} expectation
 * @returns {Promise<{ file: string, sizeBytes: number, md5: string, sha256: string }>} the hashes in hexadecimal digits
 */
export async function takeIn(folder, body, expectation) {
  const file = path.join(folder, randomBytes(16).toString('hex'));
  const md5 = createHash('md5');
  const sha256 = createHash('sha256');
  let crc = 0;
  let sizeBytes = 0;
  const meter = new Transform({
    transform(/** @type {Buffer} */ chunk, _encoding, done) {
      sizeBytes += chunk.length;
      md5.update(chunk);
      sha256.update(chunk);
      if (expectation.crc32Base64 !== undefined) crc = crc32(chunk, crc);
      done(null, chunk);
    },
  });
  try {
    await pipeline(body, meter, createWriteStream(file, { flags: 'wx' }));
    const md5Sum = md5.digest();
    const sha256Sum = sha256.digest();
    const crcBytes = Buffer.alloc(4);
    crcBytes.writeUInt32BE(crc);
    if (expectation.sizeBytes !== undefined && sizeBytes !== expectation.sizeBytes) throw new S3Error('IncompleteBody', 'The body has another length than the header says.');
    if (expectation.md5Base64 !== undefined && md5Sum.toString('base64') !== expectation.md5Base64) throw badDigest('The Content-MD5 you specified did not match what we received.');
    if (expectation.sha256Base64 !== undefined && sha256Sum.toString('base64') !== expectation.sha256Base64) throw badDigest('The SHA-256 you specified did not match what we received.');
    if (expectation.crc32Base64 !== undefined && crcBytes.toString('base64') !== expectation.crc32Base64) throw badDigest('The CRC-32 you specified did not match what we received.');
    if (expectation.sha256Hex !== undefined && sha256Sum.toString('hex') !== expectation.sha256Hex) {
      throw Object.assign(new S3Error('XAmzContentSHA256Mismatch', 'The body is not the one that was signed.'), { status: 400 });
    }
    return { file, sizeBytes, md5: md5Sum.toString('hex'), sha256: sha256Sum.toString('hex') };
  } catch (error) {
    await rm(file, { force: true });
    if (error instanceof S3Error) throw error;
    if (/** @type {NodeJS.ErrnoException} */ (error).code === 'ENOSPC') throw new S3Error('ServiceUnavailable', 'The disk is full.');
    throw new S3Error('IncompleteBody', 'The sender stopped before the last byte.');
  }
}

/**
 * Joins files into one, in the order given.
 * @param {string} folder
 * @param {string[]} files
 * @returns {Promise<{ file: string, sizeBytes: number }>}
 */
export async function joinFiles(folder, files) {
  const file = path.join(folder, randomBytes(16).toString('hex'));
  try {
    await pipeline(async function* () {
      for (const part of files) yield* createReadStream(part, { highWaterMark: 1 << 20 });
    }, createWriteStream(file, { flags: 'wx', highWaterMark: 1 << 20 }));
    return { file, sizeBytes: (await stat(file)).size };
  } catch (error) {
    await rm(file, { force: true });
    throw error;
  }
}
