import { allocate } from './grow-array';
import { findingFacets, type FindingKind } from './measurement';
import type { WeldedMesh } from './weld-corners';

export type EdgeFindingKind = Extract<FindingKind, 'boundary-edges' | 'crowded-edges' | 'unbalanced-edges'>;

export interface EdgeFinding {
  /** How many undirected edges. */
  count: number;
  /** Facets at some of them. */
  facets: number[];
}

/**
 * Counts what is wrong with the edges: an odd number of facets at one (`boundary-edges`), more than two (`crowded-edges`), an even number
 * that do not run along it as often one way as the other (`unbalanced-edges`). A facet with two equal corners has no
 * edges that matter: its two remaining ones cancel.
 *
 * Half-edges are sorted into rows by their lesser vertex (a counting sort), each row by the greater one: 16 bytes a facet or so,
 * where a map of edges takes ten times as much.
 */
export function checkEdges(mesh: WeldedMesh): Record<EdgeFindingKind, EdgeFinding> {
  const { starts, entries } = sortHalfEdges(mesh);
  const found = { 'boundary-edges': createEdgeSet(), 'crowded-edges': createEdgeSet(), 'unbalanced-edges': createEdgeSet() };
  for (let vertex = 0; vertex < mesh.vertexCount; vertex++) {
    const end = starts[vertex + 1] ?? 0;
    const begin = starts[vertex] ?? 0;
    sortRow(entries, begin, end);
    for (let at = begin; at < end; ) {
      const other = (entries[at] ?? 0) >>> 1;
      let count = 0;
      let backward = 0;
      for (; at < end && (entries[at] ?? 0) >>> 1 === other; at++) {
        count += 1;
        backward += (entries[at] ?? 0) & 1;
      }
      if (count === 2 && backward === 1) continue;
      if (count % 2 === 1) addEdge(found['boundary-edges'], vertex, other);
      else if (2 * backward !== count) addEdge(found['unbalanced-edges'], vertex, other);
      if (count > 2) addEdge(found['crowded-edges'], vertex, other);
    }
  }
  return {
    'boundary-edges': { count: found['boundary-edges'].count, facets: findFacetsAt(mesh, found['boundary-edges']) },
    'crowded-edges': { count: found['crowded-edges'].count, facets: findFacetsAt(mesh, found['crowded-edges']) },
    'unbalanced-edges': { count: found['unbalanced-edges'].count, facets: findFacetsAt(mesh, found['unbalanced-edges']) },
  };
}

/** Rows of half-edges: the row of a vertex is entries[starts[v], starts[v + 1]); an entry is twice the greater vertex, plus one where the facet runs towards the lesser. */
function sortHalfEdges(mesh: WeldedMesh): { starts: Uint32Array; entries: Uint32Array } {
  const { corners, facetCount, vertexCount } = mesh;
  // Shifted by one more, so that filling the rows moves each start to where it belongs.
  const starts = allocate(() => new Uint32Array(vertexCount + 2));
  let total = 0;
  for (let at = 0; at < 3 * facetCount; at += 3) {
    const a = corners[at] ?? 0, b = corners[at + 1] ?? 0, c = corners[at + 2] ?? 0;
    if (a === b || b === c || c === a) continue;
    for (const lesser of [a < b ? a : b, b < c ? b : c, c < a ? c : a]) starts[lesser + 2] = (starts[lesser + 2] ?? 0) + 1;
    total += 3;
  }
  for (let vertex = 2; vertex < starts.length; vertex++) starts[vertex] = (starts[vertex] ?? 0) + (starts[vertex - 1] ?? 0);
  const entries = allocate(() => new Uint32Array(total));
  const enter = (from: number, to: number): void => {
    const lesser = from < to ? from : to;
    const at = starts[lesser + 1] ?? 0;
    entries[at] = from < to ? 2 * to : 2 * from + 1;
    starts[lesser + 1] = at + 1;
  };
  for (let at = 0; at < 3 * facetCount; at += 3) {
    const a = corners[at] ?? 0, b = corners[at + 1] ?? 0, c = corners[at + 2] ?? 0;
    if (a === b || b === c || c === a) continue;
    enter(a, b);
    enter(b, c);
    enter(c, a);
  }
  return { starts, entries };
}

/** Rows are short as a rule; the engine's sort is for the hub of a large fan. */
function sortRow(entries: Uint32Array, begin: number, end: number): void {
  if (end - begin > 48) {
    entries.subarray(begin, end).sort();
    return;
  }
  for (let i = begin + 1; i < end; i++) {
    const value = entries[i] ?? 0;
    let j = i - 1;
    for (; j >= begin && (entries[j] ?? 0) > value; j--) entries[j + 1] = entries[j] ?? 0;
    entries[j + 1] = value;
  }
}

/** A facet has three edges, so that these name as many facets as a finding lists. */
const keptEdges = 3 * findingFacets;

/** A count of edges, the first few of them kept: as many as can name facets. */
interface EdgeSet {
  count: number;
  kept: Map<number, Set<number>>;
}

function createEdgeSet(): EdgeSet {
  return { count: 0, kept: new Map() };
}

function addEdge(set: EdgeSet, lesser: number, greater: number): void {
  if (set.count < keptEdges) set.kept.set(lesser, (set.kept.get(lesser) ?? new Set()).add(greater));
  set.count += 1;
}

/** The first facets of the file that have one of the kept edges. */
function findFacetsAt(mesh: WeldedMesh, { count, kept }: EdgeSet): number[] {
  const facets: number[] = [];
  if (count === 0) return facets;
  const { corners, facetCount } = mesh;
  const has = (from: number, to: number): boolean => kept.get(from < to ? from : to)?.has(from < to ? to : from) ?? false;
  for (let facet = 0; facet < facetCount && facets.length < findingFacets; facet++) {
    const a = corners[3 * facet] ?? 0, b = corners[3 * facet + 1] ?? 0, c = corners[3 * facet + 2] ?? 0;
    if (a === b || b === c || c === a) continue;
    if (has(a, b) || has(b, c) || has(c, a)) facets.push(facet);
  }
  return facets;
}
