import type { IntegralChange } from '../measurement';
import { none, next } from './pair-edges';
import { sharp, third, turnCosine, type Flats } from './merge-flats';
import type { OutwardFacets } from './read-facets';

export interface PredictedChange {
  body: IntegralChange;
  area: number;
}

/** Steeper than this a patch over a facet is taken for noise of its normals. */
const steepest = 0.5;

/** What the bulges change: δ∫f dV = Σ ∫ f h dA over the facets, exactly for a height h = Σ b_ij λ_i λ_j and f of second degree; and the area. */
export function sumBulges(facets: OutwardFacets, flats: Flats, partners: Uint32Array, bulges: Float64Array): PredictedChange {
  const sums = new Float64Array(10);
  let area = 0;
  for (let facet = 0; facet < facets.count; facet++) {
    const at = 3 * facet;
    if (!((facets.areas[facet] ?? 0) > 0)) continue;
    for (let half = at; half < at + 3; half++) {
      if (bulges[half] !== 0) addEdge(facets, facet, half, bulges[half] ?? 0, sums);
      area += spreadEdge(facets, flats, partners, bulges, half);
    }
    area += stretchFacet(facets, facet, bulges);
  }
  const [content = 0, x = 0, y = 0, z = 0, xx = 0, yy = 0, zz = 0, xy = 0, yz = 0, zx = 0] = sums;
  // Never -0.
  return { body: { content: content + 0, first: [x + 0, y + 0, z + 0], second: { xx: xx + 0, yy: yy + 0, zz: zz + 0, xy: xy + 0, yz: yz + 0, zx: zx + 0 } }, area: area + 0 };
}

/** One edge's share: b A/12, b A/60 (s + q) and b A/180 (s sᵀ + q qᵀ + p pᵀ + r rᵀ), for its ends p and r, q = p + r, s = q + the third corner. */
function addEdge({ corners, places, areas }: OutwardFacets, facet: number, half: number, bulge: number, sums: Float64Array): void {
  const p = 3 * (corners[half] ?? 0), r = 3 * (corners[next(half)] ?? 0), o = 3 * (corners[next(next(half))] ?? 0);
  const weight = bulge * (areas[facet] ?? 0);
  const px = places[p] ?? 0, py = places[p + 1] ?? 0, pz = places[p + 2] ?? 0;
  const rx = places[r] ?? 0, ry = places[r + 1] ?? 0, rz = places[r + 2] ?? 0;
  const qx = px + rx, qy = py + ry, qz = pz + rz;
  const sx = qx + (places[o] ?? 0), sy = qy + (places[o + 1] ?? 0), sz = qz + (places[o + 2] ?? 0);
  const second = weight / 180;
  sums[0] = (sums[0] ?? 0) + weight / 12;
  sums[1] = (sums[1] ?? 0) + (weight / 60) * (sx + qx);
  sums[2] = (sums[2] ?? 0) + (weight / 60) * (sy + qy);
  sums[3] = (sums[3] ?? 0) + (weight / 60) * (sz + qz);
  sums[4] = (sums[4] ?? 0) + second * (sx * sx + qx * qx + px * px + rx * rx);
  sums[5] = (sums[5] ?? 0) + second * (sy * sy + qy * qy + py * py + ry * ry);
  sums[6] = (sums[6] ?? 0) + second * (sz * sz + qz * qz + pz * pz + rz * rz);
  sums[7] = (sums[7] ?? 0) + second * (sx * sy + qx * qy + px * py + rx * ry);
  sums[8] = (sums[8] ?? 0) + second * (sy * sz + qy * qz + py * pz + ry * rz);
  sums[9] = (sums[9] ?? 0) + second * (sz * sx + qz * qx + pz * px + rz * rx);
}

/**
 * What a facet gains in its own plane when its edge moves out to the curve, b L/6 times the part of the way that lies in the plane. The way is the one
 * vector whose parts along both normals are the two bulges.
 */
function spreadEdge(facets: OutwardFacets, { of, normals, kinds }: Flats, partners: Uint32Array, bulges: Float64Array, half: number): number {
  const partner = partners[half] ?? none;
  const own = bulges[half] ?? 0, other = bulges[partner] ?? 0;
  if (partner === none || (own === 0 && other === 0)) return 0;
  const one = of[third(half)] ?? 0, two = of[third(partner)] ?? 0;
  if (one === two) return 0;
  const cosine = turnCosine(normals, one, two);
  const { length, sine } = turnAlong(facets, normals, half, one, two);
  if (kinds[half] !== sharp) return (((own * sine) / (1 + cosine)) * length) / 6;
  return Math.abs(sine) > 0.1 ? (((other - own * cosine) / sine) * length) / 6 : 0;
}

/** Length of an edge, and sine of the turn about it: positive where the body is convex. */
function turnAlong({ corners, places }: OutwardFacets, n: Float64Array, half: number, one: number, two: number): { length: number; sine: number } {
  const a = 3 * (corners[half] ?? 0), b = 3 * (corners[next(half)] ?? 0), i = 3 * one, j = 3 * two;
  const x = (places[b] ?? 0) - (places[a] ?? 0), y = (places[b + 1] ?? 0) - (places[a + 1] ?? 0), z = (places[b + 2] ?? 0) - (places[a + 2] ?? 0);
  const length = Math.sqrt(x * x + y * y + z * z);
  const turn =
    x * ((n[i + 1] ?? 0) * (n[j + 2] ?? 0) - (n[i + 2] ?? 0) * (n[j + 1] ?? 0)) +
    y * ((n[i + 2] ?? 0) * (n[j] ?? 0) - (n[i] ?? 0) * (n[j + 2] ?? 0)) +
    z * ((n[i] ?? 0) * (n[j + 1] ?? 0) - (n[i + 1] ?? 0) * (n[j] ?? 0));
  return { length, sine: length > 0 ? turn / length : 0 };
}

/** ½ ∫ |∇h|² dA: at the middle of each edge the gradient is its length times (what the other two bulge less what it does) over 4 A. */
function stretchFacet({ corners, places, areas }: OutwardFacets, facet: number, bulges: Float64Array): number {
  const at = 3 * facet, area = areas[facet] ?? 0;
  const total = (bulges[at] ?? 0) + (bulges[at + 1] ?? 0) + (bulges[at + 2] ?? 0);
  let sum = 0;
  for (let half = at; half < at + 3; half++) {
    const rise = total - 2 * (bulges[half] ?? 0);
    if (rise === 0) continue;
    const a = 3 * (corners[half] ?? 0), b = 3 * (corners[next(half)] ?? 0);
    const x = (places[b] ?? 0) - (places[a] ?? 0), y = (places[b + 1] ?? 0) - (places[a + 1] ?? 0), z = (places[b + 2] ?? 0) - (places[a + 2] ?? 0);
    const slope = Math.min(steepest, (Math.sqrt(x * x + y * y + z * z) * Math.abs(rise)) / (4 * area));
    sum += slope * slope;
  }
  return (area * sum) / 6;
}
