import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { isListening } from '../services/object-storage.mjs';
import { Service, stopOrder } from '../services/service.mjs';
import { inCheckout } from '../setup/checkout.mjs';

/** @typedef {import('./settings.mjs').Settings} Settings */
/** @typedef {import('./supervisor.mjs').Supervisor} Supervisor */

/** @param {string} file */
function findHash(file) {
  try {
    return createHash('sha256').update(readFileSync(file)).digest('hex');
  } catch {
    // Vite empties the folder before it writes.
    return undefined;
  }
}

/** Starts a program again when its build has changed and has settled. @param {Service} program @param {string} file @param {Supervisor} supervisor */
function restartOnRebuild(program, file, supervisor) {
  let running = findHash(file);
  let seen = running;
  setInterval(() => {
    const now = findHash(file);
    const settled = now !== undefined && now === seen;
    seen = now;
    if (!settled || now === running) return;
    running = now;
    console.log(`          ${program.name} was built again and restarts.`);
    void supervisor.replace(program);
  }, 300);
}

/**
 * Watch mode: api and worker are built again on every change and restarted; the pages come from Vite with hot reload.
 * @param {Settings} settings
 * @param {NodeJS.ProcessEnv} env
 * @param {Supervisor} supervisor
 * @param {{ api: Service, worker: Service }} programs
 */
export async function startDevelopment(settings, env, supervisor, programs) {
  const vite = inCheckout('node_modules/.bin/vite');
  const log = (/** @type {string} */ name) => path.join(settings.logFolder, `${name}.log`);
  const watchers = /** @type {const} */ (['api', 'worker']).map(
    (name) =>
      new Service({
        name: `Build of ${name}`,
        command: vite,
        args: ['build', '--watch'],
        cwd: inCheckout('apps', name),
        env: { ...process.env, BUILD_DIR: '', NODE_ENV: 'production' },
        logFile: log(`build-${name}`),
        order: stopOrder.api + 10,
        isReady: () => Promise.resolve(true),
      }),
  );
  const pages = new Service({
    name: 'Pages',
    command: process.execPath,
    args: [inCheckout('tools/start/pages.mjs')],
    env: { ...env, NODE_ENV: 'development', WEB_PORT: String(settings.ports.web), API_URL: `http://127.0.0.1:${settings.ports.api}` },
    logFile: log('pages'),
    order: stopOrder.api + 10,
    isReady: () => isListening(settings.ports.web),
  });
  for (const name of /** @type {const} */ (['api', 'worker'])) restartOnRebuild(programs[name], inCheckout('apps', name, 'dist/main.js'), supervisor);
  await Promise.all([...watchers, pages].map((service) => supervisor.start(service)));
}
