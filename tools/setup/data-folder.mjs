import { createHash } from 'node:crypto';
import path from 'node:path';
import { canPostgresEnter } from '../services/postgres.mjs';
import { root } from './checkout.mjs';

/**
 * Where data is kept: below the checkout, unless PostgreSQL's user can't enter that (a home folder of mode 0700, say).
 * @param {string} name of the folder in the checkout, or a whole path
 * @param {boolean} postgresIsLocal
 * @returns {{ folder: string, fallback: boolean }}
 */
export function chooseDataFolder(name, postgresIsLocal) {
  const folder = path.resolve(root, name);
  if (!postgresIsLocal || canPostgresEnter(folder)) return { folder, fallback: false };
  const mark = createHash('sha256').update(folder).digest('hex').slice(0, 8);
  return { folder: `/var/lib/masswright-${mark}`, fallback: true };
}

/** @param {string} folder */
export const describeFallback = (folder) => `The user "postgres" can't enter ${root}, so data is kept in ${folder}.`;
