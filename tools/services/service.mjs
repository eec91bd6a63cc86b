import { spawn } from 'node:child_process';
import { EventEmitter } from 'node:events';
import { closeSync, mkdirSync, openSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { guard, release } from './guardian.mjs';
import { findIdentity, isAlive } from './process-identity.mjs';

/** The exit code of a program whose environment is wrong (EX_CONFIG of sysexits.h): another try can't help. */
export const wrongEnvironment = 78;

/** What stops first when everything stops; a higher number goes before a lower one. */
export const stopOrder = { postgres: 10, redis: 20, objectStorage: 30, mail: 40, worker: 50, api: 60 };

/**
 * @typedef {object} ServiceOptions
 * @property {string} name as people read it
 * @property {string} command
 * @property {string[]} args
 * @property {NodeJS.ProcessEnv} [env]
 * @property {string} [cwd]
 * @property {{ uid?: number, gid?: number }} [identity] another user to run as
 * @property {string} logFile what the process writes goes there, not to the terminal
 * @property {() => Promise<boolean>} isReady
 * @property {() => Promise<void>} [prepare] runs before every start
 * @property {number} order see `stopOrder`
 * @property {NodeJS.Signals} [stopSignal]
 * @property {number} [stopDeadlineMs]
 * @property {number} [readyTimeoutMs]
 * @property {boolean} [retryStart] try again within the time when the process ends before it is ready
 */

/** @typedef {{ code: number | null, signal: NodeJS.Signals | null }} Exit */

export class ServiceFailure extends Error {
  /** @param {string} what happened @param {string} logTail @param {Exit} [exit] */
  constructor(what, logTail, exit) {
    super(`${what}\n${logTail}`);
    this.logTail = logTail;
    this.exit = exit;
  }
}

const pause = (/** @type {number} */ ms) => new Promise((resolve) => setTimeout(resolve, ms));

/**
 * One server process: started and waited for, stopped, killed, started again on the same data and port.
 * It is a child of its own session, so that Ctrl-C in the terminal reaches us alone and we stop things in order.
 * Emits `spawn` with what the guardian knows of it, and `exit` with {code, signal, expected}.
 */
export class Service extends EventEmitter {
  /** @type {import('node:child_process').ChildProcess | undefined} */
  #child;
  /** @type {Promise<Exit> | undefined} */
  #exited;
  #stopping = false;

  /** @param {ServiceOptions} options */
  constructor(options) {
    super();
    this.options = options;
  }

  get name() {
    return this.options.name;
  }

  /** The process number, undefined while it is down. @returns {number | undefined} */
  get pid() {
    return this.#child?.pid;
  }

  /** Starts the process and resolves when it answers. Throws ServiceFailure with the last lines of its log. */
  async start() {
    const deadline = Date.now() + (this.options.readyTimeoutMs ?? 30_000);
    this.#stopping = false;
    for (;;) {
      const failure = await this.#tryStart(deadline);
      if (failure === undefined) return this;
      const again = !this.#stopping && this.options.retryStart === true && failure.exit !== undefined && failure.exit.code !== wrongEnvironment && Date.now() < deadline;
      if (!again) throw failure;
      await pause(200);
      if (this.#stopping) throw failure;
    }
  }

  /** @param {number} deadline @returns {Promise<ServiceFailure | undefined>} */
  async #tryStart(deadline) {
    if (this.#child !== undefined) throw new Error(`${this.name} runs already.`);
    await this.options.prepare?.();
    const exited = this.#spawn();
    /** @type {Exit | undefined} */
    let exit;
    void exited.then((seen) => (exit = seen));
    while (Date.now() < deadline) {
      if (exit !== undefined) return new ServiceFailure(`${this.name} ended (${exit.signal ?? `exit code ${exit.code}`}) before it was ready.`, this.readLogTail(), exit);
      if (await this.options.isReady().catch(() => false)) return undefined;
      await pause(25);
    }
    await this.stop();
    return new ServiceFailure(`${this.name} did not answer in time.`, this.readLogTail());
  }

  /** @returns {Promise<Exit>} */
  #spawn() {
    const { command, args, env, cwd, identity, logFile, order, stopSignal = 'SIGTERM', stopDeadlineMs = 10_000 } = this.options;
    mkdirSync(path.dirname(logFile), { recursive: true });
    const log = openSync(logFile, 'a');
    const child = spawn(command, args, { env: env ?? process.env, cwd, ...identity, detached: true, stdio: ['ignore', log, log] });
    closeSync(log);
    this.#child = child;
    const known = child.pid === undefined ? undefined : findIdentity(child.pid);
    if (known !== undefined) {
      const ward = { ...known, name: this.name, order, stopSignal, deadlineMs: stopDeadlineMs };
      guard(ward);
      this.emit('spawn', ward);
    }
    const exited = new Promise((/** @type {(exit: Exit) => void} */ resolve) => {
      child.once('error', () => resolve({ code: 127, signal: null }));
      child.once('exit', (code, signal) => resolve({ code, signal }));
    });
    this.#exited = exited;
    void exited.then((exit) => {
      if (child.pid !== undefined) release(child.pid);
      this.#child = undefined;
      this.emit('exit', { ...exit, expected: this.#stopping });
    });
    return exited;
  }

  /** Sends a signal and does not wait. @param {NodeJS.Signals} signal */
  kill(signal) {
    this.#child?.kill(signal);
  }

  /** Resolves when the process is gone, at once when it is down. */
  async waitForExit() {
    if (this.#child !== undefined) await this.#exited;
  }

  /** Asks it to end, and ends it at the deadline. @param {NodeJS.Signals} [signal] */
  async stop(signal = this.options.stopSignal ?? 'SIGTERM') {
    const child = this.#child;
    this.#stopping = true;
    if (child === undefined) return;
    // One that is held by SIGSTOP would never see the signal.
    child.kill('SIGCONT');
    child.kill(signal);
    const deadline = setTimeout(() => child.kill('SIGKILL'), this.options.stopDeadlineMs ?? 10_000);
    await this.#exited;
    clearTimeout(deadline);
  }

  /** Ends it with the signal and starts it again on the same port and data. @param {NodeJS.Signals} [signal] */
  async restart(signal) {
    await this.stop(signal);
    await this.start();
  }

  get isRunning() {
    const known = this.pid === undefined ? undefined : findIdentity(this.pid);
    return known !== undefined && isAlive(known);
  }

  /** @param {number} [lines] */
  readLogTail(lines = 15) {
    try {
      return readFileSync(this.options.logFile, 'utf8').trimEnd().split('\n').slice(-lines).join('\n');
    } catch {
      return '';
    }
  }
}
