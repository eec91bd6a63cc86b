import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { inCheckout, Obstacle, root } from './checkout.mjs';

const stamp = inCheckout('node_modules', '.lock-sha256');
const hashLock = () => createHash('sha256').update(readFileSync(inCheckout('package-lock.json'))).digest('hex');

/** @typedef {{ packages: Record<string, { version?: string, optional?: boolean, link?: boolean }> }} Lock */

/** Whether what is installed is what the lock says. npm keeps its own record of what it installed beside the packages. */
function isCurrent() {
  const record = inCheckout('node_modules', '.package-lock.json');
  if (!existsSync(record)) return false;
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === hashLock()) return true;
  /** @type {Lock} */
  const lock = JSON.parse(readFileSync(inCheckout('package-lock.json'), 'utf8'));
  /** @type {Lock} */
  const installed = JSON.parse(readFileSync(record, 'utf8'));
  const same = Object.entries(lock.packages).every(([place, wanted]) => place === '' || wanted.optional === true || wanted.link === true || installed.packages[place]?.version === wanted.version);
  if (same) writeFileSync(stamp, hashLock());
  return same;
}

/**
 * Runs `npm ci` when node_modules is missing or not the lock's.
 * @param {'inherit' | number} [output] where what npm prints goes
 * @returns {boolean} whether it had to
 */
export function ensureNodePackages(output = 'inherit') {
  if (isCurrent()) return false;
  console.log('Installing the Node packages of the lock file (npm ci) …');
  const done = spawnSync('npm', ['ci', '--no-audit', '--no-fund', '--loglevel=error'], { cwd: root, stdio: ['ignore', output, 'inherit'] });
  if (done.status !== 0) throw new Obstacle('npm ci failed; its message is above.');
  writeFileSync(stamp, hashLock());
  return true;
}
