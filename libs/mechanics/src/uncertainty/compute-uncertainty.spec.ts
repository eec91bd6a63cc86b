import { statementRecord, type FigureChanges, type IntegralChange, type Measurement, type Setting, type StatementRecord, type Vector3 } from '@masswright/contracts';
import { beforeAll, describe, expect, it } from 'vitest';
import { computeStatement } from '../compute-statement';
import { createDraw, makeMeasurement, plainSetting } from '../testing/bodies';
import { weighMeasurement } from '../weigh-measurement';
import type { BodyChange } from './body-change';
import { computeBudget, computeUncertainty } from './compute-uncertainty';

const source = { file: 'housing.stl', sha256: 'ab'.repeat(32) };

// The two-box housing in metres, 60 × 40 × 10 and 10 × 30 × 50: second moments about the centre, of unlike size and with products.
const second = { xx: 1.309e-8, yy: 4.556e-9, zz: 1.163e-8, xy: 1.154e-9, yz: -1.385e-9, zx: -6.923e-9 };
const volumeM3 = 3.9e-5;
const lostVolume = 3e-9;

function makeDoubtful(): Measurement {
  const draw = createDraw(4711);
  const change = (size: number): IntegralChange => {
    const one = (scale: number): number => size * scale * (2 * draw() - 1);
    return { content: one(volumeM3), first: [one(1e-6), one(1e-6), one(1e-6)], second: { xx: one(1e-8), yy: one(1e-8), zz: one(1e-8), xy: one(1e-8), yz: one(1e-8), zx: one(1e-8) } };
  };
  const plain = makeMeasurement(volumeM3, [0.02, 0.018, 0.0165], second);
  return {
    ...plain,
    boundingBox: { min: [0, 0, 0], max: [0.06, 0.04, 0.06] },
    facetDoubt: { body: { correction: change(5e-4), spread: [change(1e-3), change(5e-4), change(2e-4)] }, area: { correction: 1e-5, spread: [2e-6, 1e-6, 5e-7] } },
    openings: { loops: [], loopCount: 1, volumes: { aboutMiddle: volumeM3, fanned: volumeM3 }, lostVolume },
    polygonVolume: 1e-8,
  };
}

const doubtful = makeDoubtful();
const setting: Setting = { ...plainSetting, densityKgM3: 2700, densitySpreadKgM3: 27, asMade: { kind: 'scale', spread: 1e-3 }, axis: { kind: 'typed', pointM: [0.1, -0.02, 0], direction: [0.36, 0.48, 0.8] } };

function state(measurement: Measurement, given: Setting): StatementRecord {
  const statement = computeStatement(measurement, given, source);
  if (statement === undefined) throw new Error('There is no statement.');
  return statement;
}

function getUncertainty(measurement: Measurement, given: Setting): NonNullable<StatementRecord['uncertainty']> {
  const { uncertainty } = state(measurement, given);
  if (uncertainty === null) throw new Error('There is no uncertainty.');
  return uncertainty;
}

/** The figures that have an uncertainty, in one row. */
function listFigures(figures: Pick<StatementRecord, 'volumeM3' | 'massKg' | 'centreOfMassM' | 'principalMomentsKgM2' | 'radiiOfGyrationM'> & { inertiaAtCentreOfMassKgM2: FigureChanges['inertiaAtCentreOfMassKgM2']; aboutAxis: FigureChanges['aboutAxis'] }): Record<string, number> {
  const { volumeM3: volume, massKg: mass, centreOfMassM, inertiaAtCentreOfMassKgM2: tensor, principalMomentsKgM2, radiiOfGyrationM, aboutAxis } = figures;
  const vector = (name: string, of: Vector3 | null): [string, number][] => (of ?? [NaN, NaN, NaN]).map((element, k) => [`${name} ${k + 1}`, element]);
  return Object.fromEntries([
    ['volume', volume ?? NaN],
    ['mass', mass ?? NaN],
    ...vector('centre', centreOfMassM),
    ...(['xx', 'yy', 'zz', 'xy', 'yz', 'zx'] as const).map((key) => [key, tensor?.[key] ?? NaN] as const),
    ...vector('moment', principalMomentsKgM2),
    ...vector('radius', radiiOfGyrationM),
    ['about axis', aboutAxis?.inertiaKgM2 ?? NaN],
    ['radius about axis', aboutAxis?.radiusOfGyrationM ?? NaN],
  ]);
}

/** The measurement of the body that has this much more, its integrals computed anew: the centroid moves, and the second moments are about where it is then. */
function perturb(measurement: Measurement, { content, first, second: more }: BodyChange): Measurement {
  const { volume } = measurement;
  if (volume === null) throw new Error('There is no volume.');
  const now = volume.content + content;
  const d: Vector3 = [first[0] / now, first[1] / now, first[2] / now];
  const about = (key: keyof typeof more, i: 0 | 1 | 2, j: 0 | 1 | 2): number => volume.second[key] + more[key] - now * d[i] * d[j];
  return {
    ...measurement,
    volume: {
      ...volume,
      content: now,
      centreFromOrigin: [volume.centreFromOrigin[0] + d[0], volume.centreFromOrigin[1] + d[1], volume.centreFromOrigin[2] + d[2]],
      second: { xx: about('xx', 0, 0), yy: about('yy', 1, 1), zz: about('zz', 2, 2), xy: about('xy', 0, 1), yz: about('yz', 1, 2), zx: about('zx', 2, 0) },
    },
  };
}

/** Standard deviations of all figures when every source is drawn anew, each with its standard uncertainty. */
function sample(measurement: Measurement, given: Setting, count: number): Record<string, number> {
  const budget = computeBudget(measurement, given, 'm', weighMeasurement(measurement, given, 'm'));
  const changes = (budget?.terms ?? []).flatMap((term) => term.changes);
  const draw = createDraw(1234);
  const normal = (): number => Math.sqrt(-2 * Math.log(1 - draw())) * Math.cos(2 * Math.PI * draw());
  const sums: Record<string, { sum: number; square: number }> = {};
  const unperturbed = state(measurement, given);
  const base = listFigures(unperturbed);
  const density = unperturbed.densityKgM3 ?? NaN;
  for (let k = 0; k < count; k++) {
    const total = changes.reduce(
      (all, change) => {
        const z = normal();
        for (const i of [0, 1, 2] as const) all.first[i] += z * change.first[i];
        for (const key of ['xx', 'yy', 'zz', 'xy', 'yz', 'zx'] as const) all.second[key] += z * change.second[key];
        return { ...all, content: all.content + z * change.content, densityKgM3: all.densityKgM3 + z * change.densityKgM3 };
      },
      { content: 0, first: [0, 0, 0] as Vector3, second: { xx: 0, yy: 0, zz: 0, xy: 0, yz: 0, zx: 0 }, area: 0, densityKgM3: 0 },
    );
    const figures = listFigures(state({ ...perturb(measurement, total), facetDoubt: null, openings: null }, { ...given, asMade: null, weighing: null, densityKgM3: density + total.densityKgM3 }));
    for (const [name, figure] of Object.entries(figures)) {
      const off = figure - (base[name] ?? NaN);
      const entry = (sums[name] ??= { sum: 0, square: 0 });
      entry.sum += off;
      entry.square += off * off;
    }
  }
  return Object.fromEntries(Object.entries(sums).map(([name, { sum, square }]) => [name, Math.sqrt(square / count - (sum / count) * (sum / count))]));
}

describe('the budget against Monte Carlo: integrals drawn anew, every figure computed anew', () => {
  const count = 4000;
  const settings: [string, Setting][] = [
    ['a density with a spread, a tolerance of scale, an axis beside the part', setting],
    ['a tolerance along the normal, a mesh axis through the centre', { ...setting, asMade: { kind: 'offset', spreadM: 2e-5 }, axis: { kind: 'mesh', along: 'y' } }],
    ['a weighing that sets the density, a principal axis', { ...setting, weighing: { massKg: 0.105, uncertaintyKg: 0.0004 }, axis: { kind: 'principal', number: 2 } }],
  ];
  it.each(settings)('%s', (_name, given) => {
    const sampled = sample(doubtful, given, count);
    const stated = listFigures(getUncertainty(doubtful, given));
    for (const [name, expanded] of Object.entries(stated)) {
      expect(expanded, name).toBeGreaterThan(0);
      // 4000 draws tell a standard deviation to 1.1 %.
      expect((sampled[name] ?? NaN) / (expanded / 2), name).toSatisfy((ratio: number) => ratio > 0.95 && ratio < 1.05);
    }
  }, 60_000);
});

describe('terms of the budget', () => {
  const only = (measurement: Partial<Measurement>, given: Partial<Setting> = {}): ReturnType<typeof getUncertainty> =>
    getUncertainty({ ...doubtful, facetDoubt: null, openings: null, polygonVolume: 0, ...measurement }, { ...setting, densitySpreadKgM3: null, asMade: null, ...given });
  const shareOf = ({ terms }: ReturnType<typeof getUncertainty>, name: string): FigureChanges | undefined => terms.find((term) => term.name === name)?.shares;

  it('a record with all of them is a record of the contract, its shares add to one and the largest stands first', () => {
    const statement = state(doubtful, setting);
    expect(statementRecord.parse(statement)).toEqual(statement);
    const { terms } = getUncertainty(doubtful, setting);
    expect(terms.map(({ name }) => name).sort()).toEqual(['arithmetic', 'as-made', 'density', 'facets', 'file-rounding', 'gap', 'polygons']);
    for (const name of Object.keys(listFigures(statement))) expect(terms.reduce((sum, { shares }) => sum + (listFigures(shares)[name] ?? NaN), 0)).toBeCloseTo(1, 12);
    const ofMass = terms.map(({ shares }) => shares.massKg ?? NaN);
    expect(ofMass).toEqual([...ofMass].sort((one, two) => two - one));
    expect(terms[0]?.name).toBe('density');
    expect(terms[0]?.shares.massKg).toBeGreaterThan(0.8);
    expect(terms.at(-1)?.name).toBe('arithmetic');
  });

  it('a spread ±a of the density is a/√3, doubled: 1 % of it is 1.1547 % of mass and moments, and nothing of centre, radii and volume', () => {
    const uncertainty = only({ format: 'stl-binary' }, { densitySpreadKgM3: 27 });
    const statement = state(doubtful, setting);
    expect((uncertainty.massKg ?? NaN) / (statement.massKg ?? NaN)).toBeCloseTo(0.02 / Math.sqrt(3), 8);
    expect((uncertainty.principalMomentsKgM2?.[1] ?? NaN) / (statement.principalMomentsKgM2?.[1] ?? NaN)).toBeCloseTo(0.02 / Math.sqrt(3), 6);
    expect(shareOf(uncertainty, 'density')).toMatchObject({ volumeM3: 0, areaM2: 0, centreOfMassM: [0, 0, 0] });
  });

  it('a tolerance of scale is three times itself in volume, twice in area, five times in moments and once in radii', () => {
    const uncertainty = only({}, { asMade: { kind: 'scale', spread: 0.01 } });
    const statement = state(doubtful, setting);
    const of = (figure: number | null | undefined, value: number | null | undefined): number => (figure ?? NaN) / (value ?? NaN) / (0.02 / Math.sqrt(3));
    expect(of(uncertainty.volumeM3, statement.volumeM3)).toBeCloseTo(3, 5);
    expect(of(uncertainty.areaM2, statement.areaM2)).toBeCloseTo(2, 5);
    expect(of(uncertainty.principalMomentsKgM2?.[2], statement.principalMomentsKgM2?.[2])).toBeCloseTo(5, 5);
    expect(of(uncertainty.radiiOfGyrationM?.[0], statement.radiiOfGyrationM?.[0])).toBeCloseTo(1, 5);
  });

  it('a tolerance along the normal of a block does what moving its six faces does', () => {
    const [a, b, c] = [0.06, 0.04, 0.02];
    const volumeOf = (t: number): number => (a + 2 * t) * (b + 2 * t) * (c + 2 * t);
    const momentOf = (t: number): number => (volumeOf(t) * ((a + 2 * t) ** 2 + (b + 2 * t) ** 2)) / 12;
    const face = (area: number, off: number, wide: number): number => 2 * area * (off * off + 0 * wide);
    const surface = { xx: face(b * c, a / 2, 0) + (2 * a * b + 2 * a * c) * (a * a) / 12, yy: face(a * c, b / 2, 0) + (2 * a * b + 2 * b * c) * (b * b) / 12, zz: face(a * b, c / 2, 0) + (2 * a * c + 2 * b * c) * (c * c) / 12, xy: 0, yz: 0, zx: 0 };
    const plain = makeMeasurement(a * b * c, [0, 0, 0], { xx: (a * b * c * a * a) / 12, yy: (a * b * c * b * b) / 12, zz: (a * b * c * c * c) / 12, xy: 0, yz: 0, zx: 0 });
    const block: Measurement = { ...plain, boundingBox: { min: [-a / 2, -b / 2, -c / 2], max: [a / 2, b / 2, c / 2] }, surface: { ...plain.surface, content: 2 * (a * b + b * c + c * a), second: surface } };
    const t = 1e-5;
    const uncertainty = getUncertainty(block, { ...plainSetting, densityKgM3: 1000, asMade: { kind: 'offset', spreadM: t } });
    const half = (by: (offset: number) => number): number => (by(t) - by(-t)) / 2;
    expect(uncertainty.volumeM3 / ((2 / Math.sqrt(3)) * half(volumeOf))).toBeCloseTo(1, 5);
    expect((uncertainty.inertiaAtCentreOfMassKgM2?.zz ?? NaN) / ((2000 / Math.sqrt(3)) * half(momentOf))).toBeCloseTo(1, 5);
    expect(uncertainty.centreOfMassM[0]).toBeLessThan(1e-8);
    expect(uncertainty.areaM2).toBeNull();
  });

  it('a weighing that sets the density fixes the mass, whatever is in doubt about the volume', () => {
    const uncertainty = getUncertainty(doubtful, { ...setting, weighing: { massKg: 0.105, uncertaintyKg: 0.0004 } });
    expect(uncertainty.massKg).toBeCloseTo(0.0004, 12);
    expect(uncertainty.terms.map(({ name }) => name)).toContain('weighing');
    expect(uncertainty.terms.map(({ name }) => name)).not.toContain('density');
    const disagrees = getUncertainty(doubtful, { ...setting, material: { id: 'al', name: 'Aluminium' }, weighing: { massKg: 0.08, uncertaintyKg: 0.0004 } });
    expect(disagrees.terms.map(({ name }) => name)).toContain('density');
  });

  it('a hairline gap and a polygon may have lost volume anywhere in the box', () => {
    const uncertainty = only({ openings: doubtful.openings });
    expect(uncertainty.volumeM3).toBeGreaterThan((2 * lostVolume) / Math.sqrt(3));
    expect(uncertainty.centreOfMassM[0]).toBeGreaterThan((2 * lostVolume * 0.04) / Math.sqrt(3) / volumeM3 / 1.0001);
    expect(only({ polygonVolume: lostVolume }).volumeM3).toBe(uncertainty.volumeM3);
  });

  it('coordinates far away have fewer digits, and those of a text fewer still', () => {
    const near = only({}), far = only({ boundingBox: { min: [10, 10, 10], max: [10.06, 10.04, 10.06] }, origin: [10, 10, 10] }), text = only({ format: 'obj' });
    expect(far.volumeM3 / near.volumeM3).toBeGreaterThan(100);
    expect(text.volumeM3 / near.volumeM3).toBeGreaterThan(50);
    expect(near.volumeM3 / volumeM3).toBeLessThan(1e-5);
  });

  it('without a density volume and centre are in doubt, and no more', () => {
    const bare = state(doubtful, { ...setting, densityKgM3: null, densitySpreadKgM3: null });
    const given = state(doubtful, setting);
    expect(bare.uncertainty).toMatchObject({ massKg: null, inertiaAtCentreOfMassKgM2: null, principalMomentsKgM2: null, radiiOfGyrationM: null, aboutAxis: null });
    expect(bare.uncertainty?.volumeM3).toBe(given.uncertainty?.volumeM3);
    for (const k of [0, 1, 2] as const) expect((bare.uncertainty?.centreOfMassM[k] ?? NaN) / (given.uncertainty?.centreOfMassM[k] ?? NaN)).toBeCloseTo(1, 12);
    expect(statementRecord.parse(bare)).toEqual(bare);
  });

  it('where there is no volume or no unit there is no budget', () => {
    expect(state({ ...doubtful, volume: null }, setting)).toMatchObject({ uncertainty: null, correction: null });
    expect(computeUncertainty(doubtful, { ...setting, lengthUnit: null })).toBeNull();
    expect(computeUncertainty(doubtful, setting)).toEqual({ correction: state(doubtful, setting).correction, uncertainty: state(doubtful, setting).uncertainty });
  });

  it('a measurement from before there were bounds, openings and predictions has the terms that can be told', () => {
    const { facetDoubt: _facets, openings: _openings, polygonVolume: _polygons, shells: _shells, ...rest } = doubtful;
    const { errorBound: _bound, ...volume } = doubtful.volume ?? { errorBound: 0 };
    const { errorBound: _other, ...surface } = doubtful.surface;
    const older = JSON.parse(JSON.stringify({ ...rest, volume, surface })) as Measurement;
    const statement = state(older, { ...setting, asMade: null });
    expect(statement.correction).toBeNull();
    expect(statement.uncertainty?.terms.map(({ name }) => name)).toEqual(['density', 'file-rounding']);
  });
});

describe('the predicted correction', () => {
  let exact: Record<string, number>;
  beforeAll(() => {
    const correction = doubtful.facetDoubt?.body.correction ?? { content: NaN, first: [NaN, NaN, NaN] as Vector3, second };
    const [base, corrected] = [state(doubtful, setting), state(perturb(doubtful, { ...correction, area: 0, densityKgM3: 0 }), setting)].map(listFigures);
    exact = Object.fromEntries(Object.entries(corrected ?? {}).map(([name, figure]) => [name, figure - (base?.[name] ?? NaN)]));
  });

  it('is, in every figure, what the body with the predicted integrals would have more', () => {
    const { correction } = state(doubtful, setting);
    if (correction === null) throw new Error('There is no correction.');
    for (const [name, change] of Object.entries(listFigures(correction))) expect(Math.abs(change / (exact[name] ?? NaN) - 1), name).toBeLessThan(0.05);
    expect(correction.areaM2).toBe(1e-5);
  });

  it('is never mixed into the figures', () => {
    const { correction: _c, uncertainty: _u, axes: _a, ...figures } = state(doubtful, setting);
    expect(state({ ...doubtful, facetDoubt: null }, setting)).toMatchObject(figures);
  });
});
