import { Service, stopOrder } from './service.mjs';

/**
 * @typedef {object} ProgramOptions
 * @property {'api' | 'worker'} kind
 * @property {string} [name]
 * @property {string} file the built main.js
 * @property {NodeJS.ProcessEnv} env the whole environment of the program
 * @property {string} readyUrl answers 200 when the program is ready
 * @property {string} logFile
 * @property {string[]} [nodeOptions]
 * @property {number} [readyTimeoutMs]
 * @property {number} [stopDeadlineMs]
 */

/** One of our own built programs, not started yet. @param {ProgramOptions} options */
export function prepareProgram({ kind, name = kind, file, env, readyUrl, logFile, nodeOptions = ['--enable-source-maps'], readyTimeoutMs, stopDeadlineMs = 15_000 }) {
  return new Service({
    name,
    command: process.execPath,
    args: [...nodeOptions, file],
    env,
    logFile,
    order: stopOrder[kind],
    readyTimeoutMs,
    stopDeadlineMs,
    isReady: async () => {
      const answer = await fetch(readyUrl, { signal: AbortSignal.timeout(2_000) });
      await answer.arrayBuffer();
      return answer.ok;
    },
  });
}

/** @param {ProgramOptions} options */
export async function startProgram(options) {
  const service = prepareProgram(options);
  await service.start();
  return service;
}
