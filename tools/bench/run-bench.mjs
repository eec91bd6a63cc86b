import { readFileSync, rmSync } from 'node:fs';
import { pathToFileURL } from 'node:url';
import { findFreePort, startProgram } from '../services/index.mjs';
import { inCheckout, Obstacle, root } from '../setup/checkout.mjs';
import { chooseDataFolder } from '../setup/data-folder.mjs';
import { startTestServices } from '../test/services.mjs';
import { runTargets } from '../test/workspace.mjs';

const buildFolder = inCheckout('.test/bench/build');

/** @param {NodeJS.ProcessEnv} services @param {number} apiPort @param {number} workerPort @returns {NodeJS.ProcessEnv} */
function makeEnvironment(services, apiPort, workerPort) {
  return {
    PATH: process.env.PATH,
    NODE_ENV: 'production',
    DATABASE_URL: services.TEST_DATABASE_URL,
    REDIS_URL: services.TEST_REDIS_URL,
    S3_ENDPOINT: services.TEST_S3_ENDPOINT,
    S3_REGION: services.TEST_S3_REGION,
    S3_BUCKET: services.TEST_S3_BUCKET,
    S3_ACCESS_KEY_ID: services.TEST_S3_ACCESS_KEY_ID,
    S3_SECRET_ACCESS_KEY: services.TEST_S3_SECRET_ACCESS_KEY,
    SMTP_URL: services.TEST_SMTP_URL,
    MAIL_FROM: 'Masswright <no-reply@masswright.example>',
    PUBLIC_URL: `http://127.0.0.1:${apiPort}`,
    WEB_DIR: `${buildFolder}/apps/web`,
    API_PORT: String(apiPort),
    WORKER_PORT: String(workerPort),
    LINK_SECRET: 'bc'.repeat(32),
    LOG_LEVEL: 'warn',
  };
}

/** Our libraries by name, as the compiler knows them; what is within one comes before it, since the first that fits is taken. @returns {Record<string, string>} */
function readAliases() {
  /** @type {{ compilerOptions: { paths: Record<string, string[]> } }} */
  const { compilerOptions } = JSON.parse(readFileSync(inCheckout('tsconfig.base.json'), 'utf8'));
  const places = Object.entries(compilerOptions.paths).sort(([one], [two]) => two.length - one.length);
  return Object.fromEntries(places.map(([name, [place = '']]) => [name, inCheckout(place)]));
}

/**
 * A benchmark bundled with our libraries, as the programs are: modules that are loaded one by one reach each other's functions by getters, which makes loops several times slower.
 * @param {string} file
 * @returns {Promise<import('./context.d.ts').Bench>}
 */
async function loadBench(file) {
  // Not at the top: before `npm ci` there is no vite.
  const { build } = await import('vite');
  const outDir = inCheckout('.test/bench/bundle');
  await build({
    root,
    configFile: false,
    logLevel: 'error',
    resolve: { alias: readAliases() },
    build: { ssr: file, outDir, emptyOutDir: true, target: 'node20', minify: false, rolldownOptions: { output: { format: 'es', entryFileNames: 'bench.js' } } },
  });
  return /** @type {import('./context.d.ts').Bench} */ (await import(pathToFileURL(`${outDir}/bench.js`).href));
}

/**
 * Loads a benchmark, starts what it asks for, runs it and stops everything again.
 * @param {string} file
 * @param {(line: string) => void} print
 */
export async function runBench(file, print) {
  const bench = await loadBench(file);
  const needs = new Set(bench.needs ?? []);
  /** @type {(() => Promise<void>)[]} */
  const stops = [];
  /** @type {Record<string, string>} */
  let env = {};
  /** @type {string | undefined} */
  let apiUrl;
  /** @type {import('./context.d.ts').BenchWorker | undefined} */
  let worker;
  /** @type {import('./context.d.ts').BenchContext['startWorker']} */
  let startWorker;
  const { folder } = chooseDataFolder('.test/bench', needs.size > 0);
  try {
    if (needs.size > 0) {
      const built = await runTargets({ ...process.env, BUILD_DIR: buildFolder }, ['build'], { cached: false });
      if (built.code !== 0) throw new Obstacle(`The build failed:\n${built.output}`);
      const [apiPort, workerPort] = [await findFreePort(), await findFreePort()];
      const services = await startTestServices(`${folder}/data`, buildFolder, [apiPort]);
      stops.unshift(services.stop);
      env = services.env;
      if (needs.has('programs')) {
        const programEnv = makeEnvironment(services.env, apiPort, workerPort);
        let workers = 0;
        startWorker = async (more = {}) => {
          workers += 1;
          const port = workers === 1 ? workerPort : await findFreePort();
          const program = await startProgram({ kind: 'worker', file: `${buildFolder}/apps/worker/main.js`, env: { ...programEnv, ...more, WORKER_PORT: String(port) }, readyUrl: `http://127.0.0.1:${port}/health/ready`, logFile: `${folder}/data/worker-${workers}.log`, readyTimeoutMs: 60_000 });
          const stop = async () => void (await program.stop());
          stops.unshift(stop);
          return { pid: program.pid, stop };
        };
        worker = await startWorker();
        const api = await startProgram({ kind: 'api', file: `${buildFolder}/apps/api/main.js`, env: programEnv, readyUrl: `http://127.0.0.1:${apiPort}/api/health/ready`, logFile: `${folder}/data/api.log`, readyTimeoutMs: 60_000 });
        stops.unshift(async () => void (await api.stop()));
        apiUrl = `http://127.0.0.1:${apiPort}`;
      }
    }
    await bench.run({ env, apiUrl, worker, startWorker, print });
  } finally {
    for (const stop of stops) await stop();
    rmSync(`${folder}/data`, { recursive: true, force: true });
  }
}
