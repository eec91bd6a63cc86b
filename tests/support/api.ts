import type { NestExpressApplication } from '@nestjs/platform-express';
import { createApplication } from '@masswright/api';
import { parseApiEnvironment } from '@masswright/config';
import { Database } from '@masswright/drizzle';
import { createLogger } from '@masswright/logs';
import { findFreePort } from '../../tools/services/ports.mjs';
import { ApiUser } from './api-user';
import { environment } from './environment';
import type { TestDatabase } from './test-database';

export const linkSecret = 'ab'.repeat(32);
export const metricsToken = 'a token for the metrics';

/** The variables with which the api and the worker run beside each other on a test database. */
export function programEnvironment(database: TestDatabase, port: number): Record<string, string> {
  const { endpoint, region, bucket, accessKeyId, secretAccessKey } = environment.storage;
  return {
    DATABASE_URL: database.applicationUrl,
    REDIS_URL: environment.redisUrl,
    S3_ENDPOINT: endpoint,
    S3_REGION: region,
    S3_BUCKET: bucket,
    S3_ACCESS_KEY_ID: accessKeyId,
    S3_SECRET_ACCESS_KEY: secretAccessKey,
    SMTP_URL: environment.smtpUrl,
    MAIL_FROM: 'Masswright <masswright@example.test>',
    PUBLIC_URL: `http://127.0.0.1:${port}`,
    API_PORT: String(port),
    LINK_SECRET: linkSecret,
    METRICS_TOKEN: metricsToken,
    LOG_LEVEL: 'warn',
  };
}

export interface TestApi {
  url: string;
  application: NestExpressApplication;
  /** Someone at a browser of their own, not signed in yet. */
  visit: () => ApiUser;
  close: () => Promise<void>;
}

/** The api in this process, on a port of its own. */
export async function startTestApi(database: TestDatabase, overrides: Record<string, string> = {}): Promise<TestApi> {
  const port = await findFreePort();
  const settings = parseApiEnvironment({ ...programEnvironment(database, port), ...overrides });
  const application = await createApplication(settings, createLogger('api', settings.LOG_LEVEL));
  await application.listen(port, '127.0.0.1');
  const url = `http://127.0.0.1:${port}`;
  return {
    url,
    application,
    visit: () => new ApiUser(url, settings.PUBLIC_URL),
    close: async () => {
      application.getHttpServer().closeAllConnections();
      await application.close();
      await application.get(Database).close();
    },
  };
}
