import { allocate } from '../grow-array';
import type { WeldedMesh } from '../weld-corners';
import { createDisjointSets } from './disjoint-sets';
import { balanceEdge } from './edges';
import { facetOf, type EdgeTable } from './edge-table';
import { pairAroundEdge } from './pair-around-edge';

/** Pieces whose facets hang together by edges, numbered by their first facets. */
export interface ShellTable {
  count: number;
  /** The shell of each facet; `noShell` for facets with two equal corners, which have no edges. */
  shellOf: Uint32Array;
  /** Facets of shell s are facets[starts[s], starts[s + 1]), ascending. */
  starts: Uint32Array;
  facets: Uint32Array;
  /** 1 where an edge of the shell is not balanced: it encloses nothing. */
  open: Uint8Array;
}

export const noShell = 0xffff_ffff;

/**
 * @param unusual edges that are not shared by two facets running along them both ways
 * @param isInsideOut the whole mesh encloses a negative volume
 * @param joined pairs of facets that belong together though no edge says so
 */
export function findShells(mesh: WeldedMesh, table: EdgeTable, unusual: readonly number[], isInsideOut: boolean, joined: readonly [number, number][] = []): ShellTable {
  const { starts, halfEdges, edgeCount } = table;
  const sets = createDisjointSets(mesh.facetCount);
  const unbalanced: number[] = [];
  for (let edge = 0, k = 0; edge < edgeCount; edge++) {
    const begin = starts[edge] ?? 0;
    const isUnusual = unusual[k] === edge;
    if (isUnusual) k += 1;
    if (isUnusual && balanceEdge(mesh, table, edge).surplus !== 0) unbalanced.push(facetOf(halfEdges[begin] ?? 0));
    else if (isUnusual) {
      const pairs = pairAroundEdge(mesh, halfEdges.subarray(begin, starts[edge + 1] ?? 0), isInsideOut);
      for (const [one, two] of pairs ?? []) sets.join(one, two);
      if (pairs !== undefined) continue;
    }
    const first = facetOf(halfEdges[begin] ?? 0);
    for (let j = begin + 1; j < (starts[edge + 1] ?? 0); j++) sets.join(first, facetOf(halfEdges[j] ?? 0));
  }
  for (const [one, two] of joined) sets.join(one, two);
  const shells = numberShells(mesh, (facet) => sets.find(facet));
  for (const facet of unbalanced) shells.open[shells.shellOf[facet] ?? 0] = 1;
  return shells;
}

function numberShells({ corners, facetCount }: WeldedMesh, find: (facet: number) => number): ShellTable {
  const shellOf = allocate(() => new Uint32Array(facetCount));
  let count = 0;
  for (let facet = 0; facet < facetCount; facet++) {
    const a = corners[3 * facet], b = corners[3 * facet + 1], c = corners[3 * facet + 2];
    const root = find(facet);
    // The least member stands for a set, so it has its number before any other asks.
    shellOf[facet] = a === b || b === c || c === a ? noShell : root === facet ? count++ : (shellOf[root] ?? 0);
  }
  const starts = new Uint32Array(count + 1);
  for (let facet = 0; facet < facetCount; facet++) {
    const shell = shellOf[facet] ?? 0;
    if (shell !== noShell) starts[shell + 1] = (starts[shell + 1] ?? 0) + 1;
  }
  for (let shell = 1; shell <= count; shell++) starts[shell] = (starts[shell] ?? 0) + (starts[shell - 1] ?? 0);
  const next = starts.slice(0, count);
  const facets = allocate(() => new Uint32Array(starts[count] ?? 0));
  for (let facet = 0; facet < facetCount; facet++) {
    const shell = shellOf[facet] ?? 0;
    if (shell === noShell) continue;
    const at = next[shell] ?? 0;
    facets[at] = facet;
    next[shell] = at + 1;
  }
  return { count, shellOf, starts, facets, open: new Uint8Array(count) };
}

export const facetsOfShell = ({ starts, facets }: ShellTable, shell: number): Uint32Array => facets.subarray(starts[shell] ?? 0, starts[shell + 1] ?? 0);
