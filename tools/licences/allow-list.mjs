/**
 * Licences under which a package may be part of what we ship: permissive ones, and the fonts' own. Anything else is
 * looked at by a person first.
 */
export const allowed = new Set(['0BSD', 'Apache-2.0', 'BlueOak-1.0.0', 'BSD-2-Clause', 'BSD-3-Clause', 'CC0-1.0', 'ISC', 'MIT', 'MIT-0', 'OFL-1.1', 'Python-2.0', 'Unlicense', 'Zlib']);

/**
 * Whether an SPDX expression leaves us a licence of the list: of `A OR B` one is enough, of `A AND B` both are needed.
 * @param {string} expression
 * @returns {boolean}
 */
export function isAllowed(expression) {
  const plain = expression.replaceAll(/[()]/g, ' ');
  return plain.split(/\sOR\s/).some((choice) => choice.split(/\sAND\s/).every((licence) => allowed.has(licence.trim())));
}
