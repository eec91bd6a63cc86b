import { spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';

/**
 * Our side of the guardian, a small process that holds a pipe to this one. When this one dies, however it dies, the pipe
 * closes and the guardian stops what was registered, highest order first.
 * @typedef {import('./process-identity.mjs').ProcessIdentity & { name: string, order: number, stopSignal: NodeJS.Signals, deadlineMs: number, group?: boolean }} Ward
 */

/** @type {Map<number, Ward>} */
const wards = new Map();
/** @type {import('node:child_process').ChildProcess | undefined} */
let guardian;

function getGuardian() {
  if (guardian !== undefined) return guardian;
  const child = spawn(process.execPath, [fileURLToPath(new URL('./guardian-process.mjs', import.meta.url))], { detached: true, stdio: ['pipe', 'ignore', 'ignore'] });
  child.stdin?.on('error', () => undefined);
  child.once('exit', () => {
    if (guardian === child) guardian = undefined;
    // It was killed: another takes its place, as long as there is anything to guard.
    if (wards.size > 0) for (const ward of wards.values()) tell({ add: ward });
  });
  child.unref();
  const pipe = /** @type {import('node:net').Socket | null} */ (child.stdin);
  pipe?.unref();
  guardian = child;
  return child;
}

/** @param {{ add: Ward } | { remove: number }} message */
function tell(message) {
  getGuardian().stdin?.write(`${JSON.stringify(message)}\n`);
}

/** @param {Ward} ward */
export function guard(ward) {
  wards.set(ward.pid, ward);
  tell({ add: ward });
}

/** @param {number} pid */
export function release(pid) {
  if (wards.delete(pid)) tell({ remove: pid });
}

/** The guardian's process number, for those who test it. */
export function findGuardianPid() {
  return guardian?.pid;
}
