// npm test: lint, types, unit, integration, resilience and browser tests on ports, data and builds of their own, beside a running npm start.
// npm test -- --only integration --filter sign-in     one kind, and of it the files whose path has that in it
import { existsSync, mkdirSync, rmSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { findFreePort } from './services/index.mjs';
import { inCheckout, Obstacle } from './setup/checkout.mjs';
import { chooseDataFolder, describeFallback } from './setup/data-folder.mjs';
import { ensureDebianPackages } from './setup/debian-packages.mjs';
import { ensureNodePackages } from './setup/node-packages.mjs';
import { checkDisk } from './setup/room.mjs';
import { note, stage } from './setup/stages.mjs';
import { endTasks, runTask } from './setup/tasks.mjs';
import { RunNotes } from './start/run-notes.mjs';
import { add, countTasks, describeTally, emptyTally, pickTasks, readReport } from './test/reports.mjs';
import { startTestServices } from './test/services.mjs';
import { listProjects, runTargets } from './test/workspace.mjs';

const kinds = ['lint', 'unit', 'integration', 'start', 'resilience', 'browser'];
const { values } = parseArgs({ options: { only: { type: 'string', multiple: true }, filter: { type: 'string' } } });
const wanted = values.only ?? kinds;
const unknown = wanted.find((kind) => !kinds.includes(kind));
const suites = ['integration', 'start', 'resilience', 'browser'].filter((kind) => wanted.includes(kind));

const reports = inCheckout('.test/reports');
const buildFolder = inCheckout('.test/build');
const useCache = !process.env.CI;
const total = emptyTally();
/** @type {NodeJS.ProcessEnv} */
let env = { ...process.env, TEST_REPORTS_DIR: reports, TEST_BUILD_DIR: buildFolder, BUILD_DIR: buildFolder };
/** @type {(() => Promise<void>) | undefined} */
let stopServices;

/** @param {string} output */
const show = (output) => console.log(`${output.trimEnd()}\n`);

async function checkLint() {
  const expected = (await Promise.all(['lint', 'typecheck'].map(async (target) => (await listProjects(env, target)).map((project) => `${project}:${target}`)))).flat();
  const { output } = await runTargets(env, ['lint', 'typecheck'], { cached: useCache });
  const tally = countTasks(output, expected);
  if (tally.bad.length > 0) show(`${pickTasks(output, tally.bad)}\nLint or types failed: ${tally.bad.join(', ')}`);
  return tally;
}

async function runUnit() {
  const projects = await listProjects(env, 'test');
  // Never from the cache: what is counted was run now.
  const { output } = await runTargets(env, ['test'], { cached: false });
  const tally = emptyTally();
  const bad = [];
  for (const project of projects) {
    // An application is known to Vite by its folder, a library by its name.
    const report = readReport([`${reports}/${project}.json`, `${reports}/apps/${project}.json`].find((file) => existsSync(file)) ?? '');
    add(tally, report);
    if (report.failed > 0) bad.push(project);
    if (report.missing) note(`${project} left no report.`);
  }
  if (bad.length > 0) show(`${pickTasks(output, bad.map((project) => `${project}:test`))}\nUnit tests failed: ${bad.join(', ')}`);
  return tally;
}

/** @param {string} kind */
async function runSuite(kind) {
  if (!existsSync(inCheckout('tests', kind, 'project.json'))) throw new Obstacle(`tests/${kind} is not there.`);
  const { output } = await runTask(inCheckout('node_modules/.bin/vitest'), ['run', ...(values.filter === undefined ? [] : [values.filter])], { cwd: inCheckout('tests', kind), env });
  const tally = readReport(`${reports}/tests-${kind}.json`);
  if (tally.failed > 0 || values.filter !== undefined) show(output);
  if (tally.missing) note(`tests/${kind} left no report.`);
  return tally;
}

/** Runs a stage and counts it; what goes wrong around the tests is one failure, and the next stage still runs. @param {string} label @param {() => Promise<import('./test/reports.mjs').Tally>} run */
async function count(label, run) {
  const tally = await stage(label, () => run().catch((error) => {
    console.error(error instanceof Obstacle ? error.message : error);
    return { ...emptyTally(), failed: 1 };
  }), describeTally);
  add(total, tally);
}

async function prepareSuites() {
  const built = await stage('Build', () => runTargets(env, ['build'], { cached: false }), ({ code }) => (code === 0 ? undefined : 'failed'));
  if (built.code !== 0) {
    show(built.output);
    throw new Obstacle('The build failed, so the tests that need it did not run.');
  }
  const { folder, fallback } = chooseDataFolder('.test', true);
  if (fallback) note(describeFallback(folder));
  checkDisk(folder);
  const data = `${folder}/data`;
  rmSync(data, { recursive: true, force: true });
  const pagePorts = await Promise.all(Array.from({ length: 8 }, findFreePort));
  const services = await stage('Services and the database that tests clone', () => startTestServices(data, buildFolder, pagePorts));
  stopServices = async () => {
    stopServices = undefined;
    await services.stop();
    rmSync(data, { recursive: true, force: true });
  };
  const testData = `${data}/tests`;
  mkdirSync(testData, { recursive: true });
  env = { ...env, ...services.env, TEST_DATA_DIR: testData };
}

for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
  process.once(signal, () => {
    endTasks();
    void Promise.resolve(stopServices?.()).then(() => process.exit(130));
  });
}

async function main() {
  if (unknown !== undefined) throw new Obstacle(`--only takes one of ${kinds.join(', ')}, not "${unknown}".`);
  await stage('System packages', () => ensureDebianPackages(['postgresql', 'redis-server', 'chromium', 'fonts-liberation', 'assimp-testmodels']), (installed) => (installed.length > 0 ? `installed ${installed.join(', ')}` : 'all there'));
  await stage('Node packages', ensureNodePackages, (ran) => (ran ? 'installed from the lock file' : 'as in the lock file'));
  const notes = new RunNotes(inCheckout('.test/run'));
  notes.claim('npm test');
  rmSync(reports, { recursive: true, force: true });
  mkdirSync(reports, { recursive: true });
  if (wanted.includes('lint')) await count('Lint and types', checkLint);
  if (wanted.includes('unit')) await count('Unit tests', runUnit);
  if (suites.length > 0) {
    try {
      await prepareSuites();
      for (const kind of suites) await count(`${kind[0]?.toUpperCase()}${kind.slice(1)} tests`, () => runSuite(kind));
    } catch (error) {
      // Each suite that could not run is a failure, not a silence.
      add(total, { ...emptyTally(), failed: suites.length });
      console.error(error instanceof Obstacle ? error.message : error);
    }
    await stopServices?.();
  }
  notes.clear(false);
  console.log(`\n${describeTally(total)}`);
  return total.failed > 0 || total.passed === 0 ? 1 : 0;
}

main()
  .catch(async (error) => {
    await stopServices?.();
    console.error(error instanceof Obstacle ? error.message : error);
    return 1;
  })
  .then((code) => process.exit(code));
