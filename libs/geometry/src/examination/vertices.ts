import { allocate } from '../grow-array';
import { createDisjointSets } from './disjoint-sets';
import { nextHalfEdge, runsForward, type EdgeTable } from './edge-table';
import { pointOf, type Notes } from './notes';

/**
 * Notes vertices at which more than one fan of facets meets (`crowded-vertices`): facets at a vertex belong to one fan where they share an edge of it,
 * however many others do. Surfaces that meet along an edge are told by `crowded-edges`, and not once more by its ends.
 */
export function checkVertices(notes: Notes, { edgeCount, starts, halfEdges }: EdgeTable): void {
  const { mesh } = notes;
  const { corners, vertexCount } = mesh;
  // A half-edge stands for the corner in which it begins. Each joining of two corners makes one fan fewer.
  const sets = createDisjointSets(3 * mesh.facetCount);
  const fans = allocate(() => new Int32Array(vertexCount));
  for (let k = 0; k < halfEdges.length; k++) {
    const vertex = corners[halfEdges[k] ?? 0] ?? 0;
    fans[vertex] = (fans[vertex] ?? 0) + 1;
  }
  for (let edge = 0; edge < edgeCount; edge++) {
    const begin = starts[edge] ?? 0;
    const first = halfEdges[begin] ?? 0;
    for (let k = begin + 1; k < (starts[edge + 1] ?? 0); k++) {
      const halfEdge = halfEdges[k] ?? 0;
      const along = runsForward(mesh, halfEdge) === runsForward(mesh, first);
      const end = along ? nextHalfEdge(halfEdge) : halfEdge;
      const begins = along ? halfEdge : nextHalfEdge(halfEdge);
      const from = corners[first] ?? 0, to = corners[nextHalfEdge(first)] ?? 0;
      if (sets.join(first, begins)) fans[from] = (fans[from] ?? 0) - 1;
      if (sets.join(nextHalfEdge(first), end)) fans[to] = (fans[to] ?? 0) - 1;
    }
  }
  noteCrowded(notes, fans, halfEdges);
}

function noteCrowded(notes: Notes, fans: Int32Array, halfEdges: Uint32Array): void {
  const { mesh } = notes;
  for (let vertex = 0; vertex < mesh.vertexCount; vertex++) {
    if ((fans[vertex] ?? 0) < 2) continue;
    notes.add('crowded-vertices');
    // A place without length: the viewer marks it by its point.
    notes.addLine('crowded-vertices', [...pointOf(mesh, vertex), ...pointOf(mesh, vertex)]);
  }
  if (notes.count('crowded-vertices') === 0) return;
  for (let k = 0; k < halfEdges.length; k++) {
    const halfEdge = halfEdges[k] ?? 0;
    if ((fans[mesh.corners[halfEdge] ?? 0] ?? 0) > 1) notes.mark('crowded-vertices', Math.floor(halfEdge / 3));
  }
}
