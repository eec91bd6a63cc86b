import { createHash } from 'node:crypto';
import { stat } from 'node:fs/promises';
import path from 'node:path';
import { Worker } from 'node:worker_threads';
import type { Measurement } from '@masswright/contracts';
import { createIntegralsPass, createMeasurer, defaultLimits, MeshError, type IntegralsPass } from '@masswright/geometry';
import { readChunks } from './read-chunks';

/** A smaller file is examined in one reading. */
const bytesInOneReading = 2_000_000;
/** From here on starting a thread for the hash pays. */
const bytesForThread = 100_000_000;

export interface MeasuredFile {
  sha256: string;
  measurement: Measurement;
}

/**
 * Measures a file of the disk: its integrals and whether it is closed in one reading, and then, unless it is `quick` or the mesh is too large for that, the rest
 * in another.
 * @param onProgress the share that is done, from 0 to 1
 * @throws MeshError; and what the system says of a file that can't be read
 */
export async function measureFile(file: string, quick: boolean, onProgress: (share: number) => void): Promise<MeasuredFile> {
  const { size } = await stat(file);
  const hash = size >= bytesForThread ? hashBeside(file) : hashAlong();
  if (size <= bytesInOneReading && !quick) return { measurement: await push(file, size, createMeasurer({ sizeBytes: size }), hash.take, onProgress), sha256: await hash.end() };
  const half = (offset: number) => (share: number) => onProgress(quick ? share : offset + share / 2);
  const measurement = await integrate(file, size, hash.take, half(0));
  const sha256 = await hash.end();
  if (quick) return { sha256, measurement };
  const limited: Measurement = { ...measurement, examined: 'limited' };
  if (measurement.facets > defaultLimits.maximumExaminedFacets) return { sha256, measurement: limited };
  try {
    return { sha256, measurement: await push(file, size, createMeasurer({ sizeBytes: size }), () => undefined, half(0.5)) };
  } catch (error) {
    // The file was read once without a fault: what is refused now is too large for the memory that there is.
    if (error instanceof MeshError) return { sha256, measurement: limited };
    throw error;
  }
}

async function integrate(file: string, size: number, alsoTake: (chunk: Uint8Array) => void, onProgress: (share: number) => void): Promise<Measurement> {
  let pass: IntegralsPass = createIntegralsPass({ sizeBytes: size });
  for (let take = alsoTake; ; take = () => undefined) {
    const end = await push(file, size, pass, take, onProgress);
    if (end.kind === 'measured') return end.measurement;
    ({ pass } = end);
  }
}

async function push<Result>(file: string, size: number, taker: { push(chunk: Uint8Array): void; finish(): Result }, alsoTake: (chunk: Uint8Array) => void, onProgress: (share: number) => void): Promise<Result> {
  let read = 0;
  await readChunks(file, (chunk) => {
    alsoTake(chunk);
    taker.push(chunk);
    read += chunk.length;
    onProgress(size === 0 ? 1 : read / size);
  });
  return taker.finish();
}

interface FileHash {
  take: (chunk: Uint8Array) => void;
  end: () => Promise<string>;
}

function hashAlong(): FileHash {
  const hash = createHash('sha256');
  return { take: (chunk) => void hash.update(chunk), end: () => Promise.resolve(hash.digest('hex')) };
}

function hashBeside(file: string): FileHash {
  const thread = new Worker(path.join(import.meta.dirname, 'hash-thread.js'), { workerData: { file } });
  const hashed = new Promise<string>((resolve, reject) => {
    thread.once('message', resolve);
    thread.once('error', reject);
  });
  // A file that is refused ends before its hash is asked for.
  hashed.catch(() => undefined);
  return { take: () => undefined, end: () => hashed };
}
