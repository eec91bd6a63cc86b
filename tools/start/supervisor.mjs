import { ServiceFailure, wrongEnvironment } from '../services/service.mjs';

/** @typedef {import('../services/service.mjs').Service} Service */

const firstDelayMs = 100;
const longestDelayMs = 10_000;
const healthyAfterMs = 30_000;

/**
 * Starts services, starts one again that dies, with growing pauses, and stops all in order.
 * A program that says that its environment is wrong is not tried again: `onFatal` gets its message.
 */
export class Supervisor {
  /** @type {Map<Service, { delayMs: number, upSince: number, timer?: NodeJS.Timeout, starting: boolean }>} */
  #watched = new Map();
  #stopping = false;

  /** @param {{ log: (line: string) => void, onFatal: (message: string) => void }} handlers */
  constructor({ log, onFatal }) {
    this.log = log;
    this.onFatal = onFatal;
  }

  /** Starts it for the first time; throws when it does not come up. @param {Service} service */
  async start(service) {
    const state = { delayMs: firstDelayMs, upSince: 0, starting: true };
    this.#watched.set(service, state);
    service.on('exit', (exit) => {
      if (!exit.expected && !state.starting) this.#revive(service, exit.signal ?? `exit code ${exit.code}`, exit.code);
    });
    await service.start();
    state.starting = false;
    state.upSince = Date.now();
  }

  /** @param {Service} service @param {string} how @param {number | null} code */
  #revive(service, how, code) {
    const state = this.#watched.get(service);
    if (state === undefined || this.#stopping) return;
    if (code === wrongEnvironment) return this.onFatal(`${service.name} ended because its environment is wrong:\n${service.readLogTail()}`);
    if (Date.now() - state.upSince > healthyAfterMs) state.delayMs = firstDelayMs;
    this.log(`${service.name} ended (${how}); it starts again in ${state.delayMs / 1000} s.`);
    state.starting = true;
    state.timer = setTimeout(() => void this.#startAgain(service), state.delayMs);
    state.delayMs = Math.min(state.delayMs * 2, longestDelayMs);
  }

  /** @param {Service} service */
  async #startAgain(service) {
    const state = this.#watched.get(service);
    if (state === undefined || this.#stopping) return;
    try {
      await service.start();
      state.starting = false;
      state.upSince = Date.now();
      this.log(`${service.name} runs again.`);
      // It may have ended between its first answer and now, when nobody was listening.
      if (!service.isRunning) this.#revive(service, 'right after its start', null);
    } catch (error) {
      if (this.#stopping) return;
      state.upSince = Date.now();
      const exit = error instanceof ServiceFailure ? error.exit : undefined;
      this.#revive(service, exit === undefined ? 'it did not answer' : (exit.signal ?? `exit code ${exit.code}`), exit?.code ?? null);
    }
  }

  /** Ends it and starts it again without a word about a death, as after a rebuild. @param {Service} service */
  async replace(service) {
    const state = this.#watched.get(service);
    if (state === undefined || this.#stopping || state.starting) return;
    state.starting = true;
    await service.stop();
    await this.#startAgain(service);
  }

  /** Stops all, highest order first; what shares an order, together. */
  async stop() {
    this.#stopping = true;
    for (const state of this.#watched.values()) clearTimeout(state.timer);
    const orders = [...new Set([...this.#watched.keys()].map((service) => service.options.order))].sort((a, b) => b - a);
    for (const order of orders) await Promise.all([...this.#watched.keys()].filter((service) => service.options.order === order).map((service) => service.stop()));
  }

  /** For someone who will not wait. */
  kill() {
    for (const service of this.#watched.keys()) service.kill('SIGKILL');
  }
}
