import { workerData, type MessagePort } from 'node:worker_threads';
import { createObjectStorage, type ObjectStorageOptions } from '@masswright/storage';
import { measureObject, type MeasuringOutcome } from './measure-object';

export interface MeasureTask {
  objectKey: string;
  sizeBytes: number;
  progress: MessagePort;
}

const tellEveryMs = 150;
const storage = createObjectStorage((workerData as { storage: ObjectStorageOptions }).storage);

/** Runs in a thread of its own, so that hashing and integrating never hold up the locks and timers of the process. */
export default async function measure({ objectKey, sizeBytes, progress }: MeasureTask): Promise<MeasuringOutcome> {
  let toldAt = 0;
  let toldStage = '';
  const outcome = await measureObject(storage, { objectKey, sizeBytes }, (state) => {
    const now = performance.now();
    if (now - toldAt < tellEveryMs && state.stage === toldStage) return;
    toldAt = now;
    toldStage = state.stage;
    progress.postMessage(state);
  });
  progress.close();
  return outcome;
}
