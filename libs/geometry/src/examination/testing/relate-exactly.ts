/**
 * The judge of `relateFacets`: exact rational arithmetic, by another formulation. Two facets in different planes pass through each other where their interiors
 * have a point in common: each is cut by the other's plane into a stretch of the common line, whose ends are compared as fractions. Two in one plane
 * lie upon each other where one, clipped by the sides of the other, has an area left.
 */
type Whole = [bigint, bigint, bigint];
interface Fraction {
  n: bigint;
  d: bigint;
}

/** Multiples of 2⁻⁶⁰ as whole numbers. */
function toWhole(coordinate: number): bigint {
  const scaled = coordinate * 2 ** 60;
  if (!Number.isInteger(scaled)) throw new Error(`${coordinate} is no multiple of 2^-60.`);
  return BigInt(scaled);
}

const subtract = (p: Whole, q: Whole): Whole => [p[0] - q[0], p[1] - q[1], p[2] - q[2]];
const cross = (p: Whole, q: Whole): Whole => [p[1] * q[2] - p[2] * q[1], p[2] * q[0] - p[0] * q[2], p[0] * q[1] - p[1] * q[0]];
const dot = (p: Whole, q: Whole): bigint => p[0] * q[0] + p[1] * q[1] + p[2] * q[2];
const isZero = (p: Whole): boolean => p.every((coordinate) => coordinate === 0n);

const isLess = (p: Fraction, q: Fraction): boolean => p.n * q.d < q.n * p.d;

/** @param corners nine coordinates each */
export function relateExactly(one: ArrayLike<number>, two: ArrayLike<number>): 'crossing' | 'upon' | 'against' | undefined {
  const p = readCorners(one), q = readCorners(two);
  const n = normalOf(p), m = normalOf(q);
  if (isZero(n) || isZero(m)) return undefined;
  const direction = cross(n, m);
  if (isZero(direction)) {
    if (dot(n, subtract(q[0], p[0])) !== 0n || !overlapInPlane(p, q, n)) return undefined;
    return dot(n, m) > 0n ? 'upon' : 'against';
  }
  const s = cutByPlane(p, m, q[0], direction), t = cutByPlane(q, n, p[0], direction);
  return s !== undefined && t !== undefined && isLess(s[0], t[1]) && isLess(t[0], s[1]) ? 'crossing' : undefined;
}

type Corners = [Whole, Whole, Whole];

const readCorners = (corners: ArrayLike<number>): Corners => [0, 3, 6].map((k) => [toWhole(corners[k] ?? 0), toWhole(corners[k + 1] ?? 0), toWhole(corners[k + 2] ?? 0)]) as Corners;
const normalOf = ([a, b, c]: Corners): Whole => cross(subtract(b, a), subtract(c, a));

/** The stretch along the direction in which a plane cuts through the interior of a facet; undefined where it doesn't. */
function cutByPlane(facet: Corners, normal: Whole, point: Whole, direction: Whole): [Fraction, Fraction] | undefined {
  const heights = facet.map((corner) => dot(normal, subtract(corner, point)));
  if (!heights.some((height) => height > 0n) || !heights.some((height) => height < 0n)) return undefined;
  const places: Fraction[] = [];
  for (let k = 0; k < 3; k++) {
    const [a, b] = [facet[k], facet[(k + 1) % 3]] as [Whole, Whole];
    const here = heights[k] ?? 0n, there = heights[(k + 1) % 3] ?? 0n;
    if (here === 0n) places.push({ n: dot(direction, a), d: 1n });
    if (here * there >= 0n) continue;
    // a + here/(here - there) · (b - a), with a positive denominator.
    const span = here - there;
    const along = dot(direction, a) * span + here * dot(direction, subtract(b, a));
    places.push(span > 0n ? { n: along, d: span } : { n: -along, d: -span });
  }
  const [first, second] = places as [Fraction, Fraction];
  return isLess(first, second) ? [first, second] : [second, first];
}

type Place = [Fraction, Fraction];
const combine = (p: Fraction, q: Fraction, share: Fraction): Fraction => ({ n: p.n * q.d * share.d + share.n * (q.n * p.d - p.n * q.d), d: p.d * q.d * share.d });

function overlapInPlane(p: Corners, q: Corners, normal: Whole): boolean {
  const drop = normal.findIndex((coordinate) => coordinate !== 0n);
  const [i, j] = [(drop + 1) % 3, (drop + 2) % 3] as [number, number];
  const flat = (corners: Corners): Place[] => corners.map((corner) => [{ n: corner[i] ?? 0n, d: 1n }, { n: corner[j] ?? 0n, d: 1n }]);
  let left = flat(q);
  const clip = flat(p);
  const sense = areaSign(clip);
  for (let k = 0; k < 3; k++) left = clipBySide(left, clip[k] as Place, clip[(k + 1) % 3] as Place, sense);
  return left.length > 2 && areaSign(left) !== 0n;
}

/** (b - a) × (c - a), as a fraction. */
function turnOf(a: Place, b: Place, c: Place): Fraction {
  const less = (p: Fraction, q: Fraction): Fraction => ({ n: p.n * q.d - q.n * p.d, d: p.d * q.d });
  const times = (p: Fraction, q: Fraction): Fraction => ({ n: p.n * q.n, d: p.d * q.d });
  return less(times(less(b[0], a[0]), less(c[1], a[1])), times(less(b[1], a[1]), less(c[0], a[0])));
}

const signOf = ({ n, d }: Fraction): bigint => (n === 0n ? 0n : n > 0n === d > 0n ? 1n : -1n);

/** Sign of twice the area of a convex polygon: all triangles of its fan agree, and one may be flat. */
function areaSign(polygon: readonly Place[]): bigint {
  for (let k = 1; k + 1 < polygon.length; k++) {
    const sign = signOf(turnOf(polygon[0] as Place, polygon[k] as Place, polygon[k + 1] as Place));
    if (sign !== 0n) return sign;
  }
  return 0n;
}

/** What of a convex polygon lies on the inner side of a line. */
function clipBySide(polygon: readonly Place[], from: Place, to: Place, sense: bigint): Place[] {
  const kept: Place[] = [];
  for (const [k, point] of polygon.entries()) {
    const next = polygon[(k + 1) % polygon.length] as Place;
    const here = turnOf(from, to, point), there = turnOf(from, to, next);
    if (signOf(here) * sense >= 0n) kept.push(point);
    if (signOf(here) * signOf(there) >= 0n) continue;
    const share: Fraction = { n: here.n * there.d, d: here.n * there.d - there.n * here.d };
    kept.push([combine(point[0], next[0], share), combine(point[1], next[1], share)]);
  }
  return kept;
}
