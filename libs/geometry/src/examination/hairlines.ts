import type { BoundaryLoop, Vector3 } from '../measurement';
import type { WeldedMesh } from '../weld-corners';
import { findLoopWidth, findSeamWidth } from './loop-width';
import type { Loop } from './loops';
import { pointOf } from './notes';

/** What counts as a hairline: a gap of this share of the box's diagonal, and a lost volume under this share of the volume. */
export const hairlineWidth = 1e-5;
export const hairlineVolume = 1e-4;

/** More loops that don't close by themselves than this are not held against each other. */
const mostSeams = 2000;

/** A loop with its figures. */
export interface MeasuredLoop {
  loop: Loop;
  length: number;
  centre: Vector3;
  /** Largest distance of a vertex from the centre. */
  reach: number;
}

export interface Hairlines {
  /** Of each loop, what would have to be moved to close it, by itself or against the loop it lies along. */
  widths: number[];
  /** Loops that lie along each other: two pieces of the mesh that were not joined. */
  seams: [number, number][];
  /** The most that the volume can be wrong by. */
  lostVolume: number;
}

export function measureLoop(mesh: WeldedMesh, loop: Loop): MeasuredLoop {
  const points = loop.vertices.map((vertex) => pointOf(mesh, vertex));
  const [first = [0, 0, 0]] = points;
  let length = 0;
  const sum: Vector3 = [0, 0, 0];
  for (let k = 0; k < points.length; k++) {
    const p = points[k] ?? first, q = points[(k + 1) % points.length] ?? first;
    const step = distanceOf(p, q);
    length += step;
    for (let axis = 0; axis < 3; axis++) sum[axis] = (sum[axis] ?? 0) + step * ((p[axis] ?? 0) - (first[axis] ?? 0) + ((q[axis] ?? 0) - (first[axis] ?? 0))) * 0.5;
  }
  const along = (axis: number): number => (first[axis] ?? 0) + (length > 0 ? (sum[axis] ?? 0) / length : 0) + 0;
  const centre: Vector3 = [along(0), along(1), along(2)];
  return { loop, length, centre, reach: points.reduce((most, point) => Math.max(most, distanceOf(point, centre)), 0) };
}

export const toBoundaryLoop = (mesh: WeldedMesh, { loop, length, centre }: MeasuredLoop, width?: number): BoundaryLoop => ({
  edges: loop.vertices.length,
  length,
  centre,
  width: width ?? findLoopWidth(mesh, loop.vertices),
});

/**
 * Whether all loops are hairlines: each closes by moving its sides by no more than the tolerance, by itself or against another loop that lies along it.
 *
 * The bound on the lost volume. Fanning a loop of length L to its centre, at most r away from it, closes the mesh. What would truly close it is a ribbon between
 * the two sides of the gap, of width w and so of an area of at most L w. Fan and ribbon enclose the cone over the ribbon from the centre, at most L w (r + w)/3.
 * Where the sides were brought together instead, the facets at the gap would move by at most w: at most w A/3, A being their area. Two loops that lie along
 * each other have each their own fan; between those lies at most half of L r d/3, d being the distance of the centres. All are added.
 *
 * @returns undefined where one of the loops is wider, or winds both ways
 */
export function findHairlines(mesh: WeldedMesh, loops: readonly MeasuredLoop[], diagonal: number): Hairlines | undefined {
  const most = hairlineWidth * diagonal;
  if (loops.some(({ loop }) => !loop.followable)) return undefined;
  const widths: number[] = [];
  const wide: number[] = [];
  for (const [k, { loop }] of loops.entries()) {
    widths[k] = findLoopWidth(mesh, loop.vertices);
    if ((widths[k] ?? 0) > most && wide.push(k) > mostSeams) return undefined;
  }
  const seams = findSeams(mesh, loops, wide, widths, most);
  return seams && { widths, seams, lostVolume: boundLostVolume(mesh, loops, widths, seams) };
}

/** Pairs of loops that lie along each other; their widths become that of the seam. Undefined where a loop is left over. */
function findSeams(mesh: WeldedMesh, loops: readonly MeasuredLoop[], wide: readonly number[], widths: number[], most: number): [number, number][] | undefined {
  const seams: [number, number][] = [];
  const left = new Set(wide);
  for (const one of wide) {
    if (!left.delete(one)) continue;
    const first = loops[one];
    const partner = [...left].find((two) => {
      const second = loops[two];
      if (first === undefined || second === undefined || distanceOf(first.centre, second.centre) > 4 * most) return false;
      const width = findSeamWidth(mesh, first.loop.vertices, second.loop.vertices, 2 * most);
      if (width > most) return false;
      widths[one] = widths[two] = width;
      return true;
    });
    if (partner === undefined) return undefined;
    left.delete(partner);
    seams.push([one, partner]);
  }
  return seams;
}

function boundLostVolume(mesh: WeldedMesh, loops: readonly MeasuredLoop[], widths: readonly number[], seams: readonly (readonly [number, number])[]): number {
  let threefold = 0;
  for (const [k, { length, reach }] of loops.entries()) threefold += length * (widths[k] ?? 0) * (reach + (widths[k] ?? 0));
  for (const [one, two] of seams) {
    const first = loops[one], second = loops[two];
    if (first !== undefined && second !== undefined) threefold += (Math.max(first.length, second.length) * Math.max(first.reach, second.reach) * distanceOf(first.centre, second.centre)) / 2;
  }
  return (threefold + widths.reduce((most, width) => Math.max(most, width), 0) * findAreaAt(mesh, loops)) / 3;
}

/** Area of all facets with a corner at one of the loops. */
function findAreaAt(mesh: WeldedMesh, loops: readonly MeasuredLoop[]): number {
  const isAtLoop = new Uint8Array(mesh.vertexCount);
  for (const { loop } of loops) for (const vertex of loop.vertices) isAtLoop[vertex] = 1;
  let twofold = 0;
  for (let facet = 0; facet < mesh.facetCount; facet++) {
    const [a, b, c] = [mesh.corners[3 * facet] ?? 0, mesh.corners[3 * facet + 1] ?? 0, mesh.corners[3 * facet + 2] ?? 0];
    if (isAtLoop[a] !== 1 && isAtLoop[b] !== 1 && isAtLoop[c] !== 1) continue;
    const [p, q, r] = [pointOf(mesh, a), pointOf(mesh, b), pointOf(mesh, c)];
    const ex = q[0] - p[0], ey = q[1] - p[1], ez = q[2] - p[2], fx = r[0] - p[0], fy = r[1] - p[1], fz = r[2] - p[2];
    const nx = ey * fz - ez * fy, ny = ez * fx - ex * fz, nz = ex * fy - ey * fx;
    twofold += Math.sqrt(nx * nx + ny * ny + nz * nz);
  }
  return twofold / 2;
}

function distanceOf(p: Vector3, q: Vector3): number {
  const x = p[0] - q[0], y = p[1] - q[1], z = p[2] - q[2];
  return Math.sqrt(x * x + y * y + z * z);
}
