import { readFileSync } from 'node:fs';

/**
 * A process is known by its number and the moment it began: numbers are used again.
 * @typedef {{ pid: number, startedAt: string }} ProcessIdentity
 */

/**
 * @param {number} pid
 * @returns {ProcessIdentity | undefined} undefined when there is no such process, or only its remains
 */
export function findIdentity(pid) {
  try {
    // The name in the second field may hold spaces and brackets; the fields we want come after the last bracket.
    const fields = readFileSync(`/proc/${pid}/stat`, 'utf8').replace(/^.*\) /s, '').split(' ');
    const [state, startedAt] = [fields[0], fields[19]];
    return startedAt === undefined || state === 'Z' || state === 'X' ? undefined : { pid, startedAt };
  } catch {
    return undefined;
  }
}

/** @param {ProcessIdentity} identity */
export function isAlive(identity) {
  return findIdentity(identity.pid)?.startedAt === identity.startedAt;
}

/** @param {ProcessIdentity & { group?: boolean }} identity @param {NodeJS.Signals} signal @returns {boolean} false when it was gone already */
export function sendSignal(identity, signal) {
  if (!isAlive(identity)) return false;
  try {
    process.kill(identity.group === true ? -identity.pid : identity.pid, signal);
    return true;
  } catch {
    return false;
  }
}

const pause = (/** @type {number} */ ms) => new Promise((resolve) => setTimeout(resolve, ms));

/**
 * Asks a process that need not be our child to end, and ends it when it has not by the deadline.
 * @param {ProcessIdentity & { group?: boolean }} identity with `group`, its process group
 * @param {NodeJS.Signals} signal
 * @param {number} deadlineMs
 */
export async function endProcess(identity, signal, deadlineMs) {
  // One that is held by SIGSTOP would never see the signal.
  sendSignal(identity, 'SIGCONT');
  if (!sendSignal(identity, signal)) return;
  for (const end = Date.now() + deadlineMs; Date.now() < end; await pause(20)) if (!isAlive(identity)) return;
  sendSignal(identity, 'SIGKILL');
  for (const end = Date.now() + 5_000; Date.now() < end; await pause(20)) if (!isAlive(identity)) return;
}
