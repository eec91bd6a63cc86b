import os from 'node:os';
import { inCheckout, Obstacle, root } from '../setup/checkout.mjs';
import { runTask } from '../setup/tasks.mjs';

const nx = inCheckout('node_modules/.bin/nx');

/** @param {NodeJS.ProcessEnv} env @param {string[]} args */
export function runNx(env, args) {
  return runTask(nx, args, { cwd: root, env: { ...env, NX_DAEMON: 'false', NX_TUI: 'false' } });
}

/** @param {NodeJS.ProcessEnv} env @param {string} target @returns {Promise<string[]>} the projects that have it */
export async function listProjects(env, target) {
  const { code, stdout, output } = await runNx(env, ['show', 'projects', '--with-target', target, '--json']);
  if (code !== 0) throw new Obstacle(`nx could not read the workspace:\n${output}`);
  return JSON.parse(stdout);
}

/** @param {NodeJS.ProcessEnv} env @param {string[]} targets @param {{ cached: boolean }} options */
export function runTargets(env, targets, { cached }) {
  // Nx says `development` where nobody says anything, and the pages would be built with React's slow half.
  const mode = targets.includes('build') ? { NODE_ENV: 'production' } : {};
  return runNx({ ...env, ...mode }, ['run-many', '-t', ...targets, '--outputStyle=static', `--parallel=${Math.max(1, os.availableParallelism())}`, ...(cached ? [] : ['--skip-nx-cache'])]);
}
