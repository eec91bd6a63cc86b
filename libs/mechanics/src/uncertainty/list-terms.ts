import type { AsMade, Measurement, UncertaintyTermName } from '@masswright/contracts';
import { convertToMetres, type LengthUnit } from '@masswright/units';
import { mapSymmetric, mapVector } from '../body-vectors';
import { boundChanges, convertChange, noChange, scaleChange, type BodyChange } from './body-change';
import { computePointSecond, measureBody, type MeasuredBody } from './measured-body';

/** One source of doubt, as standard uncertainties that are independent of each other. */
export interface BudgetTerm {
  name: UncertaintyTermName;
  changes: BodyChange[];
}

/** u = a/√3: half the width of an interval in which every value is as likely as any other. */
export const rectangular = 1 / Math.sqrt(3);

/** What makes the measured body itself doubtful; about its centroid, in SI. */
export function listMeshTerms(measurement: Measurement, unit: LengthUnit, asMade: AsMade | null): BudgetTerm[] {
  const body = measureBody(measurement, unit);
  if (body === undefined) return [];
  const halves: [UncertaintyTermName, BodyChange[]][] = [
    ['facets', listFacetChanges(measurement, unit)],
    ['as-made', asMade ? [changeAsMade(body, asMade)] : []],
    ['gap', boundAnywhere(body, convertToMetres(measurement.openings?.lostVolume ?? 0, unit, 3))],
    ['polygons', boundAnywhere(body, convertToMetres(measurement.polygonVolume ?? 0, unit, 3))],
    ['file-rounding', boundRounding(body, measurement, unit)],
    ['arithmetic', boundArithmetic(body)],
  ];
  return halves.map(([name, changes]) => ({ name, changes: changes.filter(isSomething).map((change) => scaleChange(change, rectangular)) })).filter(({ changes }) => changes.length > 0);
}

const isSomething = ({ content, first, second, area, densityKgM3 }: BodyChange): boolean => [content, ...first, ...Object.values(second), area, densityKgM3].some((element) => element !== 0);

function listFacetChanges({ facetDoubt }: Measurement, unit: LengthUnit): BodyChange[] {
  return (facetDoubt?.body.spread ?? []).map((change, k) => convertChange(change, facetDoubt?.area.spread[k] ?? 0, unit));
}

/**
 * scale: x becomes (1 + s) x about the centroid, so the content grows by 3 s, the second moments by 5 s, the area by 2 s. offset: δ∫f dV = t ∫f dA; what it does to
 * the area hangs on the curvature, which is not measured.
 */
function changeAsMade({ volume, second, area, surfaceFirst, surfaceSecond }: MeasuredBody, asMade: AsMade): BodyChange {
  if (asMade.kind === 'scale') return { ...noChange, content: 3 * asMade.spread * volume, second: mapSymmetric(second, (element) => 5 * asMade.spread * element), area: 2 * asMade.spread * area };
  const { spreadM } = asMade;
  return { ...noChange, content: spreadM * area, first: mapVector(surfaceFirst, (element) => spreadM * element), second: mapSymmetric(surfaceSecond, (element) => spreadM * element), area: spreadM === 0 ? 0 : null };
}

/** A volume that may be missing or too much anywhere in the box. */
function boundAnywhere({ reach }: MeasuredBody, volume: number): BodyChange[] {
  if (volume === 0) return [];
  return boundChanges(volume, mapVector(reach, (far) => volume * far), computePointSecond(volume, reach));
}

/** Half a unit in the last place of binary32; of text, of the sixth digit, the fewest that programs write as a rule. As shares of the largest coordinate. */
const binaryShare = 1 / 16_777_216;
const writtenShare = 5e-6;
const binaryFormats: readonly Measurement['format'][] = ['stl-binary', 'ply-binary', 'gltf', 'glb'];

/** Half the length of all edges of a mesh of n even facets is about 2 √(A n); twice that is taken, since facets are uneven. */
const edgesPerRoot = 4;

/**
 * Every vertex within ε of where it was meant: |δ∫f dV| ≤ ε ∫|f| dA, and ∫|x| dA ≤ √(A ∫x² dA), ∫|xy| dA ≤ √(∫x² dA ∫y² dA) by Cauchy and Schwarz.
 * A bound, and a wide one: roundings of many vertices cancel. The area changes by at most ε times half the length of all edges, which is estimated from its facets.
 */
function boundRounding({ area, surfaceSecond: { xx, yy, zz } }: MeasuredBody, { boundingBox: { min, max }, format, facets }: Measurement, unit: LengthUnit): BodyChange[] {
  const share = binaryFormats.includes(format) ? binaryShare : writtenShare;
  const squares = ([0, 1, 2] as const).reduce<number>((sum, k) => sum + square(share * Math.max(Math.abs(min[k]), Math.abs(max[k]))), 0);
  const offset = convertToMetres(Math.sqrt(squares), unit);
  const spread = (one: number, other: number): number => offset * Math.sqrt(Math.max(0, one * other));
  return boundChanges(offset * area, [spread(area, xx), spread(area, yy), spread(area, zz)], { xx: offset * xx, yy: offset * yy, zz: offset * zz, xy: spread(xx, yy), yz: spread(yy, zz), zx: spread(zz, xx) }, offset * edgesPerRoot * Math.sqrt(area * facets));
}

const square = (x: number): number => x * x;

/** By the measurement's own bounds: relative to the content, to the diagonal, and to content times diagonal². */
function boundArithmetic({ volume, area, diagonal, errorBound, surfaceErrorBound }: MeasuredBody): BodyChange[] {
  const second = errorBound * volume * diagonal * diagonal;
  const first = errorBound * volume * diagonal;
  return boundChanges(errorBound * volume, [first, first, first], { xx: second, yy: second, zz: second, xy: second, yz: second, zx: second }, surfaceErrorBound * area);
}
