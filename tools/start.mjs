// npm start, npm run dev: everything on this machine, from a fresh clone to a page in the browser. Built-ins only until `npm ci` has run.
import { ServiceFailure, wrongEnvironment } from './services/index.mjs';
import { chooseDataFolder, describeFallback } from './setup/data-folder.mjs';
import { Obstacle, root } from './setup/checkout.mjs';
import { ensureDebianPackages } from './setup/debian-packages.mjs';
import { ensureNodePackages } from './setup/node-packages.mjs';
import { checkDisk, checkPorts } from './setup/room.mjs';
import { note, stage } from './setup/stages.mjs';
import { endTasks } from './setup/tasks.mjs';
import { startDevelopment } from './start/development.mjs';
import { build, migrate, preparePrograms, prepareServices, rotateLogs, seed } from './start/house.mjs';
import { RunNotes } from './start/run-notes.mjs';
import { listPorts, makeProgramEnvironment, readSettings } from './start/settings.mjs';
import { Supervisor } from './start/supervisor.mjs';

const dev = process.argv.includes('--dev');
const begun = performance.now();
const supervisor = new Supervisor({ log: note, onFatal: (message) => void stop(1, message) });
/** @type {RunNotes | undefined} */
let notes;
/** @type {Promise<never> | undefined} */
let stopping;

/** @param {number} code @param {string} [message] @returns {Promise<never>} */
function stop(code, message) {
  stopping ??= (async () => {
    if (message !== undefined) console.error(`\n${message}`);
    const from = performance.now();
    endTasks();
    await supervisor.stop();
    notes?.clear(true);
    if (code === 0) console.log(`${((performance.now() - from) / 1000).toFixed(1).padStart(6)} s  Stopped.`);
    process.exit(code);
  })();
  return stopping;
}

let signals = 0;
for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
  process.on(signal, () => {
    signals += 1;
    if (signals > 1) supervisor.kill();
    else console.log('\nStopping …');
    void stop(0);
  });
}

/** @param {import('./start/settings.mjs').Settings} settings @param {RunNotes} runNotes */
async function startServices(settings, runNotes) {
  const prepared = await prepareServices(settings);
  const wanted = Object.values(prepared).flatMap((service) => service ?? []);
  for (const service of wanted) service.on('spawn', (ward) => runNotes.write(ward));
  await Promise.all(wanted.map((service) => supervisor.start(service)));
  return prepared;
}

/** @param {Awaited<ReturnType<typeof startServices>>} services */
const describeServices = (services) => Object.values(services).flatMap((service) => service?.name ?? []).join(', ') || 'all elsewhere';

async function start() {
  // First of all: without room an installation would fail in words that are not ours.
  checkDisk(root);
  const local = { postgres: !process.env.DATABASE_URL, redis: !process.env.REDIS_URL };
  await stage(
    'System packages',
    () => ensureDebianPackages([...(local.postgres ? ['postgresql'] : []), ...(local.redis ? ['redis-server'] : [])]),
    (installed) => (installed.length > 0 ? `installed ${installed.join(', ')}` : 'all there'),
  );
  await stage('Node packages', ensureNodePackages, (ran) => (ran ? 'installed from the lock file' : 'as in the lock file'));
  const { folder, fallback } = chooseDataFolder(process.env.DATA_FOLDER ?? '.data', local.postgres);
  if (fallback) note(describeFallback(folder));
  const settings = readSettings(process.env, folder, dev);
  const runNotes = new RunNotes(settings.runFolder);
  runNotes.claim(settings.publicUrl);
  notes = runNotes;
  await stage('Disk and ports', async () => {
    checkDisk(folder);
    const left = await runNotes.stopLeftovers();
    await checkPorts(listPorts(settings));
    return left;
  }, (left) => (left.length > 0 ? `free; stopped what an earlier start left running: ${left.join(', ')}` : 'free'));
  rotateLogs(settings.logFolder);

  const [services] = await Promise.all([stage('Services', () => startServices(settings, runNotes), describeServices), settings.buildsAreGiven ? undefined : stage('Build', () => build(settings))]);
  const env = makeProgramEnvironment(settings, {
    postgresUrl: services.postgres?.url,
    redisUrl: services.redis?.url,
    objectStorageUrl: services.objectStorage?.url,
    smtpUrl: services.mail?.url,
  });
  await stage('Database migrated', () => migrate(settings, env));
  const programs = preparePrograms(settings, env);
  await stage('Worker and api', async () => {
    for (const program of Object.values(programs)) program.on('spawn', (ward) => runNotes.write(ward));
    await Promise.all(Object.values(programs).map((program) => supervisor.start(program)));
  });
  if (dev) await stage('Watching', () => startDevelopment(settings, env, supervisor, programs));
  // Its passwords are known to everyone who reads the demo, so a database elsewhere never gets it.
  const signIns = settings.local.postgres ? await stage('Demonstration', () => seed(settings, env)) : [];

  console.log(`\nReady after ${((performance.now() - begun) / 1000).toFixed(1)} s.\n\n  ${settings.publicUrl}\n`);
  for (const { email, password, role } of signIns) console.log(`  ${role.padEnd(14)} ${email.padEnd(32)} ${password}`);
  if (services.mail !== undefined) console.log(`\n  Mail that the application sends: ${services.mail.inboxUrl}`);
  console.log(`  Logs: ${settings.logFolder}\n  Ctrl-C stops everything.\n`);
  if (process.env.EXIT_WHEN_READY) await stop(0);
}

/** @param {unknown} error what a person reads about it */
function describe(error) {
  if (error instanceof ServiceFailure && error.exit?.code === wrongEnvironment) return `The environment is wrong:\n${error.logTail}`;
  if (error instanceof Obstacle || error instanceof ServiceFailure) return error.message;
  return error instanceof Error ? String(error.stack) : String(error);
}

start().catch((error) => {
  if (stopping === undefined) void stop(1, describe(error));
});
