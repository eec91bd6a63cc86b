import { allocate } from '../grow-array';
import { next, none, previous } from './pair-edges';
import type { OutwardFacets } from './read-facets';

/** What an edge is: a place where the surface has a corner, a joint between two chords of a curve, or a line drawn across a plane. */
export const sharp = 0, smooth = 1, flat = 2;

/**
 * Two facets that turn by more are taken for a corner of the body: 35°, between the 15° of a circle of 24 chords and the 45° of a chamfer. Its cosine.
 */
const cornerCosine = 0.819_152_044_288_991_8;

/** Facets in one plane are one flat, whatever lines were drawn across it. */
export interface Flats {
  /** For each facet the number of its flat: that of its first facet. */
  of: Uint32Array;
  /** By the number of the flat: area, and unit normal. */
  areas: Float64Array;
  normals: Float64Array;
  /** For each half-edge: sharp, smooth or flat. */
  kinds: Uint8Array;
}

export function mergeFlats(facets: OutwardFacets, partners: Uint32Array): Flats {
  const { count } = facets;
  const of = allocate(() => new Uint32Array(count));
  for (let facet = 0; facet < count; facet++) of[facet] = facet;
  const kinds = allocate(() => new Uint8Array(3 * count));
  const borrowed = borrowPlanes(facets, partners);
  for (let half = 0; half < 3 * count; half++) {
    const partner = partners[half] ?? none;
    if (partner === none || partner < half || !liesFlat(facets, borrowed, half, partner)) continue;
    kinds[half] = flat;
    kinds[partner] = flat;
    join(of, third(half), third(partner));
  }
  for (let facet = 0; facet < count; facet++) of[facet] = findFirst(of, facet);
  const { areas, normals } = sumFlats(facets, of);
  for (let half = 0; half < 3 * count; half++) {
    const partner = partners[half] ?? none;
    if (partner === none || kinds[half] === flat) continue;
    const one = of[third(half)] ?? 0, other = of[third(partner)] ?? 0;
    if (one === other || turnCosine(normals, one, other) >= cornerCosine) kinds[half] = smooth;
  }
  return { of, areas, normals, kinds };
}

/** The facet of a half-edge or corner. */
export function third(half: number): number {
  return (half - (half % 3)) / 3;
}

export function turnCosine(normals: Float64Array, one: number, other: number): number {
  return (normals[3 * one] ?? 0) * (normals[3 * other] ?? 0) + (normals[3 * one + 1] ?? 0) * (normals[3 * other + 1] ?? 0) + (normals[3 * one + 2] ?? 0) * (normals[3 * other + 2] ?? 0);
}

/** Two borrowed planes are compared by their normals alone: 0.026° apart or less. Its cosine. */
const samePlane = 0.999_999_9;

/**
 * One facet's far corner lies in the other's plane, as far as the digits of a file tell: the plane of a thin facet says little, so either will do,
 * but for a facet whose plane is borrowed: its own corners lie in every plane through it.
 */
function liesFlat(facets: OutwardFacets, borrowed: Uint8Array, half: number, partner: number): boolean {
  const one = third(half), other = third(partner);
  const cosine = turnCosine(facets.normals, one, other);
  if (!(cosine > 0.5)) return false;
  if (borrowed[one] !== own && borrowed[other] !== own) return cosine >= samePlane;
  if (borrowed[one] !== own) return distance(facets, half, partner) <= facets.rounding;
  if (borrowed[other] !== own) return distance(facets, partner, half) <= facets.rounding;
  return Math.min(distance(facets, half, partner), distance(facets, partner, half)) <= facets.rounding;
}

/** How often a plane is handed on along a row of facets that have none. */
const handings = 4;

/** What `borrowPlanes` says of a facet: it has a plane of its own, looks for one, or has that of a neighbour. */
const own = 0, looking = 1, borrowing = 2;

/** Gives facets that are no wider than a few roundings the plane of a neighbour, across the longest edge where that one has a plane. */
function borrowPlanes(facets: OutwardFacets, partners: Uint32Array): Uint8Array {
  const { count, areas, rounding } = facets;
  const states = allocate(() => new Uint8Array(count));
  let waiting: number[] = [];
  for (let facet = 0; facet < count; facet++) {
    const longest = Math.max(measureEdge(facets, 3 * facet), measureEdge(facets, 3 * facet + 1), measureEdge(facets, 3 * facet + 2));
    if (2 * (areas[facet] ?? 0) > 4 * rounding * longest) continue;
    states[facet] = looking;
    waiting.push(facet);
  }
  for (let pass = 0; pass < handings && waiting.length > 0; pass++) {
    waiting = waiting.filter((facet) => !borrowPlane(facets, partners, states, facet));
  }
  return states;
}

function borrowPlane(facets: OutwardFacets, partners: Uint32Array, states: Uint8Array, facet: number): boolean {
  let best = none;
  let longest = -1;
  for (let half = 3 * facet; half < 3 * facet + 3; half++) {
    const partner = partners[half] ?? none;
    const length = measureEdge(facets, half);
    if (partner === none || states[third(partner)] === looking || !(length > longest)) continue;
    best = third(partner);
    longest = length;
  }
  if (best === none) return false;
  for (let k = 0; k < 3; k++) facets.normals[3 * facet + k] = facets.normals[3 * best + k] ?? 0;
  states[facet] = borrowing;
  return true;
}

function measureEdge({ corners, places }: OutwardFacets, half: number): number {
  const a = 3 * (corners[half] ?? 0), b = 3 * (corners[next(half)] ?? 0);
  const x = (places[b] ?? 0) - (places[a] ?? 0), y = (places[b + 1] ?? 0) - (places[a + 1] ?? 0), z = (places[b + 2] ?? 0) - (places[a + 2] ?? 0);
  return Math.sqrt(x * x + y * y + z * z);
}

/** From the plane of the facet of `half` to the corner across from `partner`. */
function distance({ corners, places, normals }: OutwardFacets, half: number, partner: number): number {
  const at = 3 * third(half), from = 3 * (corners[next(half)] ?? 0), to = 3 * (corners[previous(partner)] ?? 0);
  let sum = 0;
  for (let k = 0; k < 3; k++) sum += (normals[at + k] ?? 0) * ((places[to + k] ?? 0) - (places[from + k] ?? 0));
  return Math.abs(sum);
}

function findFirst(of: Uint32Array, facet: number): number {
  let at = facet;
  for (let up = of[at] ?? 0; up !== at; up = of[at] ?? 0) {
    // Halving the path keeps the next search short.
    of[at] = of[up] ?? 0;
    at = of[at] ?? 0;
  }
  return at;
}

function join(of: Uint32Array, one: number, other: number): void {
  const [a, b] = [findFirst(of, one), findFirst(of, other)];
  if (a < b) of[b] = a;
  else of[a] = b;
}

/** In the place of the facets' own normals, which are asked for no more: those of flats lie at their first facets, which come first. */
function sumFlats({ count, areas: facetAreas, normals }: OutwardFacets, of: Uint32Array): Pick<Flats, 'areas' | 'normals'> {
  const areas = allocate(() => new Float64Array(count));
  for (let facet = 0; facet < count; facet++) {
    const to = of[facet] ?? 0;
    const area = facetAreas[facet] ?? 0;
    areas[to] = (areas[to] ?? 0) + area;
    for (let k = 0; k < 3; k++) normals[3 * to + k] = (to === facet ? 0 : (normals[3 * to + k] ?? 0)) + area * (normals[3 * facet + k] ?? 0);
  }
  for (let at = 0; at < 3 * count; at += 3) {
    const x = normals[at] ?? 0, y = normals[at + 1] ?? 0, z = normals[at + 2] ?? 0;
    const size = Math.sqrt(x * x + y * y + z * z);
    if (!(size > 0)) continue;
    normals[at] = x / size;
    normals[at + 1] = y / size;
    normals[at + 2] = z / size;
  }
  return { areas, normals };
}
