import type { FigureChanges, Measurement, Setting, StatementRecord, UncertaintyTermName } from '@masswright/contracts';
import type { Quantity } from '@masswright/units';

/** A figure whose doubt can be looked into. */
export interface DoubtfulFigure {
  id: string;
  name: string;
  quantity: Quantity;
  /** Null where the record has no such figure, or what changes it can't be told. */
  read: (figures: Readable) => number | null;
}

/** Both the figures of a record and their changes. */
type Readable = Pick<FigureChanges, 'areaM2' | 'massKg' | 'principalMomentsKgM2'> & {
  volumeM3: number | null;
  centreOfMassM: FigureChanges['centreOfMassM'] | null;
  aboutAxis: { inertiaKgM2: number } | null;
};

const along = (letter: 'x' | 'y' | 'z', k: 0 | 1 | 2): DoubtfulFigure => ({ id: `centre-${letter}`, name: `Centre of mass ${letter}`, quantity: 'length', read: ({ centreOfMassM }) => centreOfMassM?.[k] ?? null });
const moment = (number: 1 | 2 | 3): DoubtfulFigure => ({ id: `moment-${number}`, name: `Principal moment ${number}`, quantity: 'inertia', read: ({ principalMomentsKgM2 }) => principalMomentsKgM2?.[number - 1] ?? null });

export const doubtfulFigures: readonly DoubtfulFigure[] = [
  { id: 'mass', name: 'Mass', quantity: 'mass', read: ({ massKg }) => massKg },
  { id: 'volume', name: 'Volume', quantity: 'volume', read: ({ volumeM3 }) => volumeM3 },
  { id: 'area', name: 'Surface', quantity: 'area', read: ({ areaM2 }) => areaM2 },
  along('x', 0),
  along('y', 1),
  along('z', 2),
  moment(1),
  moment(2),
  moment(3),
  { id: 'axis', name: 'Moment about the axis', quantity: 'inertia', read: ({ aboutAxis }) => aboutAxis?.inertiaKgM2 ?? null },
];

interface TermWords {
  name: string;
  /** What it is. */
  what: string;
  /** What would make it smaller. */
  remedy: string;
}

export const termWords: Record<UncertaintyTermName, TermWords> = {
  density: { name: 'Density', what: 'the stated spread of the density', remedy: 'Weigh the part, or state a closer spread for this very material.' },
  weighing: { name: 'Weighing', what: 'how sure the scale is', remedy: 'Weigh the part on a finer scale.' },
  facets: { name: 'Facets', what: 'what the prediction of the curved surfaces behind the facets leaves open', remedy: 'Export the mesh with finer facets.' },
  'as-made': { name: 'As made', what: 'the stated tolerance of the part as made', remedy: 'Measure the part as made, and state a closer tolerance.' },
  gap: { name: 'Gap', what: 'volume that the hairline openings may have lost', remedy: 'Export the body again as one closed solid.' },
  polygons: { name: 'Polygons', what: 'how polygons that are not flat were cut into triangles', remedy: 'Export triangles instead of polygons.' },
  'file-rounding': { name: 'Digits of the file', what: 'the coordinates are rounded to so many digits in the file', remedy: 'Export with more digits, or with the part nearer to the origin.' },
  arithmetic: { name: 'Arithmetic', what: 'our own rounding', remedy: 'Nothing to be done, and nothing needs to be.' },
};

export interface LedgerLine extends TermWords {
  term: UncertaintyTermName;
  /** Of the sum of squares, 0 to 1; null where it can't be told for this figure. */
  share: number | null;
  /** What the figure's ± would be with this term alone, in SI. */
  alone: number | null;
}

/** What the ± of a figure is made of, the largest first; terms that do nothing to it are left out. */
export function listDoubt({ uncertainty }: Pick<StatementRecord, 'uncertainty'>, { read }: DoubtfulFigure): LedgerLine[] {
  if (!uncertainty) return [];
  const whole = read(uncertainty);
  return uncertainty.terms
    .map(({ name, shares }): LedgerLine => {
      const share = read(shares);
      return { term: name, ...termWords[name], share, alone: share === null || whole === null ? null : whole * Math.sqrt(Math.max(0, share)) };
    })
    .filter(({ share }) => share !== 0)
    .sort((one, other) => (other.share ?? 2) - (one.share ?? 2));
}

/** What could be in doubt and is not counted, since nobody said anything of it or it was not looked at. */
export function listUncounted(statement: StatementRecord, { asMade, densitySpreadKgM3, densityKgM3 }: Setting, { examined, facetDoubt }: Pick<Measurement, 'examined' | 'facetDoubt'>): string[] {
  const said: string[] = [];
  const byWeight = statement.weighing !== null && statement.weighing.verdict !== 'disagrees';
  if (statement.massKg !== null && densityKgM3 !== null && densitySpreadKgM3 === null && !byWeight) said.push('No spread of the density is stated: it counts as exact.');
  if (!asMade) said.push('No tolerance as made is stated: the figures are those of the body as drawn.');
  if (facetDoubt === null) {
    said.push(
      examined === 'integrals'
        ? 'The facets are being examined: what a curved surface loses to them is not counted yet.'
        : 'The facets were not examined: what a curved surface loses to them is not counted.',
    );
  }
  return said;
}
