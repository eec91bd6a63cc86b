import type { WeldedMesh } from '../weld-corners';
import { facetOf, fromVertex, oppositeVertex, runsForward, toVertex } from './edge-table';
import { findSide, findTurn } from './predicates';

/**
 * Which facets belong together at an edge that more than two share, as many running along it one way as the other: those with the same material between them.
 * Going around the edge, a facet of one direction opens a wedge of material and one of the other closes it, as brackets do. So two blocks that touch along an edge,
 * or in a face with the same corners, stay two.
 *
 * Where facets lie upon each other, wedges are closed before others are opened; and facets that lie upon each other facing the same way nest by their numbers,
 * alike at all their edges. Decided exactly.
 *
 * @param isInsideOut the whole mesh is: material lies on the other side of its facets
 * @returns pairs of facets; undefined where a facet without area has no place around the edge
 */
export function pairAroundEdge(mesh: WeldedMesh, halfEdges: Uint32Array, isInsideOut = false): [number, number][] | undefined {
  const first = halfEdges[0] ?? 0;
  const lesser = Math.min(fromVertex(mesh, first), toVertex(mesh, first));
  const greater = Math.max(fromVertex(mesh, first), toVertex(mesh, first));
  const axes = chooseAxes(mesh, lesser, greater);
  const opens = (halfEdge: number): boolean => opensMaterial(mesh, halfEdge) !== isInsideOut;
  const opposite = (halfEdge: number): number => oppositeVertex(mesh, halfEdge);
  const sideOfFirst = findTurn(mesh.coordinates, ...axes, lesser, greater, opposite(first));
  if ([...halfEdges].some((halfEdge) => isOnLine(mesh, lesser, greater, opposite(halfEdge)))) return undefined;

  /** Quarter of the way around from the first facet: 0 upon it, 1 before half a turn, 2 at half a turn, 3 beyond. */
  const sectorOf = (halfEdge: number): number => {
    const side = findSide(mesh.coordinates, lesser, greater, opposite(first), opposite(halfEdge));
    if (side !== 0) return side > 0 ? 1 : 3;
    return isSameDirection(mesh, axes, lesser, greater, opposite(halfEdge), sideOfFirst, opposite(first)) ? 0 : 2;
  };
  const sectors = new Map([...halfEdges].map((halfEdge) => [halfEdge, sectorOf(halfEdge)]));
  const compare = (one: number, two: number): number => {
    const sector = (sectors.get(one) ?? 0) - (sectors.get(two) ?? 0);
    if (sector !== 0) return sector;
    const between = (sectors.get(one) ?? 0) % 2 === 0 ? 0 : -findSide(mesh.coordinates, lesser, greater, opposite(one), opposite(two));
    if (between !== 0) return between;
    const oneOpens = opens(one), twoOpens = opens(two);
    if (oneOpens !== twoOpens) return oneOpens ? 1 : -1;
    return oneOpens ? one - two : two - one;
  };
  return matchBrackets([...halfEdges].sort(compare), opens);
}

type Axes = readonly [number, number];

/** Two axes in whose plane the edge has some length: that of its longest extent, and the next. */
function chooseAxes({ coordinates }: WeldedMesh, from: number, to: number): Axes {
  const extent = (k: number): number => Math.abs((coordinates[3 * to + k] ?? 0) - (coordinates[3 * from + k] ?? 0));
  const longest = extent(0) >= extent(1) && extent(0) >= extent(2) ? 0 : extent(1) >= extent(2) ? 1 : 2;
  return [longest, (longest + 1) % 3];
}

function isOnLine({ coordinates }: WeldedMesh, a: number, b: number, c: number): boolean {
  return findTurn(coordinates, 0, 1, a, b, c) === 0 && findTurn(coordinates, 1, 2, a, b, c) === 0 && findTurn(coordinates, 2, 0, a, b, c) === 0;
}

/** Whether a point in the plane of the edge and the first facet lies on that facet's side of the edge. */
function isSameDirection({ coordinates }: WeldedMesh, axes: Axes, a: number, b: number, point: number, sideOfFirst: number, first: number): boolean {
  if (sideOfFirst !== 0) return findTurn(coordinates, ...axes, a, b, point) === sideOfFirst;
  // The plane is seen edge-on along the third axis: another pair of axes with the edge's longest one shows it.
  const [longest, next] = axes;
  const third = 3 - longest - next;
  return findTurn(coordinates, longest, third, a, b, point) === findTurn(coordinates, longest, third, a, b, first);
}

/**
 * Counter-clockwise around the edge, seen against its run from the lesser vertex to the greater: a facet that runs the other way than the edge has its material
 * after it, one that runs along it has it before.
 */
const opensMaterial = (mesh: WeldedMesh, halfEdge: number): boolean => !runsForward(mesh, halfEdge);

/** Pairs the facets that open material with those that close it, going around once and on to what was open before the beginning. */
function matchBrackets(around: readonly number[], opens: (halfEdge: number) => boolean): [number, number][] {
  const pairs: [number, number][] = [];
  const open: number[] = [];
  const left: number[] = [];
  for (const halfEdge of around) {
    const partner = opens(halfEdge) ? undefined : open.pop();
    if (partner !== undefined) pairs.push([facetOf(partner), facetOf(halfEdge)]);
    else (opens(halfEdge) ? open : left).push(halfEdge);
  }
  for (const halfEdge of left) pairs.push([facetOf(open.pop() ?? halfEdge), facetOf(halfEdge)]);
  return pairs;
}
