import { allocate } from './grow-array';
import { findingFacets } from './measurement';
import type { WeldedMesh } from './weld-corners';

/**
 * Facets whose three corners another facet has too, in whatever order, counted beyond the first of each; facets with two equal corners
 * left out. Facets are sorted into rows by their least vertex and compared within a row: 6 bytes a facet or so.
 */
export function checkDuplicates(mesh: WeldedMesh): { count: number; facets: number[] } {
  const { starts, rows } = sortFacets(mesh);
  const repeated: number[] = [];
  let count = 0;
  for (let vertex = 0; vertex < mesh.vertexCount; vertex++) {
    const begin = starts[vertex] ?? 0;
    const end = starts[vertex + 1] ?? 0;
    if (end - begin < 2 || (end - begin <= shortRow && !hasRepetition(mesh, rows, begin, end))) continue;
    const found = findRepetitions(mesh, rows.subarray(begin, end), findingFacets - repeated.length);
    count += found.count;
    repeated.push(...found.facets);
  }
  return { count, facets: repeated.sort((one, two) => one - two) };
}

/** Rows up to here are compared pair by pair, without sorting them. */
const shortRow = 12;

function hasRepetition({ corners }: WeldedMesh, rows: Uint32Array, begin: number, end: number): boolean {
  for (let i = begin + 1; i < end; i++) {
    const one = 3 * (rows[i] ?? 0);
    const a = corners[one] ?? 0, b = corners[one + 1] ?? 0, c = corners[one + 2] ?? 0;
    for (let j = begin; j < i; j++) {
      const two = 3 * (rows[j] ?? 0);
      const p = corners[two] ?? 0, q = corners[two + 1] ?? 0, r = corners[two + 2] ?? 0;
      if ((p === a || p === b || p === c) && (q === a || q === b || q === c) && (r === a || r === b || r === c)) return true;
    }
  }
  return false;
}

/**
 * Facets of a row that repeat one before them in the file: how many, and the first `wanted` in the order of their vertices. A file may be one facet over
 * and over, so nothing but one number a facet is kept: its two greater vertices, exact up to 94 million vertices (their square is below 2⁵³).
 */
function findRepetitions(mesh: WeldedMesh, row: Uint32Array, wanted: number): { count: number; facets: number[] } {
  const keys = allocate(() => new Float64Array(row.length));
  for (let k = 0; k < row.length; k++) keys[k] = findKey(mesh, row[k] ?? 0);
  const sorted = keys.slice().sort();
  // The first facets of each key that is repeated, for as many keys as can be listed.
  const listed = new Map<number, number[]>();
  let count = 0;
  for (let k = 1; k < sorted.length; k++) {
    if (sorted[k] !== sorted[k - 1]) continue;
    if (count < wanted) listed.set(sorted[k] ?? 0, []);
    count += 1;
  }
  for (let k = 0; listed.size > 0 && k < keys.length; k++) {
    const facets = listed.get(keys[k] ?? 0);
    if (facets !== undefined && facets.length <= wanted) facets.push(row[k] ?? 0);
  }
  return { count, facets: [...listed.values()].flatMap((facets) => facets.slice(1)).slice(0, wanted) };
}

function sortFacets({ corners, facetCount, vertexCount }: WeldedMesh): { starts: Uint32Array; rows: Uint32Array } {
  const starts = allocate(() => new Uint32Array(vertexCount + 2));
  const least = (facet: number): number => {
    const a = corners[3 * facet] ?? 0, b = corners[3 * facet + 1] ?? 0, c = corners[3 * facet + 2] ?? 0;
    if (a === b || b === c || c === a) return -1;
    return a < b ? (a < c ? a : c) : b < c ? b : c;
  };
  let total = 0;
  for (let facet = 0; facet < facetCount; facet++) {
    const vertex = least(facet);
    if (vertex < 0) continue;
    starts[vertex + 2] = (starts[vertex + 2] ?? 0) + 1;
    total += 1;
  }
  for (let vertex = 2; vertex < starts.length; vertex++) starts[vertex] = (starts[vertex] ?? 0) + (starts[vertex - 1] ?? 0);
  const rows = allocate(() => new Uint32Array(total));
  for (let facet = 0; facet < facetCount; facet++) {
    const vertex = least(facet);
    if (vertex < 0) continue;
    const at = starts[vertex + 1] ?? 0;
    rows[at] = facet;
    starts[vertex + 1] = at + 1;
  }
  return { starts, rows };
}

/** The middle and the greatest vertex of a facet as one number. */
function findKey({ corners, vertexCount }: WeldedMesh, facet: number): number {
  const a = corners[3 * facet] ?? 0, b = corners[3 * facet + 1] ?? 0, c = corners[3 * facet + 2] ?? 0;
  const greatest = Math.max(a, b, c);
  return (a + b + c - greatest - Math.min(a, b, c)) * vertexCount + greatest;
}
