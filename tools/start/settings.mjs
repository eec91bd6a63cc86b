import path from 'node:path';
import { inCheckout, root } from '../setup/checkout.mjs';
import { getSecrets } from '../setup/secrets.mjs';

/**
 * Everything a start needs to know, from the environment and the secrets of this installation.
 * @param {NodeJS.ProcessEnv} environment
 * @param {string} dataFolder
 * @param {boolean} dev
 */
export function readSettings(environment, dataFolder, dev) {
  const base = Number(environment.PORT_BASE ?? 4600);
  const port = (/** @type {string} */ variable, /** @type {number} */ offset) => Number(environment[variable] ?? base + offset);
  const ports = {
    api: port('API_PORT', 0),
    worker: port('WORKER_PORT', 1),
    postgres: port('POSTGRES_PORT', 2),
    redis: port('REDIS_PORT', 3),
    objectStorage: port('S3_PORT', 4),
    smtp: port('SMTP_PORT', 5),
    inbox: port('INBOX_PORT', 6),
    web: port('WEB_PORT', 7),
  };
  const builds = environment.BUILD_DIR;
  /** Where the build of a project is. @param {string} project its folder @param {string} [file] */
  const built = (project, file = '') => (builds ? path.resolve(root, builds, project, file) : inCheckout(project, 'dist', file));
  const origin = `http://127.0.0.1:${dev ? ports.web : ports.api}`;
  return {
    dev,
    dataFolder,
    logFolder: `${dataFolder}/logs`,
    runFolder: `${dataFolder}/run`,
    ports,
    publicUrl: environment.PUBLIC_URL ?? origin,
    secrets: getSecrets(dataFolder),
    /** Whether a service of this machine is started, or one elsewhere is used. */
    local: {
      postgres: !environment.DATABASE_URL,
      redis: !environment.REDIS_URL,
      objectStorage: !environment.S3_ENDPOINT,
      mail: !environment.SMTP_URL,
    },
    built,
    /** With BUILD_DIR the builds are there already: the tests make them once. */
    buildsAreGiven: Boolean(builds),
  };
}

/** @typedef {ReturnType<typeof readSettings>} Settings */

/** @param {Settings} settings @returns {import('../setup/room.mjs').PortClaim[]} */
export function listPorts({ ports, local, dev }) {
  return [
    { port: ports.api, user: 'the application', variable: 'API_PORT' },
    { port: ports.worker, user: 'the worker', variable: 'WORKER_PORT' },
    ...(local.postgres ? [{ port: ports.postgres, user: 'PostgreSQL', variable: 'POSTGRES_PORT' }] : []),
    ...(local.redis ? [{ port: ports.redis, user: 'Redis', variable: 'REDIS_PORT' }] : []),
    ...(local.objectStorage ? [{ port: ports.objectStorage, user: 'the object storage', variable: 'S3_PORT' }] : []),
    ...(local.mail ? [{ port: ports.smtp, user: 'the mail server', variable: 'SMTP_PORT' }, { port: ports.inbox, user: 'the inbox page', variable: 'INBOX_PORT' }] : []),
    ...(dev ? [{ port: ports.web, user: 'the development server of the pages', variable: 'WEB_PORT' }] : []),
  ];
}

/**
 * The environment of our programs: what the person set, and ours where a service is local.
 * @param {Settings} settings
 * @param {{ postgresUrl?: string, redisUrl?: string, objectStorageUrl?: string, smtpUrl?: string }} urls of the local services
 * @returns {NodeJS.ProcessEnv}
 */
export function makeProgramEnvironment(settings, { postgresUrl, redisUrl, objectStorageUrl, smtpUrl }) {
  const { secrets, ports } = settings;
  const host = `127.0.0.1:${ports.postgres}`;
  return {
    NODE_ENV: settings.dev ? 'development' : 'production',
    LINK_SECRET: secrets.linkSecret,
    METRICS_TOKEN: secrets.metricsToken,
    MAIL_FROM: 'Masswright <no-reply@masswright.example>',
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
    ...process.env,
    PUBLIC_URL: settings.publicUrl,
    API_HOST: process.env.API_HOST ?? '127.0.0.1',
    API_PORT: String(ports.api),
    WORKER_HOST: process.env.WORKER_HOST ?? '127.0.0.1',
    WORKER_PORT: String(ports.worker),
    WEB_DIR: settings.built('apps/web'),
    ...(postgresUrl === undefined
      ? {}
      : {
          DATABASE_ADMIN_URL: postgresUrl,
          DATABASE_URL: `postgres://masswright_app:${secrets.applicationPassword}@${host}/masswright`,
          DATABASE_MIGRATION_URL: `postgres://masswright_migration:${secrets.migrationPassword}@${host}/masswright`,
        }),
    ...(redisUrl === undefined ? {} : { REDIS_URL: redisUrl }),
    ...(objectStorageUrl === undefined
      ? {}
      : {
          S3_ENDPOINT: objectStorageUrl,
          S3_PUBLIC_ENDPOINT: objectStorageUrl,
          S3_REGION: 'local',
          S3_BUCKET: 'masswright',
          S3_ACCESS_KEY_ID: secrets.s3AccessKeyId,
          S3_SECRET_ACCESS_KEY: secrets.s3SecretAccessKey,
          S3_FORCE_PATH_STYLE: 'true',
        }),
    ...(smtpUrl === undefined ? {} : { SMTP_URL: smtpUrl }),
  };
}
