import type { Vector3 } from '@masswright/contracts';

/** Semi-axes along principal axes 1, 2, 3 of the uniform ellipsoid of the same mass and tensor: √(5 (I_j + I_k - I_i) / 2m). */
export function computeEqualBody([first, second, third]: Vector3, massKg: number): Vector3 {
  const semiAxis = (own: number, other: number, another: number): number => Math.sqrt(Math.max(0, (5 * (other + another - own)) / (2 * massKg)));
  return [semiAxis(first, second, third), semiAxis(second, third, first), semiAxis(third, first, second)];
}
