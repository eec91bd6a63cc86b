import { integrate, type SmoothTruth } from './smooth-truth';

/** A piece of a plane curve, from t = 0 to 1, and into how many chords it is cut. */
export interface Curve {
  steps: number;
  at: (t: number) => readonly [u: number, v: number];
  slope: (t: number) => readonly [du: number, dv: number];
}

export function line([u0, v0]: readonly [number, number], [u1, v1]: readonly [number, number], steps = 1): Curve {
  return { steps, at: (t) => [u0 + t * (u1 - u0), v0 + t * (v1 - v0)], slope: () => [u1 - u0, v1 - v0] };
}

/** An arc, or one of an ellipse with half-axes `ru` and `rv`, at even steps of its angle. */
export function arc([u, v]: readonly [number, number], [ru, rv]: readonly [number, number], from: number, to: number, steps: number): Curve {
  const angle = (t: number): number => from + t * (to - from);
  return {
    steps,
    at: (t) => [u + ru * Math.cos(angle(t)), v + rv * Math.sin(angle(t))],
    slope: (t) => [-ru * Math.sin(angle(t)) * (to - from), rv * Math.cos(angle(t)) * (to - from)],
  };
}

/** Chords of an arc, as many as a circle of `segments` would have over the same turn, at least one. */
export const stepsOf = (segments: number, turn: number): number => Math.max(1, Math.round((segments * Math.abs(turn)) / (2 * Math.PI)));

/** The corners of the polygon: every piece from its beginning, without its end. */
export function samplePoints(curves: readonly Curve[]): [number, number][] {
  return curves.flatMap(({ steps, at }) => Array.from({ length: steps }, (_, k): [number, number] => [...at(k / steps)]));
}

/** The same of a profile that begins and ends on the axis u = 0, or comes round: what is all but on the axis is put on it, and the end is added where it is not the beginning. */
export function sampleProfile(curves: readonly Curve[]): [number, number][] {
  const points = samplePoints(curves);
  const end = curves[curves.length - 1]?.at(1) ?? [0, 0];
  const begin = points[0] ?? [0, 0];
  if (Math.abs(end[0] - begin[0]) + Math.abs(end[1] - begin[1]) > 1e-9) points.push([...end]);
  return points.map(([u, v]) => [Math.abs(u) < 1e-9 ? 0 : u, v]);
}

/** ∮ f du' along closed pieces: `f` is given the place and the slope. */
function along(curves: readonly Curve[], f: (u: number, v: number, du: number, dv: number) => number): number {
  return curves.reduce((sum, { at, slope }) => sum + integrate((t) => f(...at(t), ...slope(t)), 0, 1), 0);
}

/** The solid that a profile (u from the z axis, v along it, counter-clockwise, axis on its left) sweeps about the z axis. */
export function turnTruth(profile: readonly Curve[]): SmoothTruth {
  const volume = Math.PI * along(profile, (r, _z, _dr, dz) => r * r * dz);
  const z = (Math.PI * along(profile, (r, z, _dr, dz) => r * r * z * dz)) / volume;
  const zz = Math.PI * along(profile, (r, at, _dr, dz) => r * r * (at - z) * (at - z) * dz);
  const xx = (Math.PI / 4) * along(profile, (r, _z, _dr, dz) => r * r * r * r * dz);
  const area = 2 * Math.PI * along(profile, (r, _z, dr, dz) => r * Math.hypot(dr, dz));
  return { volume, area, centre: [0, 0, z], second: { xx, yy: xx, zz, xy: 0, yz: 0, zx: 0 } };
}

/** The solid over a plane region, from z = 0 to `height`: its outer boundary counter-clockwise, holes clockwise. */
export function drawUpTruth(boundary: readonly Curve[], height: number): SmoothTruth {
  const face = along(boundary, (x, y, dx, dy) => (x * dy - y * dx) / 2);
  const x = along(boundary, (at, _y, _dx, dy) => (at * at * dy) / 2) / face;
  const y = -along(boundary, (_x, at, dx) => (at * at * dx) / 2) / face;
  const xx = along(boundary, (at, _y, _dx, dy) => ((at - x) * (at - x) * (at - x) * dy) / 3);
  const yy = -along(boundary, (_x, at, dx) => ((at - y) * (at - y) * (at - y) * dx) / 3);
  const xy = along(boundary, (at, other, _dx, dy) => ((at - x) * (at - x) * (other - y) * dy) / 2);
  return {
    volume: face * height,
    area: 2 * face + height * along(boundary, (_x, _y, dx, dy) => Math.hypot(dx, dy)),
    centre: [x, y, height / 2],
    second: { xx: xx * height, yy: yy * height, zz: (face * height * height * height) / 12, xy: xy * height, yz: 0, zx: 0 },
  };
}
