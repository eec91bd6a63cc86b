import type { ModelObject } from './model-part';

/** How far below zero a volume has to be, relative to the sizes that it is the sum of, to be more than rounding. */
const rounding = 1e-9;

/**
 * Whether an object's triangles, all together, look inwards. The fill rule of 3MF takes for body what is wound around a positive number of times: of such an
 * object nothing is. Where edges don't balance there is no inside, and the answer is no.
 */
export function isInsideOut(object: ModelObject): boolean {
  return areEdgesBalanced(object) && isVolumeNegative(object);
}

/**
 * Whether as many triangles run along every edge one way as the other: sums over all directed edges of two numbers that are scrambled from its ends vanish. They
 * vanish by chance once in 2⁶⁴.
 */
function areEdgesBalanced({ triangles, triangleCount }: ModelObject): boolean {
  let one = 0, two = 0;
  const add = (from: number, to: number): void => {
    if (from === to) return;
    const [low, high, sign] = from < to ? [from, to, 1] : [to, from, -1];
    one = (one + sign * scramble(low, high, 0x9e3779b9)) | 0;
    two = (two + sign * scramble(low, high, 0x85ebca6b)) | 0;
  };
  for (let at = 0; at < 3 * triangleCount; at += 3) {
    const a = triangles[at] ?? 0, b = triangles[at + 1] ?? 0, c = triangles[at + 2] ?? 0;
    add(a, b);
    add(b, c);
    add(c, a);
  }
  return one === 0 && two === 0;
}

/** The finish of Murmur3 (Appleby), twice. */
function scramble(low: number, high: number, seed: number): number {
  return finish(finish(low ^ seed) + Math.imul(high, 0xcc9e2d51) + seed);
}

function finish(value: number): number {
  let mixed = Math.imul(value ^ (value >>> 16), 0x85ebca6b);
  mixed = Math.imul(mixed ^ (mixed >>> 13), 0xc2b2ae35);
  return (mixed ^ (mixed >>> 16)) | 0;
}

function isVolumeNegative({ triangles, triangleCount, vertices }: ModelObject): boolean {
  const origin = 3 * (triangles[0] ?? 0);
  const ox = vertices[origin] ?? 0, oy = vertices[origin + 1] ?? 0, oz = vertices[origin + 2] ?? 0;
  let volume = 0, size = 0;
  for (let at = 0; at < 3 * triangleCount; at += 3) {
    const a = 3 * (triangles[at] ?? 0), b = 3 * (triangles[at + 1] ?? 0), c = 3 * (triangles[at + 2] ?? 0);
    const ax = (vertices[a] ?? 0) - ox, ay = (vertices[a + 1] ?? 0) - oy, az = (vertices[a + 2] ?? 0) - oz;
    const bx = (vertices[b] ?? 0) - ox, by = (vertices[b + 1] ?? 0) - oy, bz = (vertices[b + 2] ?? 0) - oz;
    const cx = (vertices[c] ?? 0) - ox, cy = (vertices[c + 1] ?? 0) - oy, cz = (vertices[c + 2] ?? 0) - oz;
    const determinant = ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx);
    volume += determinant;
    size += Math.abs(determinant);
  }
  return volume < -rounding * size;
}
