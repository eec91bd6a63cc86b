import { spawn } from 'node:child_process';
import { createWriteStream, mkdirSync } from 'node:fs';
import path from 'node:path';
import { guard, release } from '../services/guardian.mjs';
import { findIdentity } from '../services/process-identity.mjs';

/** @type {Set<import('node:child_process').ChildProcess>} */
const running = new Set();

/**
 * @typedef {object} TaskOptions
 * @property {NodeJS.ProcessEnv} [env]
 * @property {string} [cwd]
 * @property {string} [logFile] a copy of what it prints
 * @property {boolean} [show] what it prints goes to the terminal as well
 */

/**
 * Runs a program to its end, in a process group of its own.
 * @param {string} command
 * @param {string[]} args
 * @param {TaskOptions} [options]
 * @returns {Promise<{ code: number, output: string, stdout: string }>} it never throws; a program that can't be started has code 127
 */
export async function runTask(command, args, { env = process.env, cwd, logFile, show = false } = {}) {
  const child = spawn(command, args, { env, cwd, detached: true, stdio: ['ignore', 'pipe', 'pipe'] });
  running.add(child);
  const known = child.pid === undefined ? undefined : findIdentity(child.pid);
  if (known !== undefined) guard({ ...known, name: path.basename(command), order: 100, stopSignal: 'SIGTERM', deadlineMs: 3_000, group: true });
  if (logFile !== undefined) mkdirSync(path.dirname(logFile), { recursive: true });
  const log = logFile === undefined ? undefined : createWriteStream(logFile);
  let output = '';
  let stdout = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream.setEncoding('utf8');
    stream.on('data', (/** @type {string} */ text) => {
      output += text;
      if (stream === child.stdout) stdout += text;
      log?.write(text);
      if (show) process.stdout.write(text);
    });
  }
  const code = await new Promise((/** @type {(code: number) => void} */ resolve) => {
    child.once('error', () => resolve(127));
    child.once('close', (exit) => resolve(exit ?? 1));
  });
  log?.end();
  running.delete(child);
  if (child.pid !== undefined) release(child.pid);
  return { code, output, stdout };
}

/** Ends what still runs, with its children. */
export function endTasks() {
  for (const child of running) {
    try {
      if (child.pid !== undefined) process.kill(-child.pid, 'SIGTERM');
    } catch {
      // It was gone already.
    }
  }
}
