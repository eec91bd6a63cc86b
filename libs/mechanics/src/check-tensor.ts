import type { Vector3 } from '@masswright/contracts';
import { formatFigure } from '@masswright/units';

export interface TensorFault {
  inequality: 'I₁ ≥ 0' | 'I₁ + I₂ ≥ I₃';
  /** By how much it is broken. */
  excessKgM2: number;
  /** The same as a share of the largest principal moment. */
  share: number;
  message: string;
}

/** Rounding and printed digits leave tensors of real bodies broken by less; relative to the largest principal moment. */
export const physicalTolerance = 1e-9;

/**
 * Whether a body can have these principal moments (ascending): none is negative, and none exceeds the sum of the other two; with the order,
 * the largest decides. A flat body just reaches the second bound.
 */
export function checkPrincipalMoments([first, second, third]: Vector3, tolerance = physicalTolerance): TensorFault[] {
  const largest = Math.max(Math.abs(first), Math.abs(third));
  const faults: TensorFault[] = [];
  const note = (inequality: TensorFault['inequality'], excessKgM2: number, sentence: string): void => {
    if (!(excessKgM2 > tolerance * largest)) return;
    const share = excessKgM2 / largest;
    const size = `${formatFigure(excessKgM2, { digits: 4 })} kg·m² (${formatFigure(100 * share, { digits: 3 })} % of the largest moment)`;
    faults.push({ inequality, excessKgM2, share, message: `${sentence} by ${size}: no body has such a tensor.` });
  };
  note('I₁ ≥ 0', -first, 'The least principal moment is below zero');
  note('I₁ + I₂ ≥ I₃', third - (first + second), 'The largest principal moment exceeds the sum of the other two');
  return faults;
}
