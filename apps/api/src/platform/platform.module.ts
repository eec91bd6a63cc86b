import { Global, Module, type DynamicModule } from '@nestjs/common';
import type { Logger } from '@masswright/logs';
import { Database } from '@masswright/drizzle';
import { createObjectStorage, ObjectStorage } from '@masswright/storage';
import { apiSettingsProvider, type ApiSettings } from './api-settings';
import { AttemptLimits } from './attempt-limits';
import { loggerProvider } from './inject-logger';
import { Work } from './work';

/** What every module stands on: settings, log, database, storage. */
@Global()
@Module({})
export class PlatformModule {
  static with(settings: ApiSettings, logger: Logger): DynamicModule {
    const database = new Database({
      url: settings.DATABASE_URL,
      poolSize: settings.DATABASE_POOL_SIZE,
      applicationName: 'masswright-api',
      onConnectionError: (error) => logger.warn({ err: error }, 'an idle database connection was lost'),
    });
    const storage = createObjectStorage({
      endpoint: settings.S3_ENDPOINT,
      publicEndpoint: settings.S3_PUBLIC_ENDPOINT,
      region: settings.S3_REGION,
      bucket: settings.S3_BUCKET,
      accessKeyId: settings.S3_ACCESS_KEY_ID,
      secretAccessKey: settings.S3_SECRET_ACCESS_KEY,
      forcePathStyle: settings.S3_FORCE_PATH_STYLE,
    });
    return {
      module: PlatformModule,
      providers: [
        apiSettingsProvider(settings),
        loggerProvider(logger),
        { provide: Database, useValue: database },
        { provide: ObjectStorage, useValue: storage },
        AttemptLimits,
        Work,
      ],
      exports: [apiSettingsProvider(settings).provide, loggerProvider(logger).provide, Database, ObjectStorage, AttemptLimits, Work],
    };
  }
}
