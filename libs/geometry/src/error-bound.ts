import { sizes, sumsOfBody, sumsOfSurface, type FacetSums } from './facet-sums';

/**
 * Roundings of a kernel in units of its roundoff: of the content relative to the products that make it up, of the first and of the second moments relative to
 * those times lengths.
 */
export interface KernelRoundings {
  readonly roundoff: number;
  readonly content: number;
  readonly first: number;
  readonly second: number;
}

/**
 * The usual kernel. Content: 7 sums of a lane's eight facets; of the determinant two differences of an edge, a product and a difference, the corner's own
 * difference, a product and two sums. First moments: the sum of three corners, within √3 of the root of their squares (6), and a product more. Second moments: a square of the sum of corners
 * within √3 of their squares' sum (11), the sums of squares (6) and a product. The folding by two-sum rounds in the square of the roundoff.
 */
export const blockedRoundings: KernelRoundings = { roundoff: 1.1102230246251565e-16, content: 15, first: 22, second: 33 };

/**
 * The careful kernel: an operation of double-double is within 3 · 2⁻¹⁰⁶ at most (Joldes, Muller & Popescu 2017, "Tight and rigorous error bounds for basic building blocks of
 * double-word arithmetic"), and a sum over n facets within n times that of their sizes: for 50 million facets, with the two dozen operations of each, less than 2⁻⁷⁸.
 */
export const doubleDoubleRoundings: KernelRoundings = { roundoff: 3.308722450212111e-24, content: 1, first: 1, second: 1 };

/** Each figure is rounded twice at most on its way out. */
const finishing = 2.220446049250313e-16;

/**
 * A bound on what rounding does to the integrals that are finished from sums, in the natural scale: content relative to itself, centroid to the diagonal,
 * second moments about the centroid to content times diagonal². Infinite where the content may be zero.
 *
 * @param diagonal of the box of what is integrated; the local origin lies in that box
 */
export function computeErrorBound(sums: FacetSums, of: 'body' | 'surface', diagonal: number, { roundoff, content, first, second }: KernelRoundings): number {
  const [at, sizeAt, secondAt, firstDivisor, secondDivisor, contentDivisor] =
    of === 'body' ? [sumsOfBody, sizes.determinant, sizes.determinantSecond, 24, 120, 6] : [sumsOfSurface, sizes.cross, sizes.crossSecond, 6, 24, 2];
  const total = Math.abs((sums.high[at] ?? 0) + (sums.low[at] ?? 0)) / contentDivisor;
  const size = sums.sizes[sizeAt] ?? 0;
  const sizeSecond = sums.sizes[secondAt] ?? 0;
  const contentError = (content * roundoff * size) / contentDivisor / total;
  if (!(contentError < 1)) return Infinity;
  // By Cauchy and Schwarz, sizes times the length of the sum of corners are at most this.
  const firstError = (first * roundoff * Math.sqrt(size) * Math.sqrt(sizeSecond)) / firstDivisor / total / diagonal;
  const secondError = (second * roundoff * sizeSecond) / secondDivisor / total / diagonal / diagonal;
  const centre = findCentre(sums, at, firstDivisor, total) / diagonal;
  const centreError = (firstError + contentError * centre) / (1 - contentError);
  // Second moments are shifted by first moment times centre: each brings its error times the other's size.
  const shiftedError = secondError + (firstError + centreError) * centre + firstError * centreError;
  return Math.max(contentError, centreError, shiftedError) + finishing;
}

/** Distance of the centroid from the local origin. */
function findCentre(sums: FacetSums, at: number, firstDivisor: number, total: number): number {
  const [x = 0, y = 0, z = 0] = sums.high.subarray(at + 1, at + 4);
  // Squares of fourth powers would leave the range at either end; a power of two changes no other bit.
  const largest = Math.max(Math.abs(x), Math.abs(y), Math.abs(z));
  const unit = largest > 1e150 ? 6.223015277861142e-61 : largest < 1e-100 ? 2.037035976334486e90 : 1;
  const [a, b, c] = [x * unit, y * unit, z * unit];
  return Math.sqrt(a * a + b * b + c * c) / unit / firstDivisor / total;
}
