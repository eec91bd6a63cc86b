import { computeForm, type Tensor } from '../tensor';
import { changeBody } from './change-figures';
import type { Budget } from './compute-uncertainty';

/** How far apart moments 1 and 2, and 2 and 3, may be computed and yet be equal. */
export interface MomentTolerance {
  lowerKgM2: number;
  upperKgM2: number;
}

/**
 * The uncertainty of the differences of neighbouring moments: of the difference itself, and of the off-diagonal element between their two axes, which parts equal moments as well,
 * by twice itself. A change of density changes both alike and parts nothing. The predicted correction widens the interval towards where it would bring them together.
 */
export function compareMoments({ basis, correction, terms }: Budget): MomentTolerance {
  const [first, second, third] = basis.principal.axes;
  // Rounding of the principal moments themselves.
  const least = 4 * Number.EPSILON * basis.principal.moments[2];
  const findTolerance = (low: typeof first, high: typeof first): number => {
    const apart = (tensor: Tensor): number => computeForm(tensor, high, high) - computeForm(tensor, low, low);
    let squares = 0;
    for (const { name, changes } of terms) {
      if (name === 'density' || name === 'weighing') continue;
      for (const change of changes) {
        const { tensor } = changeBody({ ...change, densityKgM3: 0 }, basis);
        const off = 2 * computeForm(tensor, low, high);
        squares += apart(tensor) * apart(tensor) + off * off;
      }
    }
    const predicted = correction ? apart(changeBody({ ...correction, densityKgM3: 0 }, basis).tensor) : 0;
    return 2 * Math.sqrt(squares) - Math.min(0, predicted) + least;
  };
  return { lowerKgM2: findTolerance(first, second), upperKgM2: findTolerance(second, third) };
}
