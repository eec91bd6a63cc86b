import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { findPostgresPrograms } from '../services/postgres.mjs';
import { Obstacle } from './checkout.mjs';

/** @param {string} command */
const hasCommand = (command) => spawnSync('sh', ['-c', `command -v ${command}`]).status === 0;

/** @type {Record<string, () => boolean>} by the name of the package: is what we need of it there? The last one holds meshes for tests. */
const isThere = {
  postgresql: () => findPostgresPrograms() !== undefined,
  'redis-server': () => hasCommand('redis-server'),
  chromium: () => existsSync('/usr/bin/chromium'),
  'fonts-liberation': () => existsSync('/usr/share/fonts/truetype/liberation') || existsSync('/usr/share/fonts/truetype/liberation2'),
  'assimp-testmodels': () => existsSync('/usr/share/assimp/models/invalid'),
};

/**
 * Installs the Debian packages that are missing: as root by itself, otherwise it says the one command and stops.
 * @param {string[]} wanted
 * @returns {string[]} what was installed
 */
export function ensureDebianPackages(wanted) {
  const missing = wanted.filter((name) => !isThere[name]?.());
  if (missing.length === 0) return [];
  const install = ['install', '-y', '--no-install-recommends', ...missing];
  if (!hasCommand('apt-get')) throw new Obstacle(`Missing: ${missing.join(', ')}. This system has no apt-get; install them with its own package manager and start again.`);
  if (process.getuid?.() !== 0) throw new Obstacle(`Missing: ${missing.join(', ')}. Run this once, then start again:\n  sudo apt-get update && sudo apt-get ${install.join(' ')}`);
  console.log(`Installing ${missing.join(', ')} …`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  for (const args of [['update', '-q'], install]) {
    // Another apt-get may be at work; it is waited for.
    const done = spawnSync('apt-get', ['-o', 'DPkg::Lock::Timeout=180', ...args], { env, encoding: 'utf8' });
    if (done.status !== 0) throw new Obstacle(`apt-get ${args.join(' ')} failed:\n${done.stderr || done.error?.message}`);
  }
  const still = missing.filter((name) => !isThere[name]?.());
  if (still.length > 0) throw new Obstacle(`apt-get installed ${still.join(', ')}, but not where it is expected.`);
  return missing;
}
