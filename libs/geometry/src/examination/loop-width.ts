import type { Vector3 } from '../measurement';
import type { WeldedMesh } from '../weld-corners';
import { pointOf } from './notes';

/** How many places of a loop are tried as the end of its gap. */
const sharpestTried = 12;

/**
 * How far apart the two sides of a loop are: the loop is closed like a zip fastener, from one end of the gap on both sides at once, always on the side where the
 * next vertex is nearer to the other; the largest of those distances is what would have to be moved. Of several places to begin at, the sharpest corners and
 * the ends of the shortest edge, the one that gives least counts. Never less than the gap; more where a better place was not tried.
 */
export function findLoopWidth(mesh: WeldedMesh, vertices: readonly number[]): number {
  const points = vertices.map((vertex) => pointOf(mesh, vertex));
  let width = Infinity;
  for (const start of findEnds(points)) {
    const turnedBack = (k: number): number => (start - k + points.length) % points.length;
    width = Math.min(width, zip(points.length - 1, (k) => at(points, start + k), points.length - 1, (k) => at(points, turnedBack(k)), points.length - 1, width));
  }
  return width;
}

/** The same for two loops that lie along each other, the second running the other way; no less than `most` where they don't. */
export function findSeamWidth(mesh: WeldedMesh, one: readonly number[], two: readonly number[], most: number): number {
  const points = one.map((vertex) => pointOf(mesh, vertex));
  const others = two.map((vertex) => pointOf(mesh, vertex)).reverse();
  const [begin] = points;
  if (begin === undefined) return Infinity;
  let nearest = 0;
  let distance = Infinity;
  for (let k = 0; k < others.length; k++) {
    const found = distanceToSegment(begin, at(others, k), at(others, k + 1));
    if (found >= distance) continue;
    distance = found;
    nearest = k;
  }
  // The second loop begins where it is nearest to the beginning of the first, within one of its edges as a rule.
  const around = [nearestOnSegment(begin, at(others, nearest), at(others, nearest + 1)), ...others.slice(nearest + 1), ...others.slice(0, nearest + 1)];
  return Math.max(distance, zip(points.length, (k) => at(points, k), around.length, (k) => at(around, k), points.length + around.length, most));
}

const at = (points: readonly Vector3[], k: number): Vector3 => points[k % points.length] ?? [0, 0, 0];

/** Goes along two lines at once, `steps` steps in all; the largest distance of a vertex to the other line's edge that is being passed. Stops beyond `most`. */
function zip(n: number, one: (k: number) => Vector3, m: number, two: (k: number) => Vector3, steps: number, most: number): number {
  let i = 0;
  let j = 0;
  let width = 0;
  for (let step = 0; step < steps && width < most; step++) {
    const p = one(i), q = two(j);
    const forward = i < n ? distanceToSegment(one(i + 1), q, j < m ? two(j + 1) : q) : Infinity;
    const backward = j < m ? distanceToSegment(two(j + 1), p, i < n ? one(i + 1) : p) : Infinity;
    if (forward <= backward) i += 1;
    else j += 1;
    width = Math.max(width, Math.min(forward, backward));
  }
  return width;
}

/** Places of the sharpest corners, and both ends of the shortest edge. */
function findEnds(points: readonly Vector3[]): Set<number> {
  const corners = points.map((point, k) => {
    const back = subtract(at(points, k + points.length - 1), point), on = subtract(at(points, k + 1), point);
    const lengths = Math.sqrt(dot(back, back)) * Math.sqrt(dot(on, on));
    return { k, length: dot(on, on), cosine: lengths > 0 ? dot(back, on) / lengths : 1 };
  });
  const shortest = corners.reduce((least, corner) => (corner.length < least.length ? corner : least)).k;
  const sharpest = corners.sort((one, two) => two.cosine - one.cosine || one.k - two.k).slice(0, sharpestTried);
  return new Set([...sharpest.map(({ k }) => k), shortest, (shortest + 1) % points.length]);
}

const subtract = (p: Vector3, q: Vector3): Vector3 => [p[0] - q[0], p[1] - q[1], p[2] - q[2]];
const dot = (p: Vector3, q: Vector3): number => p[0] * q[0] + p[1] * q[1] + p[2] * q[2];

function nearestOnSegment(point: Vector3, from: Vector3, to: Vector3): Vector3 {
  const edge = subtract(to, from);
  const square = dot(edge, edge);
  const share = square > 0 ? Math.min(1, Math.max(0, dot(subtract(point, from), edge) / square)) : 0;
  return [from[0] + share * edge[0], from[1] + share * edge[1], from[2] + share * edge[2]];
}

function distanceToSegment(point: Vector3, from: Vector3, to: Vector3): number {
  const rest = subtract(point, nearestOnSegment(point, from, to));
  return Math.sqrt(dot(rest, rest));
}
