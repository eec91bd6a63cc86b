import { readNumber as read } from './number';

export { readFacets } from './facets';
export { readStatements } from './statements';

/** For tests: one number. */
export function readNumber(at: usize, target: usize): usize {
  return read(at, target);
}
