import type { Vector3 } from '@masswright/contracts';

export function add(a: Vector3, b: Vector3): Vector3 {
  return [a[0] + b[0], a[1] + b[1], a[2] + b[2]];
}

export function subtract(a: Vector3, b: Vector3): Vector3 {
  return [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
}

export function scale(a: Vector3, factor: number): Vector3 {
  return [a[0] * factor, a[1] * factor, a[2] * factor];
}

export function dot(a: Vector3, b: Vector3): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

export function cross(a: Vector3, b: Vector3): Vector3 {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

export function getLength(a: Vector3): number {
  const largest = Math.max(Math.abs(a[0]), Math.abs(a[1]), Math.abs(a[2]));
  if (largest === 0) return 0;
  // Scaled, so that squares neither over- nor underflow.
  const [x, y, z] = [a[0] / largest, a[1] / largest, a[2] / largest];
  return largest * Math.sqrt(x * x + y * y + z * z);
}

/** The unit vector along a; undefined where a is zero. */
export function findDirection(a: Vector3): Vector3 | undefined {
  const largest = Math.max(Math.abs(a[0]), Math.abs(a[1]), Math.abs(a[2]));
  if (!(largest > 0) || !Number.isFinite(largest)) return undefined;
  const scaled: Vector3 = [a[0] / largest, a[1] / largest, a[2] / largest];
  const length = Math.sqrt(dot(scaled, scaled));
  // Adding 0 makes +0 of -0, so that no caption reads "-0".
  return [scaled[0] / length + 0, scaled[1] / length + 0, scaled[2] / length + 0];
}
