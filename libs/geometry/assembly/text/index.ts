export { readFacets } from './facets';
export { readNumber } from './number';
export { readStatements } from './statements';
