import { createHash } from 'node:crypto';
import { closeSync, openSync, readSync } from 'node:fs';
import { parentPort, workerData } from 'node:worker_threads';

/** Hashes a file in a thread of its own, beside the one that measures it, which reads it too: the second reading comes out of the system's cache. */
const { file } = workerData as { file: string };
const hash = createHash('sha256');
const buffer = new Uint8Array(1 << 18);
const descriptor = openSync(file, 'r');
for (let read = readSync(descriptor, buffer); read > 0; read = readSync(descriptor, buffer)) hash.update(buffer.subarray(0, read));
closeSync(descriptor);
parentPort?.postMessage(hash.digest('hex'));
