import { parseApiEnvironment, readEnvironmentOrExit } from '@masswright/config';
import { Database } from '@masswright/drizzle';
import { ObjectStorage } from '@masswright/storage';
import { createApplication } from './create-application';
import { EventHub } from './events/event-hub';
import { ShutdownState } from './health/shutdown-state';
import { createLogger } from '@masswright/logs';

const settings = readEnvironmentOrExit(parseApiEnvironment);
const logger = createLogger('api', settings.LOG_LEVEL);
const application = await createApplication(settings, logger);

let isStopping = false;
/** Stop accepting, end the streams, let running requests finish, leave by the deadline. */
async function stop(signal: string): Promise<void> {
  if (isStopping) return;
  isStopping = true;
  logger.info({ signal }, 'stopping');
  setTimeout(() => {
    logger.error('the deadline passed before all requests were done');
    process.exit(1);
  }, settings.SHUTDOWN_DEADLINE_MS).unref();
  application.get(ShutdownState).begin();
  const server = application.getHttpServer();
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  application.get(EventHub).endAll();
  server.closeIdleConnections();
  // A connection that is kept alive becomes idle only after its answer.
  const sweep = setInterval(() => server.closeIdleConnections(), 100);
  await closed;
  clearInterval(sweep);
  await application.close();
  await application.get(Database).close();
  application.get(ObjectStorage).close();
  logger.info('stopped');
  process.exit(0);
}
process.once('SIGTERM', () => void stop('SIGTERM'));
process.once('SIGINT', () => void stop('SIGINT'));

await application.listen(settings.API_PORT, settings.API_HOST);
logger.info({ host: settings.API_HOST, port: settings.API_PORT }, 'listening');
