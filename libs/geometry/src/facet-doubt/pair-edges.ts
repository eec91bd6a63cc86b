import { allocate } from '../grow-array';
import type { OutwardFacets } from './read-facets';

/** Stands where a half-edge has no other, or more than one. */
export const none = 0xffff_ffff;

/** For each half-edge the one that runs along the same edge the other way, where exactly two facets meet there and agree. */
export function pairEdges(facets: OutwardFacets): Uint32Array {
  const { corners, count } = facets;
  const partners = allocate(() => new Uint32Array(3 * count)).fill(none);
  const lesser = (half: number): number => Math.min(corners[half] ?? 0, corners[next(half)] ?? 0);
  const greater = (half: number): number => Math.max(corners[half] ?? 0, corners[next(half)] ?? 0);
  // Two stable counting sorts, the second key first: linear, however many facets meet in a vertex.
  const sorted = sortBy(lesser, sortBy(greater, undefined, facets), facets);
  for (let at = 0; at < sorted.length; ) {
    const half = sorted[at] ?? 0;
    let end = at + 1;
    while (end < sorted.length && lesser(sorted[end] ?? 0) === lesser(half) && greater(sorted[end] ?? 0) === greater(half)) end += 1;
    const other = sorted[at + 1] ?? 0;
    if (end === at + 2 && corners[half] !== corners[other]) {
      partners[half] = other;
      partners[other] = half;
    }
    at = end;
  }
  return partners;
}

/** The half-edge after this one, around its facet. */
export function next(half: number): number {
  return half % 3 === 2 ? half - 2 : half + 1;
}

/** The half-edge before this one. */
export function previous(half: number): number {
  return half % 3 === 0 ? half + 2 : half - 1;
}

function sortBy(key: (half: number) => number, before: Uint32Array | undefined, { count, vertexCount }: OutwardFacets): Uint32Array {
  const starts = allocate(() => new Uint32Array(vertexCount + 1));
  for (let half = 0; half < 3 * count; half++) starts[key(half) + 1] = (starts[key(half) + 1] ?? 0) + 1;
  for (let vertex = 0; vertex < vertexCount; vertex++) starts[vertex + 1] = (starts[vertex + 1] ?? 0) + (starts[vertex] ?? 0);
  const sorted = allocate(() => new Uint32Array(3 * count));
  for (let at = 0; at < 3 * count; at++) {
    const half = before?.[at] ?? at;
    const place = starts[key(half)] ?? 0;
    starts[key(half)] = place + 1;
    sorted[place] = half;
  }
  return sorted;
}
