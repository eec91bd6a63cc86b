import type { FigureChanges, Measurement, Setting, Uncertainty } from '@masswright/contracts';
import type { LengthUnit } from '@masswright/units';
import { resolveAxis } from '../axis-moment';
import { computePrincipalAxes } from '../principal-axes';
import { convertPoint } from '../shell-bodies';
import { shiftFromCentre } from '../tensor';
import { scale, subtract } from '../vector';
import { weighMeasurement, type WeighedBody } from '../weigh-measurement';
import { addShares } from './add-shares';
import { convertChange, moveChange, noChange, type BodyChange } from './body-change';
import { changeFigures, type FigureBasis } from './change-figures';
import { listMeshTerms, rectangular, type BudgetTerm } from './list-terms';

/** Everything in doubt about one measurement under one setting. */
export interface Budget {
  basis: FigureBasis;
  /** Null where the facets were not examined. */
  correction: BodyChange | null;
  terms: BudgetTerm[];
}

/**
 * The uncertainty budget of a measurement under a setting, as the record has it: by the GUM, every source of doubt as standard uncertainties of the body's integrals
 * and density, every figure by its first-order change, independent sources in quadrature, U = 2u. The facets' predicted correction stands apart. Null where there are
 * no figures: the unit is not stated, the mesh has no volume, or shells have densities that can't be taken into account.
 */
export function computeUncertainty(measurement: Measurement, setting: Setting): { correction: FigureChanges | null; uncertainty: Uncertainty } | null {
  if (setting.lengthUnit === null) return null;
  const budget = computeBudget(measurement, setting, setting.lengthUnit, weighMeasurement(measurement, setting, setting.lengthUnit));
  return budget && stateBudget(budget);
}

export function stateBudget({ basis, correction, terms }: Budget): { correction: FigureChanges | null; uncertainty: Uncertainty } | null {
  const uncertainty = addShares(terms.map(({ name, changes }) => ({ name, changes: changes.map((change) => changeFigures(change, basis)) })));
  return uncertainty && { correction: correction && changeFigures(correction, basis), uncertainty };
}

/**
 * The same before it is put into figures. Where shells have densities of their own the mesh's doubt is taken with the mean density of what is there; the stated
 * density's spread changes only what has that density.
 */
export function computeBudget(measurement: Measurement, setting: Setting, unit: LengthUnit, weighed: WeighedBody): Budget | null {
  const { volume, facetDoubt, origin } = measurement;
  const basis = findBasis(setting, weighed);
  if (volume === null || basis === null) return null;
  const centroid = convertPoint(origin, volume.centreFromOrigin, unit);
  const settle = (change: BodyChange): BodyChange => keepMass(moveChange(change, centroid, basis.body.centreOfMassM), basis, weighed);
  const terms = listMeshTerms(measurement, unit, setting.asMade ?? null).map(({ name, changes }) => ({ name, changes: changes.map(settle) }));
  return {
    basis,
    correction: facetDoubt ? settle(convertChange(facetDoubt.body.correction, facetDoubt.area.correction, unit)) : null,
    terms: [...findDensityTerm(setting, weighed), ...terms],
  };
}

/** While the density is not stated, centre and volume are those of a body of density 1. */
function findBasis(setting: Setting, { body: weighedBody, uniform, volumeM3, density }: WeighedBody): FigureBasis | null {
  const body = weighedBody ?? uniform;
  if (body === null || volumeM3 === null || !(volumeM3 > 0) || (weighedBody === null && setting.shellDensities?.length)) return null;
  const principal = computePrincipalAxes(body.inertiaAtCentreOfMassKgM2);
  const offset = uniform ? subtract(uniform.centreOfMassM, body.centreOfMassM) : ([0, 0, 0] as const);
  return {
    body,
    uniform: uniform
      ? { content: uniform.massKg, first: scale([offset[0], offset[1], offset[2]], uniform.massKg), tensor: shiftFromCentre(uniform.inertiaAtCentreOfMassKgM2, uniform.massKg, [offset[0], offset[1], offset[2]]) }
      : { content: 0, first: [0, 0, 0], tensor: { xx: 0, yy: 0, zz: 0, xy: 0, yz: 0, zx: 0 } },
    densityKgM3: weighedBody === null ? 1 : isOneDensity(setting, density.densityKgM3) ?? weighedBody.massKg / volumeM3,
    principal,
    line: resolveAxis(setting.axis, { centreOfMassM: body.centreOfMassM, principalAxes: principal.axes }) ?? null,
    weighs: weighedBody !== null,
  };
}

/** To the bit, where the whole is of one density. */
function isOneDensity({ shellDensities }: Setting, densityKgM3: number | null): number | null {
  return shellDensities?.length ? null : densityKgM3;
}

/** A weighing that sets the density fixes the mass: where the volume is larger, the density is less. */
function keepMass(change: BodyChange, basis: FigureBasis, { density, body }: WeighedBody): BodyChange {
  if (body === null || !setsDensity(density) || !(basis.uniform.content > 0)) return change;
  return { ...change, densityKgM3: change.densityKgM3 - (basis.densityKgM3 * change.content) / basis.uniform.content };
}

function setsDensity({ weighing }: WeighedBody['density']): boolean {
  return weighing !== null && weighing.verdict !== 'disagrees';
}

/** A stated spread ±a is that of an interval; what a scale states is an expanded uncertainty. */
function findDensityTerm({ densitySpreadKgM3 }: Setting, { density, body, uniform }: WeighedBody): BudgetTerm[] {
  if (body === null || uniform === null || density.densityKgM3 === null) return [];
  if (density.weighing && setsDensity(density)) {
    const { uncertaintyKg } = density.weighing;
    return uncertaintyKg > 0 ? [{ name: 'weighing', changes: [{ ...noChange, densityKgM3: uncertaintyKg / 2 / uniform.massKg }] }] : [];
  }
  return densitySpreadKgM3 ? [{ name: 'density', changes: [{ ...noChange, densityKgM3: densitySpreadKgM3 * rectangular }] }] : [];
}
