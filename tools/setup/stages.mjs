/** Prints a line for each stage, with the time that it took. */

/** @param {number} from */
const seconds = (from) => `${((performance.now() - from) / 1000).toFixed(1).padStart(6)} s`;

/**
 * @template T
 * @param {string} label
 * @param {() => T | Promise<T>} work
 * @param {(result: T) => string | undefined} [describe] what to add to the line, or instead of it
 * @returns {Promise<T>}
 */
export async function stage(label, work, describe) {
  const from = performance.now();
  const result = await work();
  const more = describe?.(result);
  console.log(`${seconds(from)}  ${label}${more === undefined ? '' : `: ${more}`}`);
  return result;
}

/** @param {string} text */
export const note = (text) => console.log(`          ${text}`);
