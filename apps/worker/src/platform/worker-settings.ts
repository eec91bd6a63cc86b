import { Inject } from '@nestjs/common';
import type { WorkerEnvironment } from '@masswright/config';
import type { ObjectStorageOptions } from '@masswright/storage';

/** The worker's parsed environment. */
export type WorkerSettings = WorkerEnvironment;
const workerSettings = Symbol('worker settings');
export const workerSettingsProvider = (settings: WorkerSettings) => ({ provide: workerSettings, useValue: settings });
export const InjectWorkerSettings = () => Inject(workerSettings);

export function storageOptions(settings: WorkerSettings): ObjectStorageOptions {
  return {
    endpoint: settings.S3_ENDPOINT,
    region: settings.S3_REGION,
    bucket: settings.S3_BUCKET,
    accessKeyId: settings.S3_ACCESS_KEY_ID,
    secretAccessKey: settings.S3_SECRET_ACCESS_KEY,
    forcePathStyle: settings.S3_FORCE_PATH_STYLE,
  };
}
