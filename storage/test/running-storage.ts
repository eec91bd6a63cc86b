import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdtemp, readdir, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import readline from 'node:readline';
import { fileURLToPath } from 'node:url';
import { createObjectStorage, ObjectStorageError, type ObjectStorage, type ObjectStorageErrorCode, type ObjectStorageOptions } from '../src';

const program = fileURLToPath(new URL('../fake/main.mjs', import.meta.url));
export const allowedOrigin = 'http://127.0.0.1:4600';

/** The local storage in a process of its own, with a client for it; killed and started again at will on the same data. */
export class RunningStorage {
  private process: ChildProcess | undefined;
  private options: ObjectStorageOptions | undefined;
  client!: ObjectStorage;

  private constructor(readonly directory: string) {}

  static async start(): Promise<RunningStorage> {
    const running = new RunningStorage(await mkdtemp(path.join(os.tmpdir(), 'masswright-storage-')));
    await running.boot(0);
    return running;
  }

  get endpoint(): string {
    if (!this.options) throw new Error('not started');
    return this.options.endpoint;
  }

  clientWith(changes: Partial<ObjectStorageOptions>): ObjectStorage {
    if (!this.options) throw new Error('not started');
    return createObjectStorage({ ...this.options, ...changes });
  }

  private async boot(port: number): Promise<void> {
    const key = { accessKeyId: 'test-key', secretAccessKey: 'test-secret' };
    const child = spawn(process.execPath, [program], {
      stdio: ['ignore', 'pipe', 'inherit'],
      env: {
        ...process.env,
        FAKE_S3_DIRECTORY: this.directory,
        FAKE_S3_PORT: String(port),
        FAKE_S3_ORIGINS: allowedOrigin,
        S3_BUCKET: 'meshes',
        S3_REGION: 'local',
        S3_ACCESS_KEY_ID: key.accessKeyId,
        S3_SECRET_ACCESS_KEY: key.secretAccessKey,
      },
    });
    this.process = child;
    const [line] = (await Promise.race([
      once(readline.createInterface({ input: child.stdout }), 'line'),
      once(child, 'exit').then(() => Promise.reject(new Error('the storage ended before it was ready'))),
    ])) as [string];
    const ready = JSON.parse(line) as { port: number };
    this.options = { endpoint: `http://127.0.0.1:${ready.port}`, region: 'local', bucket: 'meshes', forcePathStyle: true, ...key };
    this.client = createObjectStorage(this.options);
  }

  async restart(signal: NodeJS.Signals): Promise<void> {
    const port = Number(new URL(this.endpoint).port);
    await this.end(signal);
    await this.boot(port);
  }

  private async end(signal: NodeJS.Signals): Promise<void> {
    const child = this.process;
    if (!child) return;
    this.client.close();
    const gone = once(child, 'exit');
    child.kill(signal);
    await gone;
    this.process = undefined;
  }

  /** Files of bodies that were taken in but not yet moved to their place. */
  async listIncoming(): Promise<string[]> {
    return readdir(path.join(this.directory, 'incoming'));
  }

  async stop(): Promise<void> {
    await this.end('SIGTERM');
    await rm(this.directory, { recursive: true, force: true });
  }
}

/** Bytes that differ everywhere and are the same in every run. */
export function makeBytes(length: number, seed = 1): Uint8Array {
  const bytes = new Uint8Array(length);
  let state = seed >>> 0;
  for (let i = 0; i < length; i++) {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    bytes[i] = state >>> 24;
  }
  return bytes;
}

/** The code of the error in which the work ends. */
export async function findRefusal(work: Promise<unknown>): Promise<ObjectStorageErrorCode | 'none'> {
  try {
    await work;
    return 'none';
  } catch (error) {
    if (error instanceof ObjectStorageError) return error.code;
    throw error;
  }
}
