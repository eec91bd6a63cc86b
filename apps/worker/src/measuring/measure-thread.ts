import { workerData, type MessagePort } from 'node:worker_threads';
import { createObjectStorage, type ObjectStorageOptions } from '@masswright/storage';
import { hashObject, measureObject, type FirstFigures, type HashingOutcome, type MeasuringOutcome, type MeasuringProgress } from './measure-object';

/** What a thread tells while it works. */
export type ThreadNews = { kind: 'progress'; progress: MeasuringProgress } | { kind: 'figures'; figures: FirstFigures };

export interface ThreadTask {
  work: 'hash' | 'measure';
  objectKey: string;
  sizeBytes: number;
  news: MessagePort;
}

const tellEveryMs = 150;
const storage = createObjectStorage((workerData as { storage: ObjectStorageOptions }).storage);

/** Runs in a thread of its own, so that hashing and integrating never hold up the locks and timers of the process. */
export default async function run({ work, objectKey, sizeBytes, news }: ThreadTask): Promise<MeasuringOutcome | HashingOutcome> {
  const say = (message: ThreadNews): void => news.postMessage(message);
  let toldAt = 0;
  let toldStage = '';
  const tell = (state: MeasuringProgress): void => {
    const now = performance.now();
    if (now - toldAt < tellEveryMs && state.stage === toldStage) return;
    toldAt = now;
    toldStage = state.stage;
    say({ kind: 'progress', progress: state });
  };
  try {
    return work === 'hash' ? await hashObject(storage, { objectKey }, tell) : await measureObject(storage, { objectKey, sizeBytes }, tell, (figures) => say({ kind: 'figures', figures }));
  } finally {
    news.close();
  }
}
