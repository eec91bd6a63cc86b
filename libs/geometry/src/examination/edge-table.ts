import { allocate } from '../grow-array';
import type { WeldedMesh } from '../weld-corners';

/**
 * The edges of a mesh. Half-edge 3f + k runs from corner k of facet f to the next one. Half-edges are sorted by their lesser vertex, then by the greater
 * one, then by number, so that those of one edge stand together: edge e has halfEdges[starts[e], starts[e + 1]). Facets with two equal corners have none:
 * the two that are left would cancel. Two counting sorts, linear whatever the mesh; 24 bytes a facet stay.
 */
export interface EdgeTable {
  edgeCount: number;
  starts: Uint32Array;
  halfEdges: Uint32Array;
}

export const nextHalfEdge = (halfEdge: number): number => (halfEdge % 3 === 2 ? halfEdge - 2 : halfEdge + 1);
export const facetOf = (halfEdge: number): number => Math.floor(halfEdge / 3);

/** Where a half-edge begins and ends, and the corner of its facet that it does not touch. */
export const fromVertex = ({ corners }: WeldedMesh, halfEdge: number): number => corners[halfEdge] ?? 0;
export const toVertex = ({ corners }: WeldedMesh, halfEdge: number): number => corners[nextHalfEdge(halfEdge)] ?? 0;
export const oppositeVertex = ({ corners }: WeldedMesh, halfEdge: number): number => corners[halfEdge % 3 === 0 ? halfEdge + 2 : halfEdge - 1] ?? 0;

/** Whether a half-edge runs from the lesser vertex to the greater one. */
export const runsForward = (mesh: WeldedMesh, halfEdge: number): boolean => fromVertex(mesh, halfEdge) < toVertex(mesh, halfEdge);

export function createEdgeTable(mesh: WeldedMesh): EdgeTable {
  const listed = listHalfEdges(mesh);
  const sorted = sortByVertex(mesh, sortByVertex(mesh, listed, Math.max), Math.min);
  return findEdges(mesh, sorted);
}

/** All half-edges but those of facets with two equal corners. */
function listHalfEdges({ corners, facetCount }: WeldedMesh): Uint32Array {
  const listed = allocate(() => new Uint32Array(3 * facetCount));
  let count = 0;
  for (let at = 0; at < 3 * facetCount; at += 3) {
    const a = corners[at], b = corners[at + 1], c = corners[at + 2];
    if (a === b || b === c || c === a) continue;
    listed[count] = at;
    listed[count + 1] = at + 1;
    listed[count + 2] = at + 2;
    count += 3;
  }
  return listed.subarray(0, count);
}

/** A stable counting sort by one of the two vertices. */
function sortByVertex(mesh: WeldedMesh, halfEdges: Uint32Array, choose: (one: number, two: number) => number): Uint32Array {
  const { corners, vertexCount } = mesh;
  const places = allocate(() => new Uint32Array(vertexCount + 1));
  for (let k = 0; k < halfEdges.length; k++) {
    const halfEdge = halfEdges[k] ?? 0;
    const vertex = choose(corners[halfEdge] ?? 0, corners[nextHalfEdge(halfEdge)] ?? 0);
    places[vertex + 1] = (places[vertex + 1] ?? 0) + 1;
  }
  for (let vertex = 1; vertex <= vertexCount; vertex++) places[vertex] = (places[vertex] ?? 0) + (places[vertex - 1] ?? 0);
  const sorted = allocate(() => new Uint32Array(halfEdges.length));
  for (let k = 0; k < halfEdges.length; k++) {
    const halfEdge = halfEdges[k] ?? 0;
    const vertex = choose(corners[halfEdge] ?? 0, corners[nextHalfEdge(halfEdge)] ?? 0);
    const place = places[vertex] ?? 0;
    sorted[place] = halfEdge;
    places[vertex] = place + 1;
  }
  return sorted;
}

function findEdges(mesh: WeldedMesh, halfEdges: Uint32Array): EdgeTable {
  const starts = allocate(() => new Uint32Array(halfEdges.length + 1));
  let edgeCount = 0;
  let lesser = -1;
  let greater = -1;
  for (let k = 0; k < halfEdges.length; k++) {
    const halfEdge = halfEdges[k] ?? 0;
    const from = fromVertex(mesh, halfEdge);
    const to = toVertex(mesh, halfEdge);
    if (Math.min(from, to) === lesser && Math.max(from, to) === greater) continue;
    lesser = Math.min(from, to);
    greater = Math.max(from, to);
    starts[edgeCount++] = k;
  }
  starts[edgeCount] = halfEdges.length;
  return { edgeCount, starts: starts.slice(0, edgeCount + 1), halfEdges };
}
