import type { LineSegment, Vector3 } from '../measurement';
import type { WeldedMesh } from '../weld-corners';
import { pointOf } from './notes';

/** Where two facets meet that pass through each other, to the rounding; of two in one plane, the longest side of the second. */
export function findCrossingLine(mesh: WeldedMesh, one: number, two: number): LineSegment {
  const a = cornersOf(mesh, one), b = cornersOf(mesh, two);
  const ends = [...crossPlane(a, b), ...crossPlane(b, a)];
  if (ends.length < 4) return longestSide(b);
  const [first, second] = ends as [Vector3, Vector3];
  const direction = subtract(second, first);
  const along = (point: Vector3): number => dot(subtract(point, first), direction);
  // Of the four ends on the line, the two in the middle bound what both have.
  const [, from, to] = [...ends].sort((p, q) => along(p) - along(q));
  return [...(from ?? first), ...(to ?? second)].map((coordinate) => coordinate + 0) as LineSegment;
}

type Corners = readonly [Vector3, Vector3, Vector3];

const cornersOf = (mesh: WeldedMesh, facet: number): Corners => [0, 1, 2].map((k) => pointOf(mesh, mesh.corners[3 * facet + k] ?? 0)) as unknown as Corners;
const subtract = (p: Vector3, q: Vector3): Vector3 => [p[0] - q[0], p[1] - q[1], p[2] - q[2]];
const dot = (p: Vector3, q: Vector3): number => p[0] * q[0] + p[1] * q[1] + p[2] * q[2];

/** The two points at which the sides of a facet cross the plane of another; none where they don't. */
function crossPlane(facet: Corners, [p, q, r]: Corners): Vector3[] {
  const e = subtract(q, p), f = subtract(r, p);
  const normal: Vector3 = [e[1] * f[2] - e[2] * f[1], e[2] * f[0] - e[0] * f[2], e[0] * f[1] - e[1] * f[0]];
  const heights = facet.map((corner) => dot(normal, subtract(corner, p)));
  const points: Vector3[] = [];
  for (let k = 0; k < 3; k++) {
    const from = facet[k] ?? p, to = facet[(k + 1) % 3] ?? p;
    const here = heights[k] ?? 0, there = heights[(k + 1) % 3] ?? 0;
    if (here > 0 === there > 0 || here === there) continue;
    const share = here / (here - there);
    points.push([from[0] + share * (to[0] - from[0]), from[1] + share * (to[1] - from[1]), from[2] + share * (to[2] - from[2])]);
  }
  return points.length === 2 ? points : [];
}

function longestSide(corners: Corners): LineSegment {
  let longest: LineSegment = [...corners[0], ...corners[1]];
  let square = -1;
  for (let k = 0; k < 3; k++) {
    const from = corners[k] ?? corners[0], to = corners[(k + 1) % 3] ?? corners[0];
    const side = subtract(to, from);
    if (dot(side, side) <= square) continue;
    square = dot(side, side);
    longest = [...from, ...to];
  }
  return longest;
}
