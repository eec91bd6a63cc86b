import type { WeldedMesh } from '../weld-corners';
import type { FacetTree } from './facet-tree';
import { pointOf } from './notes';
import { findSide, findSideOfInside, findTurn, findTurnOfInside } from './predicates';
import { visitRay } from './search-tree';
import { noShell, type ShellTable } from './shells';

/** A point that is known exactly: a vertex, or the point a/2 + b/4 + c/4 inside a facet. */
export type Probe = { vertex: number } | { inside: readonly [number, number, number] };

/** Where a point lies to the shells that it was held against. */
export interface Location {
  /** How often each shell goes around the point, with sign; shells that don't are left out. */
  windings: Map<number, number>;
  /** Shells on whose surface the point lies. */
  touched: Set<number>;
  /** Facets whose boxes the ray met: what it cost. */
  facetsMet: number;
}

/**
 * How often each shell goes around a point: its facets across the ray from the point along x, counted by the side from which they are met. Exact: where the ray
 * would graze an edge or a corner, the point is taken as moved by infinitesimals along y and z, and a smaller one along z. A point on a facet touches its shell.
 */
export function locatePoint(mesh: WeldedMesh, tree: FacetTree, shells: ShellTable, probe: Probe): Location {
  const location: Location = { windings: new Map(), touched: new Set(), facetsMet: 0 };
  const { coordinates, corners } = mesh;
  const place = placeOf(mesh, probe);
  // The rounding of a place inside a facet; boxes are asked a little wider.
  const slack = 'vertex' in probe ? 0 : 1e-15 * (Math.abs(place[0]) + Math.abs(place[1]) + Math.abs(place[2]));
  const sideOf = (a: number, b: number, c: number): number => ('vertex' in probe ? findSide(coordinates, a, b, c, probe.vertex) : findSideOfInside(coordinates, a, b, c, probe.inside));
  const turnOf = (i: number, j: number, a: number, b: number): number =>
    'vertex' in probe ? findTurn(coordinates, i, j, a, b, probe.vertex) : findTurnOfInside(coordinates, i, j, a, b, probe.inside);

  /** Which side of the edge's picture along x the point is on, once moved. */
  const movedTurn = (a: number, b: number): number => {
    const turn = turnOf(1, 2, a, b);
    if (turn !== 0) return turn;
    const dy = (coordinates[3 * b + 1] ?? 0) - (coordinates[3 * a + 1] ?? 0), dz = (coordinates[3 * b + 2] ?? 0) - (coordinates[3 * a + 2] ?? 0);
    return dz !== 0 ? -Math.sign(dz) : Math.sign(dy);
  };
  const touches = (a: number, b: number, c: number): boolean => {
    const isOwn = isPartOf(probe, a, b, c);
    if (!isOwn && sideOf(a, b, c) !== 0) return false;
    for (let i = 0; i < 3; i++) {
      const j = (i + 1) % 3;
      if (findTurn(coordinates, i, j, a, b, c) === 0) continue;
      if (isOwn) return true;
      const turns = [turnOf(i, j, a, b), turnOf(i, j, b, c), turnOf(i, j, c, a)];
      return !(turns.includes(1) && turns.includes(-1));
    }
    return false;
  };

  visitRay(tree, place, slack, (facet) => {
    location.facetsMet += 1;
    const shell = shells.shellOf[facet] ?? noShell;
    const a = corners[3 * facet] ?? 0, b = corners[3 * facet + 1] ?? 0, c = corners[3 * facet + 2] ?? 0;
    if (shell === noShell || location.touched.has(shell)) return;
    const least = Math.min(coordinates[3 * a] ?? 0, coordinates[3 * b] ?? 0, coordinates[3 * c] ?? 0);
    if (least <= place[0] + slack && touches(a, b, c)) {
      location.touched.add(shell);
      return;
    }
    const turn = movedTurn(a, b);
    if (turn === 0 || movedTurn(b, c) !== turn || movedTurn(c, a) !== turn) return;
    if (sideOf(a, b, c) * turn < 0) location.windings.set(shell, (location.windings.get(shell) ?? 0) + turn);
  });
  for (const [shell, winding] of location.windings) if (winding === 0) location.windings.delete(shell);
  return location;
}

/** Whether a point is one of a facet's corners, or the point inside of a facet with the same corners: it lies on the facet, which exact sums would take long to find. */
function isPartOf(probe: Probe, a: number, b: number, c: number): boolean {
  const isCorner = (vertex: number): boolean => vertex === a || vertex === b || vertex === c;
  return 'vertex' in probe ? isCorner(probe.vertex) : probe.inside.every(isCorner);
}

function placeOf(mesh: WeldedMesh, probe: Probe): [number, number, number] {
  if ('vertex' in probe) return pointOf(mesh, probe.vertex);
  const [a, b, c] = [pointOf(mesh, probe.inside[0]), pointOf(mesh, probe.inside[1]), pointOf(mesh, probe.inside[2])];
  const mix = (k: 0 | 1 | 2): number => 0.5 * a[k] + 0.25 * b[k] + 0.25 * c[k];
  return [mix(0), mix(1), mix(2)];
}
