import type { Symmetric3, Vector3 } from '../../measurement';
import type { Corners, Point } from '../../testing/shapes';

/** What is known of a smooth body without any mesh: second moments about the centre, plus signs, axes of the frame. */
export interface SmoothTruth {
  volume: number;
  area: number;
  centre: Vector3;
  second: Symmetric3;
}

/** A smooth body and a mesh that stands in for it, its vertices on the surface. */
export interface SmoothBody {
  corners: Corners;
  truth: SmoothTruth;
}

type Rows = readonly [Point, Point, Point];

/** The same body turned, then moved. */
export function placeTruth({ volume, area, centre, second }: SmoothTruth, rows: Rows, [dx, dy, dz]: Point): SmoothTruth {
  const m = [[second.xx, second.xy, second.zx], [second.xy, second.yy, second.yz], [second.zx, second.yz, second.zz]];
  const form = (u: Point, v: Point): number => u.reduce((sum, ui, i) => sum + v.reduce((inner, vj, j) => inner + ui * (m[i]?.[j] ?? NaN) * vj, 0), 0);
  const [x, y, z] = rows;
  const along = (u: Point): number => u[0] * centre[0] + u[1] * centre[1] + u[2] * centre[2];
  return {
    volume,
    area,
    centre: [along(x) + dx, along(y) + dy, along(z) + dz],
    second: { xx: form(x, x), yy: form(y, y), zz: form(z, z), xy: form(x, y), yz: form(y, z), zx: form(z, x) },
  };
}

/** Nodes and weights of Gauss and Legendre on [-1, 1], by Newton's method on the polynomial. */
function findNodes(count: number): [node: number, weight: number][] {
  return Array.from({ length: count }, (_, k) => {
    let x = Math.cos((Math.PI * (k + 0.75)) / (count + 0.5));
    let slope = 1;
    for (let step = 0; step < 60; step++) {
      let [before, now] = [1, x];
      for (let n = 2; n <= count; n++) [before, now] = [now, ((2 * n - 1) * x * now - (n - 1) * before) / n];
      slope = (count * (x * now - before)) / (x * x - 1);
      x -= now / slope;
    }
    return [x, 2 / ((1 - x * x) * slope * slope)];
  });
}

const nodes = findNodes(16);

/** ∫ f over [from, to], in pieces of 16 nodes each: exact to the last digits for what is smooth. */
export function integrate(f: (t: number) => number, from: number, to: number, pieces = 8): number {
  const half = (to - from) / (2 * pieces);
  let sum = 0;
  for (let piece = 0; piece < pieces; piece++) {
    const middle = from + (2 * piece + 1) * half;
    for (const [node, weight] of nodes) sum += weight * half * f(middle + half * node);
  }
  return sum;
}
