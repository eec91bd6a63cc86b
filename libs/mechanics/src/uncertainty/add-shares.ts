import type { FigureChanges, Uncertainty, UncertaintyTermName } from '@masswright/contracts';

/** What one source does to every figure: for each of its independent changes. */
export interface FigureTerm {
  name: UncertaintyTermName;
  changes: FigureChanges[];
}

/** Coverage factor: an expanded uncertainty is twice the standard one. */
const k = 2;

/** U = 2 √Σu² for every figure, and of each the share that every term has of Σu²; the terms with the largest share of the mass first. */
export function addShares(terms: readonly FigureTerm[]): Uncertainty | null {
  const squares = terms.map(({ name, changes }) => ({ name, sum: changes.reduce<FigureChanges | null>((sum, change) => add(sum, square(change)), null) }));
  const total = squares.reduce<FigureChanges | null>((sum, term) => (term.sum ? add(sum, term.sum) : sum), null);
  if (total === null) return null;
  const shares = squares.flatMap(({ name, sum }) => (sum ? [{ name, shares: combine(sum, total, (one, all) => (all > 0 ? one / all : 0)) }] : []));
  return { ...combine(total, total, (sum) => k * Math.sqrt(sum)), k, terms: shares.sort((one, two) => weigh(two.shares) - weigh(one.shares)) };
}

function square(change: FigureChanges): FigureChanges {
  return combine(change, change, (element) => element * element);
}

function add(sum: FigureChanges | null, other: FigureChanges): FigureChanges {
  return sum === null ? other : combine(sum, other, (one, two) => one + two);
}

/** By the mass, or the volume while there is none: what a reader looks at first. A term that weighs nothing there stands by what it does to the moments. */
function weigh({ volumeM3, massKg, inertiaAtCentreOfMassKgM2: tensor }: FigureChanges): number {
  return (massKg ?? volumeM3) + (tensor ? 1e-6 * (tensor.xx + tensor.yy + tensor.zz) : 0);
}

/** One number of two for each figure; null where either has none. */
function combine(one: FigureChanges, two: FigureChanges, by: (a: number, b: number) => number): FigureChanges {
  const either = (a: number | null, b: number | null): number | null => (a === null || b === null ? null : by(a, b));
  const vector = (a: FigureChanges['centreOfMassM'], b: FigureChanges['centreOfMassM']): FigureChanges['centreOfMassM'] => [by(a[0], b[0]), by(a[1], b[1]), by(a[2], b[2])];
  const tensors = [one.inertiaAtCentreOfMassKgM2, two.inertiaAtCentreOfMassKgM2] as const;
  return {
    volumeM3: by(one.volumeM3, two.volumeM3),
    areaM2: either(one.areaM2, two.areaM2),
    massKg: either(one.massKg, two.massKg),
    centreOfMassM: vector(one.centreOfMassM, two.centreOfMassM),
    inertiaAtCentreOfMassKgM2:
      tensors[0] && tensors[1]
        ? { xx: by(tensors[0].xx, tensors[1].xx), yy: by(tensors[0].yy, tensors[1].yy), zz: by(tensors[0].zz, tensors[1].zz), xy: by(tensors[0].xy, tensors[1].xy), yz: by(tensors[0].yz, tensors[1].yz), zx: by(tensors[0].zx, tensors[1].zx) }
        : null,
    principalMomentsKgM2: one.principalMomentsKgM2 && two.principalMomentsKgM2 && vector(one.principalMomentsKgM2, two.principalMomentsKgM2),
    radiiOfGyrationM: one.radiiOfGyrationM && two.radiiOfGyrationM && vector(one.radiiOfGyrationM, two.radiiOfGyrationM),
    aboutAxis: one.aboutAxis && two.aboutAxis && { inertiaKgM2: by(one.aboutAxis.inertiaKgM2, two.aboutAxis.inertiaKgM2), radiusOfGyrationM: by(one.aboutAxis.radiusOfGyrationM, two.aboutAxis.radiusOfGyrationM) },
  };
}
