import path from 'node:path';
import { MessageChannel } from 'node:worker_threads';
import { Injectable, type OnModuleDestroy } from '@nestjs/common';
import { Piscina } from 'piscina';
import { InjectWorkerSettings, storageOptions, type WorkerSettings } from '../platform/worker-settings';
import type { HashingOutcome, MeasuringOutcome } from './measure-object';
import type { ThreadNews, ThreadTask } from './measure-thread';

type StoredObject = Pick<ThreadTask, 'objectKey' | 'sizeBytes'>;

/** Beyond the base limit a file has so long for each of its bytes: a tenth of the slowest reading that was ever seen. */
const bytesPerMs = 1_000;

/** A thread was ended because its work took longer than such a file may take. */
export class TookTooLongError extends Error {
  override readonly name = 'TookTooLongError';
}

/** The pool of measuring threads, as many as files are measured at once; kept warm, for starting one takes longer than a small file. */
@Injectable()
export class MeasuringThreads implements OnModuleDestroy {
  private readonly pool: Piscina;

  constructor(@InjectWorkerSettings() private readonly settings: WorkerSettings) {
    this.pool = new Piscina({
      filename: path.join(import.meta.dirname, 'measure-thread.js'),
      minThreads: settings.WORKER_CONCURRENCY,
      maxThreads: settings.WORKER_CONCURRENCY,
      idleTimeout: Number.POSITIVE_INFINITY,
      workerData: { storage: storageOptions(settings) },
    });
  }

  async onModuleDestroy(): Promise<void> {
    await this.pool.destroy();
  }

  /** Measures an object in a thread; the signal ends the thread wherever it is. @throws TookTooLongError */
  async measure(object: StoredObject, onNews: (news: ThreadNews) => void, signal: AbortSignal): Promise<MeasuringOutcome> {
    return (await this.run('measure', object, onNews, signal)) as MeasuringOutcome;
  }

  /** Finds out an object's hash in a thread. */
  async hash(object: StoredObject, onNews: (news: ThreadNews) => void, signal: AbortSignal): Promise<HashingOutcome> {
    return (await this.run('hash', object, onNews, signal)) as HashingOutcome;
  }

  private async run(work: ThreadTask['work'], { objectKey, sizeBytes }: StoredObject, onNews: (news: ThreadNews) => void, signal: AbortSignal): Promise<unknown> {
    const { port1: ours, port2: theirs } = new MessageChannel();
    ours.on('message', onNews);
    const limit = AbortSignal.timeout(Math.min(2_147_483_647, Math.ceil(this.settings.MEASURING_LIMIT_MS + sizeBytes / bytesPerMs)));
    try {
      const task: ThreadTask = { work, objectKey, sizeBytes, news: theirs };
      return await this.pool.run(task, { transferList: [theirs], signal: AbortSignal.any([signal, limit]) });
    } catch (error) {
      if (limit.aborted && !signal.aborted) throw new TookTooLongError('Measuring took longer than such a file may take.', { cause: error });
      throw error;
    } finally {
      ours.close();
    }
  }
}
