/* Meshes for the tests, as nine coordinates a facet, counter-clockwise seen from outside. Shared corners have the same bits. */

export type Corners = Float64Array;
export type Point = readonly [number, number, number];
export type Map3 = (point: Point) => Point;

const joinPoints = (points: readonly Point[]): Corners => Float64Array.from(points.flat());

/** A block from one corner to the opposite one. */
export function makeBlock([x0, y0, z0]: Point, [x1, y1, z1]: Point): Corners {
  const corner = (n: number): Point => [n & 1 ? x1 : x0, n & 2 ? y1 : y0, n & 4 ? z1 : z0];
  const quads = [[0, 2, 3, 1], [4, 5, 7, 6], [0, 1, 5, 4], [2, 6, 7, 3], [0, 4, 6, 2], [1, 3, 7, 5]] as const;
  return joinPoints(quads.flatMap(([a, b, c, d]) => [a, b, c, a, c, d].map(corner)));
}

/** A tetrahedron, its corners given so that the fourth lies on the side from which the first three run clockwise. */
export function makeTetrahedron(a: Point, b: Point, c: Point, d: Point): Corners {
  return joinPoints([a, b, c, a, d, b, b, d, c, c, d, a]);
}

/** A polygon in a plane of constant z, convex and counter-clockwise, drawn up to a height. */
export function makePrism(base: readonly (readonly [number, number])[], z0: number, z1: number): Corners {
  const points: Point[] = [];
  const at = (k: number, z: number): Point => [base[k % base.length]?.[0] ?? 0, base[k % base.length]?.[1] ?? 0, z];
  for (let k = 0; k < base.length; k++) points.push(at(k, z0), at(k + 1, z0), at(k + 1, z1), at(k, z0), at(k + 1, z1), at(k, z1));
  for (let k = 1; k + 1 < base.length; k++) points.push(at(0, z1), at(k, z1), at(k + 1, z1), at(0, z0), at(k + 1, z0), at(k, z0));
  return joinPoints(points);
}

/** A pyramid over a rectangle that is centred on the z axis at z = 0. */
export function makePyramid(a: number, b: number, h: number): Corners {
  const base: Point[] = [[-a / 2, -b / 2, 0], [a / 2, -b / 2, 0], [a / 2, b / 2, 0], [-a / 2, b / 2, 0]];
  const [p, q, r, s] = base as [Point, Point, Point, Point];
  const top: Point = [0, 0, h];
  return joinPoints([p, r, q, p, s, r, p, q, top, q, r, top, r, s, top, s, p, top]);
}

/** Points of a profile: distance from the z axis and height. */
export type Profile = readonly (readonly [radius: number, z: number])[];

/** Turns a closed profile, counter-clockwise with the axis on its left edge, about the z axis. */
export function revolve(profile: Profile, segments: number): Corners {
  const points: Point[] = [];
  const at = (i: number, j: number): Point => {
    const [radius, z] = profile[i % profile.length] ?? [0, 0];
    const angle = (2 * Math.PI * (j % segments)) / segments;
    return [radius * Math.cos(angle), radius * Math.sin(angle), z];
  };
  for (let i = 0; i < profile.length; i++) {
    const below = profile[i]?.[0] ?? 0;
    const above = profile[(i + 1) % profile.length]?.[0] ?? 0;
    for (let j = 0; j < segments; j++) {
      if (below !== 0) points.push(at(i, j), at(i, j + 1), at(i + 1, j + 1));
      if (above !== 0) points.push(at(i, j), at(i + 1, j + 1), at(i + 1, j));
    }
  }
  return joinPoints(points);
}

/** An arc of a profile from one angle (from the equator, in radians) to another; ends on the axis lie on it exactly. */
export function drawArc(centreRadius: number, centreZ: number, radius: number, from: number, to: number, steps: number): [number, number][] {
  return Array.from({ length: steps + 1 }, (_, k) => {
    const angle = from + ((to - from) * k) / steps;
    const r = centreRadius + radius * Math.cos(angle);
    return [Math.abs(r) < 1e-12 * radius ? 0 : r, centreZ + radius * Math.sin(angle)];
  });
}

const quarter = Math.PI / 2;

export const makeCylinder = (radius: number, height: number, segments: number): Corners => revolve([[0, 0], [radius, 0], [radius, height], [0, height]], segments);
export const makeTube = (outer: number, inner: number, height: number, segments: number): Corners => revolve([[inner, 0], [outer, 0], [outer, height], [inner, height]], segments);
export const makeCone = (radius: number, height: number, segments: number): Corners => revolve([[0, 0], [radius, 0], [0, height]], segments);
export const makeFrustum = (lower: number, upper: number, height: number, segments: number): Corners => revolve([[0, 0], [lower, 0], [upper, height], [0, height]], segments);
export const makeTorus = (centre: number, tube: number, segments: number): Corners => revolve(drawArc(centre, 0, tube, 0, 2 * Math.PI, segments).slice(0, -1), segments);
export const makeSphere = (radius: number, segments: number): Corners => revolve(drawArc(0, 0, radius, -quarter, quarter, Math.ceil(segments / 2)), segments);
export const makeHemisphere = (radius: number, segments: number): Corners => revolve([[0, 0], ...drawArc(0, 0, radius, 0, quarter, Math.ceil(segments / 4))], segments);
export const makeCap = (radius: number, height: number, segments: number): Corners => {
  const from = Math.asin((radius - height) / radius);
  return revolve([[0, radius - height], ...drawArc(0, 0, radius, from, quarter, Math.ceil(segments / 4))], segments);
};
/** Two spheres, the inner one turned inside out. */
export const makeThickShell = (outer: number, inner: number, segments: number): Corners => join(makeSphere(outer, segments), turn(makeSphere(inner, segments)));

export function join(...meshes: readonly Corners[]): Corners {
  return Float64Array.from(meshes.flatMap((mesh) => Array.from(mesh)));
}

/** The same facets, each the other way round. */
export function turn(corners: Corners): Corners {
  const turned = new Float64Array(corners.length);
  for (let at = 0; at < corners.length; at += 9) {
    turned.set(corners.subarray(at, at + 3), at);
    turned.set(corners.subarray(at + 6, at + 9), at + 3);
    turned.set(corners.subarray(at + 3, at + 6), at + 6);
  }
  return turned;
}

export function transform(corners: Corners, map: Map3): Corners {
  const moved = new Float64Array(corners.length);
  for (let at = 0; at < corners.length; at += 3) moved.set(map([corners[at] ?? 0, corners[at + 1] ?? 0, corners[at + 2] ?? 0]), at);
  return moved;
}

export const move = (corners: Corners, [dx, dy, dz]: Point): Corners => transform(corners, ([x, y, z]) => [x + dx, y + dy, z + dz]);
export const stretch = (corners: Corners, [fx, fy, fz]: Point): Corners => transform(corners, ([x, y, z]) => [x * fx, y * fy, z * fz]);
export const roundToBinary32 = (corners: Corners): Corners => Float64Array.from(corners, Math.fround);

/** A rotation by three angles, as rows. */
export function makeRotation(alpha: number, beta: number, gamma: number): readonly [Point, Point, Point] {
  const [ca, sa, cb, sb, cg, sg] = [Math.cos(alpha), Math.sin(alpha), Math.cos(beta), Math.sin(beta), Math.cos(gamma), Math.sin(gamma)];
  return [
    [ca * cb, ca * sb * sg - sa * cg, ca * sb * cg + sa * sg],
    [sa * cb, sa * sb * sg + ca * cg, sa * sb * cg - ca * sg],
    [-sb, cb * sg, cb * cg],
  ];
}

export const rotate = (corners: Corners, rows: readonly [Point, Point, Point]): Corners =>
  transform(corners, ([x, y, z]) => [rows[0][0] * x + rows[0][1] * y + rows[0][2] * z, rows[1][0] * x + rows[1][1] * y + rows[1][2] * z, rows[2][0] * x + rows[2][1] * y + rows[2][2] * z]);

/** The two boxes of an asymmetric housing as one closed surface each, touching in a rectangle that belongs to both. */
export const makeHousing = (): Corners => join(makeBlock([0, 0, 0], [60, 40, 10]), makeBlock([0, 0, 10], [10, 30, 60]));

/** A ball with dents and bumps, star-shaped about the origin: `bump` gives the radius for a place on the unit sphere. */
export function makeStar(segments: number, bump: (i: number, j: number) => number): Corners {
  const steps = Math.max(2, Math.ceil(segments / 2));
  const points: Point[] = [];
  const at = (i: number, j: number): Point => {
    const polar = i === 0 || i === steps;
    const radius = bump(i, polar ? 0 : j % segments);
    if (polar) return [0, 0, i === 0 ? -radius : radius];
    const height = -quarter + (Math.PI * i) / steps;
    const angle = (2 * Math.PI * (j % segments)) / segments;
    return [radius * Math.cos(height) * Math.cos(angle), radius * Math.cos(height) * Math.sin(angle), radius * Math.sin(height)];
  };
  for (let i = 0; i < steps; i++) {
    for (let j = 0; j < segments; j++) {
      if (i > 0) points.push(at(i, j), at(i, j + 1), at(i + 1, j + 1));
      if (i + 1 < steps) points.push(at(i, j), at(i + 1, j + 1), at(i + 1, j));
    }
  }
  return joinPoints(points);
}
