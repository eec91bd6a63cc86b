import type { IncomingMessage } from 'node:http';
import { VersioningType } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { FrameworkLogger, type Logger } from '@masswright/logs';
import { AppModule } from './app.module';
import { Metrics } from './health/metrics';
import type { ApiSettings } from './platform/api-settings';
import { ProblemFilter } from './platform/problem.filter';
import { logRequests } from './platform/request-log';
import { securityHeaders } from './platform/security-headers';
import { serveWebPages } from './platform/web-pages';

const isTableOfMaterials = ({ url, headers }: IncomingMessage): boolean => url === '/api/v1/materials/import' && /^application\/json\b/iu.test(headers['content-type'] ?? '');

/** The whole api, not yet listening. */
export async function createApplication(settings: ApiSettings, logger: Logger): Promise<NestExpressApplication> {
  const application = await NestFactory.create<NestExpressApplication>(AppModule.with(settings, logger), {
    logger: new FrameworkLogger(logger),
    abortOnError: false,
    bodyParser: false,
  });
  application.set('trust proxy', settings.TRUSTED_PROXIES);
  application.disable('x-powered-by');
  application.use(logRequests(logger));
  application.use(application.get(Metrics).observe);
  application.use(securityHeaders(settings));
  if (settings.WEB_DIR !== undefined) application.use(...serveWebPages(settings.WEB_DIR));
  // A table of materials is two million characters at most; ten thousand ids of parts fit into half a megabyte.
  application.useBodyParser('json', { limit: '4mb', strict: true, type: isTableOfMaterials });
  application.useBodyParser('json', { limit: '512kb', strict: true });
  // /api/v1/… for every noun; health and metrics are of no version.
  application.setGlobalPrefix('api');
  application.enableVersioning({ type: VersioningType.URI, defaultVersion: '1' });
  application.useGlobalFilters(new ProblemFilter(logger));
  return application;
}
