import { allocateSingle } from './allocate-single';
import type { Fans } from './walk-fans';
import { third, type Flats } from './merge-flats';
import { next, previous } from './pair-edges';
import type { OutwardFacets } from './read-facets';

/**
 * What each flat around a vertex weighs for the normal there.
 * angle: the angle that it takes. product: the sine of that angle over the lengths of its two edges, which is exact where the surface is a sphere
 * (Max, "Weights for computing vertex normals from facet normals", 1999). square, fourth: that power of its area.
 */
type Weight = 'angle' | 'product' | 'square' | 'fourth';

/**
 * A way of weighing: `alike` where the flats of a fan are of one size, `unlike` where the largest has `to` times the area of the smallest or more, and
 * between `from` and `to` a part of each. A large flat beside small ones is the plane in which an arc begins, not a chord of it: it has to have the normal
 * to itself, the more so as its own bulge grows with its size.
 */
export interface Weighting {
  alike: Weight;
  unlike: Weight;
  from: number;
  to: number;
}

/** Unit vectors along the four weighted sums of one fan: angle, product, square, fourth. */
const weights: readonly Weight[] = ['angle', 'product', 'square', 'fourth'];

/** Unit normals of the surface, three a fan, for each way of weighing. All in one walk, for most of the time goes into the angles. */
export function weighNormals(facets: OutwardFacets, flats: Flats, fans: Fans, weightings: readonly Weighting[]): Float32Array[] {
  const found = weightings.map(() => allocateSingle(3 * fans.count));
  const normal = new Float64Array(3);
  const sums = new Float64Array(3 * weights.length);
  for (let fan = 0; fan < fans.count; fan++) {
    const ratio = findAreaRatio(flats, fans, fan);
    if (ratio === 1) {
      for (const normals of found) copyFlat(flats, fans, fan, normals);
      continue;
    }
    sums.fill(0);
    addRuns(facets, flats, fans, fan, sums);
    for (let at = 0; at < sums.length; at += 3) makeUnit(sums, at);
    weightings.forEach((weighting, k) => {
      blend(sums, weighting, ratio, normal);
      found[k]?.set(normal, 3 * fan);
    });
  }
  return found;
}

function blend(sums: Float64Array, { alike, unlike, from, to }: Weighting, ratio: number, normal: Float64Array): void {
  const share = Math.min(1, Math.max(0, (ratio - from) / (to - from)));
  const one = 3 * weights.indexOf(alike), other = 3 * weights.indexOf(unlike);
  for (let k = 0; k < 3; k++) normal[k] = (1 - share) * (sums[one + k] ?? 0) + share * (sums[other + k] ?? 0);
  makeUnit(normal, 0);
}

function makeUnit(vectors: Float64Array, at: number): void {
  const x = vectors[at] ?? 0, y = vectors[at + 1] ?? 0, z = vectors[at + 2] ?? 0;
  const length = Math.sqrt(x * x + y * y + z * z);
  if (!(length > 0)) return;
  vectors[at] = x / length;
  vectors[at + 1] = y / length;
  vectors[at + 2] = z / length;
}

/** Largest area of a flat in the fan over the smallest; 1 where there is but one flat, a little more where there are several of one size. */
function findAreaRatio({ of, areas }: Flats, { order, starts }: Fans, fan: number): number {
  const begin = starts[fan] ?? 0, end = starts[fan + 1] ?? 0;
  const first = of[third(order[begin] ?? 0)] ?? 0;
  let least = areas[first] ?? 0, most = least, several = false;
  for (let at = begin + 1; at < end; at++) {
    const flat = of[third(order[at] ?? 0)] ?? 0;
    if (flat === first) continue;
    several = true;
    const area = areas[flat] ?? 0;
    if (area < least && area > 0) least = area;
    if (area > most) most = area;
  }
  return several ? Math.max(1 + Number.EPSILON, most / least) : 1;
}

/** To the bit, so that nothing is predicted of a plane. */
function copyFlat({ of, normals }: Flats, { order, starts }: Fans, fan: number, found: Float32Array): void {
  const flat = of[third(order[starts[fan] ?? 0] ?? 0)] ?? 0;
  for (let k = 0; k < 3; k++) found[3 * fan + k] = normals[3 * flat + k] ?? 0;
}

/** Adds up the fan's flats by each weight. Neighbouring corners of one flat are one run. */
function addRuns(facets: OutwardFacets, { of, areas, normals }: Flats, { order, starts, closed }: Fans, fan: number, sums: Float64Array): void {
  const begin = starts[fan] ?? 0, length = (starts[fan + 1] ?? 0) - begin;
  let offset = 0, largest = 0;
  for (let k = begin; k < begin + length; k++) largest = Math.max(largest, areas[of[third(order[k] ?? 0)] ?? 0] ?? 0);
  // A fan that comes round may begin in the middle of a flat.
  const lastFlat = of[third(order[begin + length - 1] ?? 0)];
  if (closed[fan] === 1) while (offset < length - 1 && of[third(order[begin + offset] ?? 0)] === lastFlat) offset += 1;
  for (let k = offset; k < offset + length; ) {
    const first = order[begin + (k < length ? k : k - length)] ?? 0;
    const flat = of[third(first)] ?? 0;
    let last = first, angle = 0;
    for (; k < offset + length; k++) {
      const corner = order[begin + (k < length ? k : k - length)] ?? 0;
      if (of[third(corner)] !== flat) break;
      last = corner;
      angle += measureAngle(facets, corner);
    }
    // Over the largest, so that the fourth power stays in range.
    const square = ((areas[flat] ?? 0) / largest) * ((areas[flat] ?? 0) / largest);
    addFlat(sums, 0, angle, normals, flat);
    addFlat(sums, 3, weighByProduct(facets, normals, flat, first, last), normals, flat);
    addFlat(sums, 6, square, normals, flat);
    addFlat(sums, 9, square * square, normals, flat);
  }
}

function addFlat(sums: Float64Array, at: number, weight: number, normals: Float64Array, flat: number): void {
  sums[at] = (sums[at] ?? 0) + weight * (normals[3 * flat] ?? 0);
  sums[at + 1] = (sums[at + 1] ?? 0) + weight * (normals[3 * flat + 1] ?? 0);
  sums[at + 2] = (sums[at + 2] ?? 0) + weight * (normals[3 * flat + 2] ?? 0);
}

function measureAngle({ corners, places }: OutwardFacets, corner: number): number {
  const o = 3 * (corners[corner] ?? 0), a = 3 * (corners[next(corner)] ?? 0), b = 3 * (corners[previous(corner)] ?? 0);
  let along = 0, uu = 0, vv = 0;
  for (let k = 0; k < 3; k++) {
    const u = (places[a + k] ?? 0) - (places[o + k] ?? 0), v = (places[b + k] ?? 0) - (places[o + k] ?? 0);
    along += u * v;
    uu += u * u;
    vv += v * v;
  }
  const size = Math.sqrt(uu * vv);
  return size > 0 ? findAngle(along / size) : 0;
}

/** The angle of a cosine to some 1e-6, without trigonometry: halved three times, then by the series of the inverse sine. */
function findAngle(cosine: number): number {
  let c = Math.min(1, Math.max(-1, cosine));
  for (let k = 0; k < 2; k++) c = Math.sqrt(Math.max(0, (1 + c) / 2));
  const s = Math.sqrt(Math.max(0, (1 - c) / 2));
  const ss = s * s;
  return 8 * s * (1 + ss * (1 / 6 + ss * (3 / 40 + ss * (5 / 112 + ss * (35 / 1152)))));
}

/** sin α / (|a| |b|) for the outer edges a and b of a run; nothing where they enclose a straight angle or more. */
function weighByProduct({ corners, places }: OutwardFacets, normals: Float64Array, flat: number, first: number, last: number): number {
  const o = 3 * (corners[first] ?? 0), a = 3 * (corners[next(first)] ?? 0), b = 3 * (corners[previous(last)] ?? 0);
  const ux = (places[a] ?? 0) - (places[o] ?? 0), uy = (places[a + 1] ?? 0) - (places[o + 1] ?? 0), uz = (places[a + 2] ?? 0) - (places[o + 2] ?? 0);
  const vx = (places[b] ?? 0) - (places[o] ?? 0), vy = (places[b + 1] ?? 0) - (places[o + 1] ?? 0), vz = (places[b + 2] ?? 0) - (places[o + 2] ?? 0);
  const out = (uy * vz - uz * vy) * (normals[3 * flat] ?? 0) + (uz * vx - ux * vz) * (normals[3 * flat + 1] ?? 0) + (ux * vy - uy * vx) * (normals[3 * flat + 2] ?? 0);
  const sizes = (ux * ux + uy * uy + uz * uz) * (vx * vx + vy * vy + vz * vz);
  return out > 0 && sizes > 0 ? out / sizes : 0;
}
