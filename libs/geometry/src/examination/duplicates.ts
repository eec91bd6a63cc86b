import { facetOf, fromVertex, oppositeVertex, toVertex, type EdgeTable } from './edge-table';
import type { Notes } from './notes';

/**
 * Notes facets whose three corners another facet has too, in whatever order (`duplicate-facets`), counted beyond the first of each; facets with two equal
 * corners are left out. Such facets share all their edges: they are looked for at the one between their lesser two vertices.
 *
 * @returns groups of facets with the same corners, ascending
 */
export function checkDuplicates(notes: Notes, { edgeCount, starts, halfEdges }: EdgeTable): number[][] {
  const { mesh } = notes;
  const groups: number[][] = [];
  for (let edge = 0; edge < edgeCount; edge++) {
    const begin = starts[edge] ?? 0;
    const end = starts[edge + 1] ?? 0;
    if (end - begin === 1) continue;
    const first = halfEdges[begin] ?? 0;
    const greater = Math.max(fromVertex(mesh, first), toVertex(mesh, first));
    if (end - begin === 2 && oppositeVertex(mesh, first) !== oppositeVertex(mesh, halfEdges[begin + 1] ?? 0)) continue;
    // Not by spreading: one edge may have more groups than a call can take arguments.
    for (const group of groupByOpposite(notes, halfEdges.subarray(begin, end), greater)) groups.push(group);
  }
  for (const group of groups) {
    notes.add('duplicate-facets', group.length - 1);
    for (const facet of group.slice(1)) notes.mark('duplicate-facets', facet);
  }
  return groups;
}

/** Facets at one edge with the same third corner, where that is the greatest. */
function groupByOpposite({ mesh }: Notes, halfEdges: Uint32Array, greater: number): number[][] {
  const groups = new Map<number, number[]>();
  for (const halfEdge of halfEdges) {
    const opposite = oppositeVertex(mesh, halfEdge);
    if (opposite < greater) continue;
    const group = groups.get(opposite);
    if (group === undefined) groups.set(opposite, [facetOf(halfEdge)]);
    else group.push(facetOf(halfEdge));
  }
  return [...groups.values()].filter((group) => group.length > 1);
}
