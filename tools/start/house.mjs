import { readFileSync, existsSync, mkdirSync, readdirSync, renameSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { prepareMail, prepareObjectStorage, preparePostgres, prepareProgram, prepareRedis, wrongEnvironment } from '../services/index.mjs';
import { inCheckout, Obstacle, root } from '../setup/checkout.mjs';
import { note } from '../setup/stages.mjs';
import { runTask } from '../setup/tasks.mjs';

/** @typedef {import('./settings.mjs').Settings} Settings */

/** Yesterday's logs get another name: two generations are kept. @param {string} folder */
export function rotateLogs(folder) {
  mkdirSync(folder, { recursive: true });
  for (const name of readdirSync(folder).filter((file) => file.endsWith('.log'))) renameSync(path.join(folder, name), path.join(folder, `${name}.1`));
}

/** The servers of this machine that the environment does not replace by others. @param {Settings} settings */
export async function prepareServices(settings) {
  const { dataFolder, local, ports, secrets } = settings;
  const log = (/** @type {string} */ name) => path.join(settings.logFolder, `${name}.log`);
  const origins = [settings.publicUrl, ...[ports.api, ports.web].flatMap((port) => [`http://127.0.0.1:${port}`, `http://localhost:${port}`])].map((url) => new URL(url).origin);
  return {
    postgres: local.postgres ? await preparePostgres({ directory: path.join(dataFolder, 'postgres'), port: ports.postgres, logFile: log('postgres') }) : undefined,
    redis: local.redis ? await prepareRedis({ directory: path.join(dataFolder, 'redis'), port: ports.redis, password: secrets.redisPassword, logFile: log('redis') }) : undefined,
    objectStorage: local.objectStorage
      ? await prepareObjectStorage({
          directory: path.join(dataFolder, 'objects'),
          port: ports.objectStorage,
          accessKeyId: secrets.s3AccessKeyId,
          secretAccessKey: secrets.s3SecretAccessKey,
          allowedOrigins: origins,
          logFile: log('object-storage'),
        })
      : undefined,
    mail: local.mail ? await prepareMail({ directory: path.join(dataFolder, 'mail'), smtpPort: ports.smtp, inboxPort: ports.inbox, logFile: log('mail') }) : undefined,
  };
}

/** @param {Settings} settings @param {NodeJS.ProcessEnv} env */
export function preparePrograms(settings, env) {
  const log = (/** @type {string} */ name) => path.join(settings.logFolder, `${name}.log`);
  const host = (/** @type {string | undefined} */ listens) => (listens === undefined || listens === '0.0.0.0' || listens === '::' ? '127.0.0.1' : listens);
  return {
    worker: prepareProgram({ kind: 'worker', file: settings.built('apps/worker', 'main.js'), env, readyUrl: `http://${host(env.WORKER_HOST)}:${settings.ports.worker}/health/ready`, logFile: log('worker'), readyTimeoutMs: 60_000 }),
    api: prepareProgram({ kind: 'api', file: settings.built('apps/api', 'main.js'), env, readyUrl: `http://${host(env.API_HOST)}:${settings.ports.api}/api/health/ready`, logFile: log('api'), readyTimeoutMs: 60_000 }),
  };
}

/** @param {Settings} settings */
export async function build(settings) {
  const done = await runTask(inCheckout('node_modules/.bin/nx'), ['run-many', '-t', 'build', '--outputStyle=static'], {
    cwd: root,
    env: { ...process.env, NX_DAEMON: 'false', NX_TUI: 'false', BUILD_DIR: '', NODE_ENV: 'production' },
    logFile: path.join(settings.logFolder, 'build.log'),
  });
  if (done.code !== 0) throw new Obstacle(`The build failed:\n${done.output.trimEnd().split('\n').slice(-60).join('\n')}`);
}

/** @param {Settings} settings @param {NodeJS.ProcessEnv} env */
export async function migrate(settings, env) {
  const done = await runTask(process.execPath, ['--enable-source-maps', settings.built('drizzle', 'migrate.js')], { cwd: root, env, logFile: path.join(settings.logFolder, 'migrate.log') });
  if (done.code === wrongEnvironment) throw new Obstacle(`The environment is wrong:\n${done.output.trimEnd()}`);
  if (done.code !== 0) throw new Obstacle(`The database could not be migrated:\n${done.output.trimEnd()}`);
}

/**
 * @typedef {{ email: string, password: string, role: string }} SignIn
 */

/**
 * Fills an empty installation through the api, once: people may change what is in it as they like. The sign-ins are the last line that the
 * program prints. A demonstration that can't be set up is a pity, not a reason to stop.
 * @param {Settings} settings @param {NodeJS.ProcessEnv} env @returns {Promise<SignIn[]>}
 */
export async function seed(settings, env) {
  const kept = path.join(settings.dataFolder, 'sign-ins.json');
  if (existsSync(kept)) return JSON.parse(readFileSync(kept, 'utf8'));
  const log = path.join(settings.logFolder, 'seed.log');
  const done = await runTask(process.execPath, ['--enable-source-maps', settings.built('demo', 'seed.js')], { cwd: root, env, logFile: log });
  if (done.code !== 0) {
    note(`The demonstration could not be set up; the next start tries again. What went wrong stands in ${log}.`);
    return [];
  }
  /** @type {{ signIns: SignIn[] }} */
  const printed = JSON.parse(done.stdout.trimEnd().split('\n').at(-1) ?? '{ "signIns": [] }');
  writeFileSync(kept, JSON.stringify(printed.signIns), { mode: 0o600 });
  return printed.signIns;
}
