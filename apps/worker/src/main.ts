import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { parseWorkerEnvironment, readEnvironmentOrExit } from '@masswright/config';
import { Database } from '@masswright/drizzle';
import { createLogger, FrameworkLogger } from '@masswright/logs';
import { ObjectStorage } from '@masswright/storage';
import { QueueConsumers } from './queue/queue-consumers';
import { OutboxRelay } from './relay/outbox-relay';
import { WorkerModule } from './worker.module';

const settings = readEnvironmentOrExit(parseWorkerEnvironment);
const logger = createLogger('worker', settings.LOG_LEVEL);
const application = await NestFactory.create<NestExpressApplication>(WorkerModule.with(settings, logger), {
  logger: new FrameworkLogger(logger),
  abortOnError: false,
});
application.disable('x-powered-by');

let isStopping = false;
/** Take no more, finish or hand back what is at hand, leave by the deadline. */
async function stop(signal: string): Promise<void> {
  if (isStopping) return;
  isStopping = true;
  logger.info({ signal }, 'stopping');
  setTimeout(() => {
    logger.error('the deadline passed before all jobs were done or handed back');
    process.exit(1);
  }, settings.SHUTDOWN_DEADLINE_MS).unref();
  await application.get(OutboxRelay).stop();
  // Half of the time to finish, the rest to hand back.
  await application.get(QueueConsumers).stop(settings.SHUTDOWN_DEADLINE_MS / 2);
  application.getHttpServer().closeAllConnections();
  await application.close();
  await application.get(Database).close();
  application.get(ObjectStorage).close();
  logger.info('stopped');
  process.exit(0);
}
process.once('SIGTERM', () => void stop('SIGTERM'));
process.once('SIGINT', () => void stop('SIGINT'));

await application.listen(settings.WORKER_PORT, settings.WORKER_HOST);
logger.info({ host: settings.WORKER_HOST, port: settings.WORKER_PORT }, 'working');
