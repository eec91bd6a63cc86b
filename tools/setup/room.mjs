import { mkdirSync, statfsSync } from 'node:fs';
import { isPortFree } from '../services/ports.mjs';
import { Obstacle } from './checkout.mjs';

const neededBytes = 2 * 1024 ** 3;

/** @param {string} folder */
export function checkDisk(folder) {
  mkdirSync(folder, { recursive: true });
  const { bavail, bsize } = statfsSync(folder);
  const free = bavail * bsize;
  if (free < neededBytes) throw new Obstacle(`Too little disk: ${(free / 1024 ** 3).toFixed(1)} GiB are free at ${folder}, and 2 GiB are needed. Make room, then start again.`);
}

/** @typedef {{ port: number, user: string, variable: string }} PortClaim */

/** @param {PortClaim[]} claims */
export async function checkPorts(claims) {
  for (const { port, user, variable } of claims) {
    if (!Number.isInteger(port) || port < 1 || port > 65_535) throw new Obstacle(`${variable} should be a port from 1 to 65535.`);
    if (!(await isPortFree(port))) {
      throw new Obstacle(`Port ${port} on 127.0.0.1 is in use by another program, and ${user} wants it. End that program, or set ${variable} (or PORT_BASE, for all ports) to another number.`);
    }
  }
}
