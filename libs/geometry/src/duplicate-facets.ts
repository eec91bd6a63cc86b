import { allocate } from './grow-array';
import { findingFacets } from './measurement';
import type { WeldedMesh } from './weld-corners';

/**
 * Facets whose three corners another facet has too, in whatever order, counted beyond the first of each; facets with two equal corners
 * left out. Facets are sorted into rows by their least vertex and compared within a row: 6 bytes a facet or so.
 */
export function checkDuplicates(mesh: WeldedMesh): { count: number; facets: number[] } {
  const { starts, rows } = sortFacets(mesh);
  let count = 0;
  const facets: number[] = [];
  for (let vertex = 0; vertex < mesh.vertexCount; vertex++) {
    const begin = starts[vertex] ?? 0;
    const end = starts[vertex + 1] ?? 0;
    if (end - begin < 2) continue;
    const row = Array.from(rows.subarray(begin, end), (facet) => ({ facet, ...findGreaterTwo(mesh, facet) }));
    row.sort((one, two) => one.middle - two.middle || one.greatest - two.greatest || one.facet - two.facet);
    for (let k = 1; k < row.length; k++) {
      const one = row[k - 1];
      const two = row[k];
      if (one === undefined || two === undefined || one.middle !== two.middle || one.greatest !== two.greatest) continue;
      count += 1;
      if (facets.length < findingFacets) facets.push(two.facet);
    }
  }
  return { count, facets: facets.sort((one, two) => one - two) };
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

function findGreaterTwo({ corners }: WeldedMesh, facet: number): { middle: number; greatest: number } {
  const a = corners[3 * facet] ?? 0, b = corners[3 * facet + 1] ?? 0, c = corners[3 * facet + 2] ?? 0;
  const greatest = Math.max(a, b, c);
  return { greatest, middle: a + b + c - greatest - Math.min(a, b, c) };
}
