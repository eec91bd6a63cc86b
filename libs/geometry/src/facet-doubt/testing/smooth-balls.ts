import { shapesOf, type GridPoint } from './smooth-grids';
import { integrate, type SmoothBody, type SmoothTruth } from './smooth-truth';
import { stretch, type Corners, type Point } from '../../testing/shapes';

/** The ellipsoid with these semi-axes about the origin. */
export function ellipsoidTruth([a, b, c]: Point): SmoothTruth {
  const volume = (4 / 3) * Math.PI * a * b * c;
  // The area is that of the unit sphere's elements, each stretched: over heights by Gauss, around by even steps, which is as exact for what comes round again.
  const around = 512;
  const ring = (z: number): number => {
    const r = Math.sqrt(1 - z * z);
    let sum = 0;
    for (let k = 0; k < around; k++) {
      const angle = (2 * Math.PI * (k + 0.5)) / around;
      sum += Math.hypot(b * c * r * Math.cos(angle), c * a * r * Math.sin(angle), a * b * z);
    }
    return (2 * Math.PI * sum) / around;
  };
  const area = integrate(ring, -1, 0, 4) + integrate(ring, 0, 1, 4);
  return { volume, area, centre: [0, 0, 0], second: { xx: (volume * a * a) / 5, yy: (volume * b * b) / 5, zz: (volume * c * c) / 5, xy: 0, yz: 0, zx: 0 } };
}

/** A unit ball of meridians and parallels, its inner points shifted along the surface by up to `jitter` of a step. */
export function ballCorners(segments: number, stacks: number, jitter = 0, draw: () => number = () => 0.5): Corners {
  const shift = Array.from({ length: (stacks + 1) * segments * 2 }, () => jitter * (2 * draw() - 1));
  return shapesOf(stacks, segments, (i, j): GridPoint => {
    if (i === 0 || i === stacks) return { point: [0, 0, i === 0 ? -1 : 1], pole: true };
    const at = 2 * (i * segments + (j % segments));
    const height = -Math.PI / 2 + (Math.PI * (i + (shift[at] ?? 0))) / stacks;
    const angle = (2 * Math.PI * ((j % segments) + (shift[at + 1] ?? 0))) / segments;
    return { point: [Math.cos(height) * Math.cos(angle), Math.cos(height) * Math.sin(angle), Math.sin(height)], pole: false };
  });
}

/** A unit ball from an icosahedron, each of its edges cut into `parts`, all points drawn out to the sphere. */
export function icosahedralCorners(parts: number): Corners {
  const g = (1 + Math.sqrt(5)) / 2;
  const vertices: Point[] = [[-1, g, 0], [1, g, 0], [-1, -g, 0], [1, -g, 0], [0, -1, g], [0, 1, g], [0, -1, -g], [0, 1, -g], [g, 0, -1], [g, 0, 1], [-g, 0, -1], [-g, 0, 1]];
  const faces = [[0, 11, 5], [0, 5, 1], [0, 1, 7], [0, 7, 10], [0, 10, 11], [1, 5, 9], [5, 11, 4], [11, 10, 2], [10, 7, 6], [7, 1, 8], [3, 9, 4], [3, 4, 2], [3, 2, 6], [3, 6, 8], [3, 8, 9], [4, 9, 5], [2, 4, 11], [6, 2, 10], [8, 6, 7], [9, 8, 1]] as const;
  const known = new Map<string, Point>();
  // Weights in whole numbers, in the order of the vertices: an edge's points have the same bits from both sides.
  const at = (weights: readonly (readonly [vertex: number, weight: number])[]): Point => {
    const used = weights.filter(([, weight]) => weight > 0).sort(([one], [two]) => one - two);
    const key = used.join(';');
    const found = known.get(key);
    if (found !== undefined) return found;
    const sum = [0, 1, 2].map((k) => used.reduce((total, [vertex, weight]) => total + weight * (vertices[vertex]?.[k] ?? NaN), 0)) as unknown as Point;
    const size = Math.hypot(...sum);
    const point: Point = [sum[0] / size, sum[1] / size, sum[2] / size];
    known.set(key, point);
    return point;
  };
  const points: Point[] = [];
  for (const [a, b, c] of faces) {
    const inside = (i: number, j: number): Point => at([[a, parts - i - j], [b, i], [c, j]]);
    for (let i = 0; i < parts; i++) {
      for (let j = 0; i + j < parts; j++) {
        points.push(inside(i, j), inside(i + 1, j), inside(i, j + 1));
        if (i + j + 1 < parts) points.push(inside(i + 1, j), inside(i + 1, j + 1), inside(i, j + 1));
      }
    }
  }
  return Float64Array.from(points.flat());
}

export const makeEllipsoid = (semiAxes: Point, unitBall: Corners): SmoothBody => ({ corners: stretch(unitBall, semiAxes), truth: ellipsoidTruth(semiAxes) });

/** A block with half-sizes a, b, c whose edges and corners are rounded outwards by a ball of this radius; `quarter` chords a quarter turn. */
export function makeRoundedBlock([a, b, c]: Point, radius: number, quarter: number): SmoothBody {
  const segments = 4 * quarter;
  // Each quarter's first and last points stand twice, once on either side of the flat between: 4 (quarter + 1) around, 2 (quarter + 1) from pole to pole.
  const rows = 2 * (quarter + 1), columns = 4 * (quarter + 1);
  const corners = shapesOf(rows + 1, columns, (i, j): GridPoint => {
    const up = i > quarter + 1;
    // The outermost rows are the flats at the poles, all at one point each.
    if (i === 0 || i === rows + 1) return { point: [0, 0, i === 0 ? -c - radius : c + radius], pole: true };
    const step = i - 1 - (up ? 1 : 0);
    const height = -Math.PI / 2 + (2 * Math.PI * step) / segments;
    const side = Math.floor((j % columns) / (quarter + 1));
    const angle = (2 * Math.PI * ((j % columns) - side)) / segments;
    const wide = step === 0 || step === 2 * quarter ? 0 : radius * Math.cos(height);
    return { point: [(side === 0 || side === 3 ? a : -a) + wide * Math.cos(angle), (side < 2 ? b : -b) + wide * Math.sin(angle), (up ? c : -c) + radius * Math.sin(height)], pole: false };
  });
  return { corners, truth: roundedBlockTruth([a, b, c], radius) };
}

function roundedBlockTruth(half: Point, r: number): SmoothTruth {
  const [a, b, c] = half;
  const volume = 8 * a * b * c + 8 * r * (a * b + b * c + c * a) + 2 * Math.PI * r * r * (a + b + c) + (4 / 3) * Math.PI * r * r * r;
  const area = 8 * (a * b + b * c + c * a) + 4 * Math.PI * r * (a + b + c) + 4 * Math.PI * r * r;
  // Sliced across one axis: a rectangle rounded by r within the block's size, by what is left of r beyond it.
  const along = (own: number, one: number, other: number): number => {
    const slice = (rho: number): number => 4 * one * other + 4 * rho * (one + other) + Math.PI * rho * rho;
    const beyond = integrate((angle) => slice(r * Math.cos(angle)) * (own + r * Math.sin(angle)) * (own + r * Math.sin(angle)) * r * Math.cos(angle), 0, Math.PI / 2);
    return 2 * ((slice(r) * own * own * own) / 3 + beyond);
  };
  return { volume, area, centre: [0, 0, 0], second: { xx: along(a, b, c), yy: along(b, c, a), zz: along(c, a, b), xy: 0, yz: 0, zx: 0 } };
}
