import type { WeldedMesh } from '../weld-corners';
import { findSide, findTurn } from './predicates';

/**
 * How two facets lie to each other.
 * apart: nothing in common, or no more than corners and sides that belong to both. touching: they may meet in points where neither passes through the other.
 * crossing: each has points on both sides of the other where they meet. upon: in one plane and over each other, facing the same way.
 * against: the same, facing each other. Facets without area are apart from all others.
 */
export type FacetRelation = 'apart' | 'touching' | 'crossing' | 'upon' | 'against';

const sides = new Int32Array(6);

/** Decided exactly. `facing` of `upon` and `against` is by the winding as it is stored. */
export function relateFacets(mesh: WeldedMesh, one: number, two: number): FacetRelation {
  const { corners, coordinates } = mesh;
  const a = 3 * one, b = 3 * two;
  let ahead = 0, behind = 0;
  for (let k = 0; k < 3; k++) {
    const side = sideOf(mesh, b, corners[a + k] ?? 0);
    sides[k] = side;
    if (side > 0) ahead += 1;
    else if (side < 0) behind += 1;
  }
  if (ahead === 3 || behind === 3) return 'apart';
  if (ahead === 0 && behind === 0) return relateInPlane(mesh, one, two);
  const straddles = ahead > 0 && behind > 0;
  ahead = behind = 0;
  for (let k = 0; k < 3; k++) {
    const side = sideOf(mesh, a, corners[b + k] ?? 0);
    sides[3 + k] = side;
    if (side > 0) ahead += 1;
    else if (side < 0) behind += 1;
  }
  if (ahead === 3 || behind === 3) return 'apart';
  // Facets without area have all points in their plane.
  if (ahead === 0 && behind === 0) return 'apart';
  if (!straddles || ahead === 0 || behind === 0) return 'touching';
  return relateAcross(coordinates, corners, a, b);
}

function sideOf({ corners, coordinates }: WeldedMesh, at: number, vertex: number): number {
  const p = corners[at] ?? 0, q = corners[at + 1] ?? 0, r = corners[at + 2] ?? 0;
  return vertex === p || vertex === q || vertex === r ? 0 : findSide(coordinates, p, q, r, vertex);
}

/**
 * Two facets, each with corners on both sides of the other's plane: they pass through each other where their stretches of the line in which the planes meet
 * overlap by more than a point (Guigue & Devillers 2003, "Fast and robust triangle-triangle overlap test using orientation predicates", with the ends kept apart).
 */
function relateAcross(coordinates: Float64Array, corners: Uint32Array, a: number, b: number): FacetRelation {
  const i = findApex(0), j = findApex(3);
  const p1 = corners[a + i] ?? 0, p2 = corners[b + j] ?? 0;
  let q1 = corners[a + ((i + 1) % 3)] ?? 0, r1 = corners[a + ((i + 2) % 3)] ?? 0;
  let q2 = corners[b + ((j + 1) % 3)] ?? 0, r2 = corners[b + ((j + 2) % 3)] ?? 0;
  // Both are turned so that the apex of each is ahead of the other.
  if ((sides[i] ?? 0) < 0) [q2, r2] = [r2, q2];
  if ((sides[3 + j] ?? 0) < 0) [q1, r1] = [r1, q1];
  const begins = findSide(coordinates, p1, q1, p2, q2);
  if (begins > 0) return 'apart';
  const ends = findSide(coordinates, p1, r1, r2, p2);
  if (ends > 0) return 'apart';
  return begins < 0 && ends < 0 ? 'crossing' : 'touching';
}

/** The corner that stands alone on its side of the other plane; where one is in that plane, either of the other two. */
function findApex(from: number): number {
  for (let k = 0; k < 3; k++) {
    const side = sides[from + k] ?? 0;
    const next = sides[from + ((k + 1) % 3)] ?? 0, last = sides[from + ((k + 2) % 3)] ?? 0;
    if (side > 0 && next <= 0 && last <= 0) return k;
    if (side < 0 && next >= 0 && last >= 0) return k;
  }
  return 0;
}

/** Two facets in one plane, in the picture along an axis in which both have an area. */
function relateInPlane({ corners, coordinates }: WeldedMesh, one: number, two: number): FacetRelation {
  const [a, b, c] = [corners[3 * one] ?? 0, corners[3 * one + 1] ?? 0, corners[3 * one + 2] ?? 0];
  const [d, e, f] = [corners[3 * two] ?? 0, corners[3 * two + 1] ?? 0, corners[3 * two + 2] ?? 0];
  for (let i = 0; i < 3; i++) {
    const j = (i + 1) % 3;
    const turn = findTurn(coordinates, i, j, a, b, c);
    if (turn === 0) continue;
    const other = findTurn(coordinates, i, j, d, e, f);
    if (other === 0) return 'apart';
    const isBeyond = (from: number, to: number, sense: number, points: readonly number[]): boolean =>
      points.every((point) => point === from || point === to || findTurn(coordinates, i, j, from, to, point) * sense <= 0);
    // Two convex figures are apart where a side of one has all of the other beyond it.
    for (const [from, to] of [[a, b], [b, c], [c, a]] as const) if (isBeyond(from, to, turn, [d, e, f])) return 'touching';
    for (const [from, to] of [[d, e], [e, f], [f, d]] as const) if (isBeyond(from, to, other, [a, b, c])) return 'touching';
    return turn === other ? 'upon' : 'against';
  }
  return 'apart';
}
