import type { WeldedMesh } from '../weld-corners';
import { facetOf, fromVertex, runsForward, toVertex, type EdgeTable } from './edge-table';
import type { Notes } from './notes';

/** What the facets at an edge come to. */
export interface EdgeBalance {
  facets: number;
  /** Facets that run along it from the lesser vertex to the greater one, less those that run the other way. */
  surplus: number;
}

export function balanceEdge(mesh: WeldedMesh, { starts, halfEdges }: EdgeTable, edge: number): EdgeBalance {
  const begin = starts[edge] ?? 0;
  const end = starts[edge + 1] ?? 0;
  let surplus = 0;
  for (let k = begin; k < end; k++) surplus += runsForward(mesh, halfEdges[k] ?? 0) ? 1 : -1;
  return { facets: end - begin, surplus };
}

/** Edges that are not shared by two facets that run along them both ways, ascending. */
export function findUnusualEdges(mesh: WeldedMesh, { starts, halfEdges, edgeCount }: EdgeTable): number[] {
  const unusual: number[] = [];
  for (let edge = 0; edge < edgeCount; edge++) {
    const begin = starts[edge] ?? 0;
    if ((starts[edge + 1] ?? 0) === begin + 2 && runsForward(mesh, halfEdges[begin] ?? 0) !== runsForward(mesh, halfEdges[begin + 1] ?? 0)) continue;
    unusual.push(edge);
  }
  return unusual;
}

/**
 * Notes what is wrong with the edges: an odd number of facets at one (`boundary-edges`), more than two (`crowded-edges`), an even number that do not run
 * along it as often one way as the other (`unbalanced-edges`).
 */
export function checkEdges(notes: Notes, table: EdgeTable, unusual: readonly number[]): void {
  const { starts, halfEdges } = table;
  const note = (kind: 'boundary-edges' | 'crowded-edges' | 'unbalanced-edges', edge: number): void => {
    notes.add(kind);
    for (let k = starts[edge] ?? 0; k < (starts[edge + 1] ?? 0); k++) notes.mark(kind, facetOf(halfEdges[k] ?? 0));
    const first = halfEdges[starts[edge] ?? 0] ?? 0;
    notes.addEdge(kind, fromVertex(notes.mesh, first), toVertex(notes.mesh, first));
  };
  for (const edge of unusual) {
    const { facets, surplus } = balanceEdge(notes.mesh, table, edge);
    if (facets % 2 === 1) note('boundary-edges', edge);
    else if (surplus !== 0) note('unbalanced-edges', edge);
    if (facets > 2) note('crowded-edges', edge);
  }
}
