import { Global, Module, type DynamicModule } from '@nestjs/common';
import { Database } from '@masswright/drizzle';
import type { Logger } from '@masswright/logs';
import { createObjectStorage, ObjectStorage } from '@masswright/storage';
import { loggerProvider } from './inject-logger';
import { storageOptions, workerSettingsProvider, type WorkerSettings } from './worker-settings';

/** What every module stands on: settings, log, database, storage. */
@Global()
@Module({})
export class PlatformModule {
  static with(settings: WorkerSettings, logger: Logger): DynamicModule {
    const database = new Database({
      url: settings.DATABASE_URL,
      poolSize: settings.DATABASE_POOL_SIZE,
      applicationName: 'masswright-worker',
      onConnectionError: (error) => logger.warn({ err: error }, 'an idle database connection was lost'),
    });
    const providers = [
      workerSettingsProvider(settings),
      loggerProvider(logger),
      { provide: Database, useValue: database },
      { provide: ObjectStorage, useValue: createObjectStorage(storageOptions(settings)) },
    ];
    return { module: PlatformModule, providers, exports: providers.map(({ provide }) => provide) };
  }
}
