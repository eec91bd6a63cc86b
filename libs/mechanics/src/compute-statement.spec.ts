import { statementRecord, type StatementRecord, type Symmetric3, type Vector3 } from '@masswright/contracts';
import { lengthUnits } from '@masswright/units';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { computeStatement } from './compute-statement';
import { computeEqualBody } from './equal-body';
import { computePrincipalAxes } from './principal-axes';
import { anyMoments, anyRotation, compareTensors, makeDiagonal, makeMeasurement, plainSetting } from './testing/bodies';
import { rotateTensor } from './tensor';

const source = { file: 'housing.stl', sha256: 'ab'.repeat(32) };

/** Second moments of a body whose central tensor at unit density is this (off-diagonals -∫xy dm). */
const toSecond = ({ xx, yy, zz, xy, yz, zx }: Symmetric3): Symmetric3 => ({ xx: (yy + zz - xx) / 2, yy: (zz + xx - yy) / 2, zz: (xx + yy - zz) / 2, xy: -xy, yz: -yz, zx: -zx });

function state(...given: Parameters<typeof computeStatement>): StatementRecord {
  const statement = computeStatement(...given);
  if (statement === undefined) throw new Error('There is no statement.');
  return statement;
}

// Two boxes as an asymmetric housing, in mm: 60 × 40 × 10 at the origin, and x 0–10, y 0–30, z 10–60. Computed independently.
const housingTensor = { xx: 16188461.538461538, yy: 24726923.076923076, zz: 17650000, xy: -1153846.1538461538, yz: 1384615.3846153845, zx: 6923076.923076923 };
const housing = makeMeasurement(39000, [20.384615384615383, 18.076923076923077, 16.53846153846154], toSecond(housingTensor));
const setting = { ...plainSetting, lengthUnit: 'mm' as const, densityKgM3: 2700 };

describe('the statement of the two-box housing in aluminium', () => {
  const statement = state(housing, setting, source);

  it('is a record of the contract', () => {
    expect(statementRecord.parse(statement)).toEqual(statement);
  });

  it('has mass, centre, tensor and principal moments in SI', () => {
    expect(statement.volumeM3).toBeCloseTo(3.9e-5, 18);
    expect(statement.massKg).toBeCloseTo(0.1053, 14);
    expect(statement.centreOfMassM).toEqual([0.0203846153846, 0.0180769230769, 0.0165384615385].map((centre) => expect.closeTo(centre, 12) as number));
    const scale = 2700e-15;
    const { offDiagonals, ...tensor } = statement.inertiaAtCentreOfMassKgM2 ?? { ...makeDiagonal(0, 0, 0), offDiagonals: null };
    expect(offDiagonals).toBe('-∫xy dm');
    for (const key of ['xx', 'yy', 'zz', 'xy', 'yz', 'zx'] as const) expect(Math.abs(tensor[key] / (housingTensor[key] * scale) - 1)).toBeLessThan(1e-13);
    for (const [k, moment] of [9745212.2, 23822394.423, 24997777.992].entries()) expect(Math.abs((statement.principalMomentsKgM2?.[k] ?? NaN) / (moment * scale) - 1)).toBeLessThan(1e-9);
    expect(statement.axes).toBe('distinct');
    expect(statement.radiiOfGyrationM?.[0]).toBeCloseTo(Math.sqrt(9745212.2 / 39000) / 1000, 10);
  });

  it('has the moment about the chosen axis, through the centre or not', () => {
    expect(statement.aboutAxis).toEqual({ pointM: statement.centreOfMassM, direction: [0, 0, 1], inertiaKgM2: statement.inertiaAtCentreOfMassKgM2?.zz, radiusOfGyrationM: expect.closeTo(Math.sqrt(17650000 / 39000) / 1000, 12) as number });
    const principal = state(housing, { ...setting, axis: { kind: 'principal', number: 3 } }, source);
    expect((principal.aboutAxis?.inertiaKgM2 ?? NaN) / (principal.principalMomentsKgM2?.[2] ?? NaN)).toBeCloseTo(1, 14);
    // About the mesh frame's own z axis: from the boxes, ∫(x² + y²) = ab c (a² + b²)/3 for each.
    const typed = state(housing, { ...setting, axis: { kind: 'typed', pointM: [0, 0, 7], direction: [0, 0, -2] } }, source);
    const aboutOrigin = (24000 * (60 ** 2 + 40 ** 2)) / 3 + (15000 * (10 ** 2 + 30 ** 2)) / 3;
    expect((typed.aboutAxis?.inertiaKgM2 ?? NaN) / (aboutOrigin * 2700e-15)).toBeCloseTo(1, 13);
    expect(typed.aboutAxis).toMatchObject({ pointM: [0, 0, 7], direction: [0, 0, -1] });
  });

  it('gives volume, area, box and centre without a density, and no mass', () => {
    const bare = state(housing, { ...setting, densityKgM3: null }, source);
    expect(bare).toMatchObject({ volumeM3: statement.volumeM3, areaM2: statement.areaM2, boundingBoxM: statement.boundingBoxM, centreOfMassM: statement.centreOfMassM });
    expect(bare).toMatchObject({ massKg: null, inertiaAtCentreOfMassKgM2: null, principalMomentsKgM2: null, principalAxes: null, axes: null, radiiOfGyrationM: null, aboutAxis: null });
    expect(statementRecord.parse(bare)).toEqual(bare);
  });

  it('says nothing while the unit is not stated', () => {
    expect(computeStatement(housing, { ...setting, lengthUnit: null }, source)).toBeUndefined();
  });

  it('gives area and box of a mesh that is not defensible, and no figure that needs an inside', () => {
    const open = state({ ...housing, volume: null }, { ...setting, axis: { kind: 'typed', pointM: [0, 0, 0], direction: [1, 0, 0] } }, source);
    expect(open.areaM2).toBe(statement.areaM2);
    expect(open).toMatchObject({ volumeM3: null, massKg: null, centreOfMassM: null, inertiaAtCentreOfMassKgM2: null, axes: null, aboutAxis: null });
    expect(statementRecord.parse(open)).toEqual(open);
  });
});

describe('what a setting does', () => {
  it.each(lengthUnits)('in %s every figure scales by its dimension', (lengthUnit) => {
    const metres = state(housing, { ...setting, lengthUnit: 'm' }, source);
    const scaled = state(housing, { ...setting, lengthUnit }, source);
    const factor = { micron: 1e-6, mm: 1e-3, cm: 0.01, m: 1, inch: 0.0254, foot: 0.3048 }[lengthUnit];
    const ratio = (one: number | null | undefined, other: number | null | undefined, power: number): void => expect((one ?? NaN) / ((other ?? NaN) * factor ** power)).toBeCloseTo(1, 13);
    ratio(scaled.volumeM3, metres.volumeM3, 3);
    ratio(scaled.areaM2, metres.areaM2, 2);
    ratio(scaled.massKg, metres.massKg, 3);
    ratio(scaled.centreOfMassM?.[1], metres.centreOfMassM?.[1], 1);
    ratio(scaled.boundingBoxM.max[2], metres.boundingBoxM.max[2], 1);
    ratio(scaled.principalMomentsKgM2?.[0], metres.principalMomentsKgM2?.[0], 5);
    ratio(scaled.radiiOfGyrationM?.[2], metres.radiiOfGyrationM?.[2], 1);
  });

  it('density scales mass and moments, and leaves axes, radii and centre', () => {
    const [light, heavy] = [state(housing, setting, source), state(housing, { ...setting, densityKgM3: 8 * 2700 }, source)];
    expect(heavy.massKg).toBe(8 * (light.massKg ?? NaN));
    expect(heavy.principalMomentsKgM2).toEqual(light.principalMomentsKgM2?.map((moment) => 8 * moment));
    expect([heavy.principalAxes, heavy.radiiOfGyrationM, heavy.centreOfMassM]).toEqual([light.principalAxes, light.radiiOfGyrationM, light.centreOfMassM]);
  });

  it('the same body far from the frame has the same central figures and another centre', () => {
    const [near, far] = [state(housing, setting, source), state({ ...housing, origin: [1e7, 0, -1e7] }, setting, source)];
    expect(far.inertiaAtCentreOfMassKgM2).toEqual(near.inertiaAtCentreOfMassKgM2);
    expect(far.centreOfMassM?.[0]).toBeCloseTo(1e4 + 0.0203846153846, 9);
  });
});

describe('solids of the handbook set (m = 2 kg, from memory)', () => {
  const solids: [name: string, volume: number, moments: Vector3][] = [
    ['a hollow cylinder R .05, r .03, h .1', Math.PI * (0.05 ** 2 - 0.03 ** 2) * 0.1, [0.00336667, 0.00336667, 0.0034]],
    ['a cone R .05, h .1', (Math.PI * 0.05 ** 2 * 0.1) / 3, [0.0015, 0.0015, 0.0015]],
    ['a torus c .05, a .01', 9.869604e-5, [0.002625, 0.002625, 0.00515]],
    ['a hemisphere R .05', (2 / 3) * Math.PI * 0.05 ** 3, [0.001296875, 0.001296875, 0.002]],
    ['an ellipsoid .03/.04/.05', 2.513274e-4, [0.00164, 0.00136, 0.001]],
    ['a rectangular pyramid .06 × .04 × .1', 8e-5, [0.00091, 0.00111, 0.00052]],
  ];
  it.each(solids)('%s: moments, radii and kind of axes', (_name, volume, moments) => {
    const unitTensor = makeDiagonal(...(moments.map((moment) => (moment * volume) / 2) as Vector3));
    const statement = state(makeMeasurement(volume, [0, 0, 0], toSecond(unitTensor)), { ...plainSetting, densityKgM3: 2 / volume }, source);
    const ascending = [...moments].sort((one, other) => one - other);
    expect(statement.massKg).toBeCloseTo(2, 14);
    expect(statement.principalMomentsKgM2).toEqual(ascending.map((moment) => expect.closeTo(moment, 15) as number));
    expect(statement.radiiOfGyrationM).toEqual(ascending.map((moment) => expect.closeTo(Math.sqrt(moment / 2), 14) as number));
    const kind = new Set(moments).size === 3 ? 'distinct' : new Set(moments).size === 1 ? 'ball' : ascending[0] === ascending[1] ? 'disc-like' : 'rod-like';
    expect(statement.axes).toBe(kind);
  });

  it('a wedge has -∫xy dm = +m a b/36 off its diagonal', () => {
    const [a, b, L, volume] = [0.06, 0.04, 0.1, 1.2e-4];
    const second = { xx: (volume * a * a) / 18, yy: (volume * b * b) / 18, zz: (volume * L * L) / 12, xy: (-volume * a * b) / 36, yz: 0, zx: 0 };
    const { inertiaAtCentreOfMassKgM2 } = state(makeMeasurement(volume, [a / 3, b / 3, L / 2], second), { ...plainSetting, densityKgM3: 2 / volume }, source);
    expect(inertiaAtCentreOfMassKgM2).toMatchObject({ xx: expect.closeTo(0.00184444, 8) as number, yy: expect.closeTo(0.00206667, 8) as number, zz: expect.closeTo(0.000577778, 9) as number, xy: expect.closeTo(0.000133333, 9) as number });
  });

  it('the tensor put together from principal moments and axes is the tensor, and the equal body has the same moments', () => {
    fc.assert(
      fc.property(anyMoments, anyRotation, (moments, rotation) => {
        const tensor = rotateTensor(makeDiagonal(...moments), rotation);
        const statement = state(makeMeasurement(3, [0, 0, 0], toSecond(tensor)), plainSetting, source);
        const { principalMomentsKgM2, principalAxes, massKg, inertiaAtCentreOfMassKgM2 } = statement;
        if (principalMomentsKgM2 === null || principalAxes === null || massKg === null || inertiaAtCentreOfMassKgM2 === null) throw new Error('Figures are missing.');
        const [x, y, z] = principalAxes;
        const back = rotateTensor(makeDiagonal(...principalMomentsKgM2), [[x[0], y[0], z[0]], [x[1], y[1], z[1]], [x[2], y[2], z[2]]]);
        const { offDiagonals: _, ...found } = inertiaAtCentreOfMassKgM2;
        expect(compareTensors(back, found)).toBeLessThan(1e-14);
        const [a, b, c] = computeEqualBody(principalMomentsKgM2, massKg);
        const ellipsoid = computePrincipalAxes(makeDiagonal((massKg * (b * b + c * c)) / 5, (massKg * (c * c + a * a)) / 5, (massKg * (a * a + b * b)) / 5)).moments;
        for (const k of [0, 1, 2] as const) expect(ellipsoid[k] / principalMomentsKgM2[k]).toBeCloseTo(1, 10);
      }),
    );
  });
});
