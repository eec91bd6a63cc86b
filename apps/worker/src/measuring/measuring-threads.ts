import path from 'node:path';
import { MessageChannel } from 'node:worker_threads';
import { Injectable, type OnModuleDestroy } from '@nestjs/common';
import { Piscina } from 'piscina';
import { InjectWorkerSettings, storageOptions, type WorkerSettings } from '../platform/worker-settings';
import type { MeasuringOutcome, MeasuringProgress } from './measure-object';

/** The pool of measuring threads, as many as files are measured at once; kept warm, for starting one takes longer than a small file. */
@Injectable()
export class MeasuringThreads implements OnModuleDestroy {
  private readonly pool: Piscina;

  constructor(@InjectWorkerSettings() settings: WorkerSettings) {
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

  /** Measures an object in a thread; the signal ends the thread wherever it is. */
  async measure(
    object: { objectKey: string; sizeBytes: number },
    onProgress: (progress: MeasuringProgress) => void,
    signal: AbortSignal,
  ): Promise<MeasuringOutcome> {
    const { port1: ours, port2: theirs } = new MessageChannel();
    ours.on('message', onProgress);
    try {
      return (await this.pool.run({ ...object, progress: theirs }, { transferList: [theirs], signal })) as MeasuringOutcome;
    } finally {
      ours.close();
    }
  }
}
