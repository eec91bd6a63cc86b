import { allocate } from '../grow-array';
import { allocateSingle } from './allocate-single';
import { sharp } from './merge-flats';
import { next, none } from './pair-edges';
import type { OutwardFacets } from './read-facets';
import type { Fans } from './walk-fans';

/**
 * How far the surface stands off the chords, for each half-edge: the height over its facet is Σ b_ij λ_i λ_j in the facet's barycentric coordinates, so that an
 * edge's own sag is b/4 and its mean is b/6. From the slopes at its two ends, -n_i·e and n_j·e: half their sum, and for an arc, whose slope is the
 * sine of half its turn, 0.3 of the slope's square more.
 */
export function bulgeEdges(facets: OutwardFacets, kinds: Uint8Array, fans: Fans, normals: Float32Array): Float64Array {
  const halfCount = 3 * facets.count;
  const slopes = allocateSingle(2 * halfCount);
  for (let half = 0; half < halfCount; half++) putSlopes(facets, fans, normals, half, slopes);
  const points = findPoints(fans, slopes);
  const bulges = allocate(() => new Float64Array(halfCount));
  for (let half = 0; half < halfCount; half++) {
    const slope = findSlope(kinds, fans, points, slopes, half);
    bulges[half] = slope * lengthOf(facets, half) * (1 + 0.3 * slope * slope);
  }
  for (let corner = 0; corner < halfCount; corner++) if (points[fans.of[corner] ?? none] === 1) roundPoint(bulges, corner);
  return bulges;
}

/** The facets at the point of a cone hold 1/9 of their area times the bulge across, where the quadratic over them holds 1/12: the two edges to the point make it up. */
function roundPoint(bulges: Float64Array, corner: number): void {
  const across = bulges[next(corner)] ?? 0;
  for (const half of [corner, next(next(corner))]) bulges[half] = (bulges[half] ?? 0) + across / 6;
}

function lengthOf({ corners, places }: OutwardFacets, half: number): number {
  const a = 3 * (corners[half] ?? 0), b = 3 * (corners[next(half)] ?? 0);
  const x = (places[b] ?? 0) - (places[a] ?? 0), y = (places[b + 1] ?? 0) - (places[a + 1] ?? 0), z = (places[b + 2] ?? 0) - (places[a + 2] ?? 0);
  return Math.sqrt(x * x + y * y + z * z);
}

/** Slopes at the beginning and at the end of a half-edge, positive where the surface rises from the chord. */
function putSlopes(facets: OutwardFacets, { of }: Fans, normals: Float32Array, half: number, slopes: Float32Array): void {
  const { corners, places } = facets;
  const a = 3 * (corners[half] ?? 0), b = 3 * (corners[next(half)] ?? 0);
  const i = 3 * (of[half] ?? 0), j = 3 * (of[next(half)] ?? 0);
  const length = lengthOf(facets, half);
  // One normal at both ends is a plane's: its slopes would be the rounding of the file's digits.
  const plane = normals[i] === normals[j] && normals[i + 1] === normals[j + 1] && normals[i + 2] === normals[j + 2];
  if (plane || !(length > 0)) return;
  let begin = 0, end = 0;
  for (let k = 0; k < 3; k++) {
    const along = ((places[b + k] ?? 0) - (places[a + k] ?? 0)) / length;
    begin -= (normals[i + k] ?? 0) * along;
    end += (normals[j + k] ?? 0) * along;
  }
  slopes[2 * half] = begin;
  slopes[2 * half + 1] = end;
}

/** Fans that come round a point, as at the top of a cone: all edges leave it with a slope, and arrive with next to none. It has no normal. */
function findPoints({ count, order, starts, closed }: Fans, slopes: Float32Array): Uint8Array {
  const points = allocate(() => new Uint8Array(count));
  for (let fan = 0; fan < count; fan++) {
    if (closed[fan] !== 1) continue;
    const begin = starts[fan] ?? 0, end = starts[fan + 1] ?? 0;
    let here = 0, there = 0;
    for (let at = begin; at < end; at++) {
      const half = order[at] ?? 0;
      here += slopes[2 * half] ?? 0;
      there += Math.abs(slopes[2 * half + 1] ?? 0);
    }
    if (Math.abs(here) > 3 * there && Math.abs(here) > 0.02 * (end - begin)) points[fan] = 1;
  }
  return points;
}

/** Slope that stands for an edge: from both ends; from one where the other is a point, or where it is the rim of its fan, whose normal leans inwards. */
function findSlope(kinds: Uint8Array, { of, closed }: Fans, points: Uint8Array, slopes: Float32Array, half: number): number {
  const i = of[half] ?? 0, j = of[next(half)] ?? 0;
  const begin = slopes[2 * half] ?? 0, end = slopes[2 * half + 1] ?? 0;
  if (points[i] === 1) return points[j] === 1 ? 0 : end;
  if (points[j] === 1) return begin;
  if (kinds[half] !== sharp && closed[i] !== closed[j]) return closed[i] === 1 ? begin : end;
  return (begin + end) / 2;
}
