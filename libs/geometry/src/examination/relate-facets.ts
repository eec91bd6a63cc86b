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
  for (let i = 0; i < 3; i++) {
    const j = (i + 1) % 3;
    const turn = findTurn(coordinates, i, j, corners[3 * one] ?? 0, corners[3 * one + 1] ?? 0, corners[3 * one + 2] ?? 0);
    if (turn === 0) continue;
    const other = findTurn(coordinates, i, j, corners[3 * two] ?? 0, corners[3 * two + 1] ?? 0, corners[3 * two + 2] ?? 0);
    if (other === 0) return 'apart';
    if (isBeyond(coordinates, corners, i, j, one, two, turn) || isBeyond(coordinates, corners, i, j, two, one, other)) return 'touching';
    return turn === other ? 'upon' : 'against';
  }
  return 'apart';
}

/** Whether one side of a facet has all of another facet beyond it, or on it. Of two convex figures that are apart, one has such a side. */
function isBeyond(coordinates: Float64Array, corners: Uint32Array, i: number, j: number, facet: number, other: number, turn: number): boolean {
  for (let k = 0; k < 3; k++) {
    const from = corners[3 * facet + k] ?? 0, to = corners[3 * facet + ((k + 1) % 3)] ?? 0;
    let beyond = true;
    for (let corner = 0; corner < 3 && beyond; corner++) {
      const point = corners[3 * other + corner] ?? 0;
      beyond = point === from || point === to || findTurn(coordinates, i, j, from, to, point) * turn <= 0;
    }
    if (beyond) return true;
  }
  return false;
}

/**
 * Whether the pictures of two facets that share a corner, along the axis to which the first is nearest to square, have no area in common: then neither passes through
 * the other nor lies upon it. It tells most neighbours on a flat apart, whose planes only exact sums could.
 */
export function haveSeparatePictures({ corners, coordinates }: WeldedMesh, one: number, two: number): boolean {
  const a = 3 * (corners[3 * one] ?? 0), b = 3 * (corners[3 * one + 1] ?? 0), c = 3 * (corners[3 * one + 2] ?? 0);
  const ex = (coordinates[b] ?? 0) - (coordinates[a] ?? 0), ey = (coordinates[b + 1] ?? 0) - (coordinates[a + 1] ?? 0), ez = (coordinates[b + 2] ?? 0) - (coordinates[a + 2] ?? 0);
  const fx = (coordinates[c] ?? 0) - (coordinates[a] ?? 0), fy = (coordinates[c + 1] ?? 0) - (coordinates[a + 1] ?? 0), fz = (coordinates[c + 2] ?? 0) - (coordinates[a + 2] ?? 0);
  const nx = Math.abs(ey * fz - ez * fy), ny = Math.abs(ez * fx - ex * fz), nz = Math.abs(ex * fy - ey * fx);
  const [i, j] = nx >= ny && nx >= nz ? [1, 2] : ny >= nz ? [2, 0] : [0, 1];
  const turn = findTurn(coordinates, i, j, corners[3 * one] ?? 0, corners[3 * one + 1] ?? 0, corners[3 * one + 2] ?? 0);
  const other = findTurn(coordinates, i, j, corners[3 * two] ?? 0, corners[3 * two + 1] ?? 0, corners[3 * two + 2] ?? 0);
  if (turn === 0 || other === 0) return false;
  return isBeyond(coordinates, corners, i, j, one, two, turn) || isBeyond(coordinates, corners, i, j, two, one, other);
}

export function shareCorner({ corners }: WeldedMesh, one: number, two: number): boolean {
  for (let k = 0; k < 3; k++) {
    const corner = corners[3 * one + k];
    if (corner === corners[3 * two] || corner === corners[3 * two + 1] || corner === corners[3 * two + 2]) return true;
  }
  return false;
}
