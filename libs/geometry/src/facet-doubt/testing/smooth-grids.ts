import type { Corners, Point } from '../../testing/shapes';
import { revolve } from '../../testing/shapes';
import { arc, drawUpTruth, line, samplePoints, sampleProfile, turnTruth, type Curve } from './smooth-curves';
import type { SmoothBody } from './smooth-truth';

export interface GridPoint {
  point: Point;
  /** All points of its row are this one. */
  pole: boolean;
}

/** A closed surface of rows from the lower pole to the upper one, each of `columns` points around; facets without area are left out. */
export function shapesOf(rows: number, columns: number, at: (i: number, j: number) => GridPoint): Corners {
  const points: Point[] = [];
  const differ = (one: Point, two: Point): boolean => one[0] !== two[0] || one[1] !== two[1] || one[2] !== two[2];
  const add = (a: Point, b: Point, c: Point): void => {
    if (differ(a, b) && differ(b, c) && differ(c, a)) points.push(a, b, c);
  };
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < columns; j++) {
      const [a, b, c, d] = [at(i, j), at(i, j + 1), at(i + 1, j + 1), at(i + 1, j)];
      if (!a.pole) add(a.point, b.point, c.point);
      if (!d.pole) add(a.point, c.point, d.point);
    }
  }
  return Float64Array.from(points.flat());
}

/** A solid of revolution about the z axis. */
export const turnProfile = (profile: readonly Curve[], segments: number): SmoothBody => ({ corners: revolve(sampleProfile(profile), segments), truth: turnTruth(profile) });

type Flat = readonly [number, number];

function wall(points: Point[], from: Flat, to: Flat, height: number, rows: number): void {
  const z = (row: number): number => (height * row) / rows;
  for (let row = 0; row < rows; row++) {
    points.push([...from, z(row)], [...to, z(row)], [...to, z(row + 1)], [...from, z(row)], [...to, z(row + 1)], [...from, z(row + 1)]);
  }
}

function lids(points: Point[], a: Flat, b: Flat, c: Flat, height: number): void {
  points.push([...a, height], [...b, height], [...c, height], [...a, 0], [...c, 0], [...b, 0]);
}

/** A convex outline drawn up from z = 0, its walls in `rows` rows. */
export function drawUpConvex(outline: readonly Curve[], height: number, rows: number): SmoothBody {
  const base = samplePoints(outline);
  const points: Point[] = [];
  base.forEach((from, k) => wall(points, from, base[(k + 1) % base.length] ?? from, height, rows));
  const [first] = base;
  for (let k = 1; first && k + 1 < base.length; k++) lids(points, first, base[k] ?? first, base[k + 1] ?? first, height);
  return { corners: Float64Array.from(points.flat()), truth: drawUpTruth(outline, height) };
}

/** A plate of square cells of side 2 in a row along x, each with a round hole in its middle; `segments` is a multiple of 4. */
export function makePlate(radii: readonly number[], height: number, segments: number): SmoothBody {
  const points: Point[] = [];
  const quarter = segments / 4;
  const long = 2 * radii.length;
  radii.forEach((radius, cell) => {
    const x = 2 * cell + 1;
    const round = samplePoints([arc([x, 0], [radius, radius], 0, 2 * Math.PI, segments)]);
    const rim = (k: number): Flat => round[k % segments] ?? [x, 0];
    const square: Flat[] = [[x + 1, 1], [x - 1, 1], [x - 1, -1], [x + 1, -1]];
    square.forEach((corner, side) => {
      for (let k = side * quarter; k < (side + 1) * quarter; k++) {
        lids(points, corner, rim(k + 1), rim(k), height);
        wall(points, rim(k + 1), rim(k), height, 1);
      }
      lids(points, corner, square[(side + 1) % 4] ?? corner, rim((side + 1) * quarter), height);
      const outside = side === 0 || side === 2 || (side === 1 ? cell === 0 : cell === radii.length - 1);
      if (outside) wall(points, corner, square[(side + 1) % 4] ?? corner, height, 1);
    });
  });
  const outline = [line([0, -1], [long, -1]), line([long, -1], [long, 1]), line([long, 1], [0, 1]), line([0, 1], [0, -1])];
  const holes = radii.map((radius, cell) => arc([2 * cell + 1, 0], [radius, radius], 2 * Math.PI, 0, segments));
  return { corners: Float64Array.from(points.flat()), truth: drawUpTruth([...outline, ...holes], height) };
}
