import { statementRecord, type Integrals, type Measurement, type Setting, type Shell, type StatementRecord, type Vector3 } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { findCombinedBody } from './combine-bodies';
import { computeStatement } from './compute-statement';
import { checkShellDensities } from './shell-bodies';
import { makeBlock, makeMeasurement, plainSetting } from './testing/bodies';

/** The shell of a block; `sign` -1 for the wall of a hollow. */
function makeShell(size: Vector3, centre: Vector3, kind: Shell['kind'], inside: number | null, sign: 1 | -1 = 1): Shell {
  const [a, b, c] = size;
  const content = sign * a * b * c;
  const volume: Integrals = { content, centreFromOrigin: centre, second: { xx: (content * a * a) / 12, yy: (content * b * b) / 12, zz: (content * c * c) / 12, xy: 0, yz: 0, zx: 0 }, errorBound: 1e-15 };
  return { kind, facets: 12, firstFacet: 0, inside, turned: false, boundingBox: { min: [0, 0, 0], max: [1, 1, 1] }, area: 1, volume };
}

const shells = [makeShell([2, 3, 4], [0, 0, 0], 'solid', null), makeShell([1, 1, 2], [0.2, 0, 0.5], 'cavity', 0, -1), makeShell([0.5, 0.5, 0.5], [0.2, 0, 0.5], 'detached', 1), makeShell([1, 2, 1], [4, 0, 0], 'detached', null)];

const block = (k: number, density: number) => {
  const [size, centre, sign] = ([[[2, 3, 4], [0, 0, 0], 1], [[1, 1, 2], [0.2, 0, 0.5], -1], [[0.5, 0.5, 0.5], [0.2, 0, 0.5], 1], [[1, 2, 1], [4, 0, 0], 1]] as [Vector3, Vector3, number][])[k] ?? [[0, 0, 0], [0, 0, 0], 0];
  return makeBlock(sign * density * size[0] * size[1] * size[2], size, centre);
};

function makeAssembly(): Measurement {
  const whole = findCombinedBody([block(0, 1), block(1, 1), block(2, 1), block(3, 1)]);
  if (whole === undefined) throw new Error('It weighs nothing.');
  const { xx, yy, zz, xy, yz, zx } = whole.inertiaAtCentreOfMassKgM2;
  const measurement = makeMeasurement(whole.massKg, whole.centreOfMassM, { xx: (yy + zz - xx) / 2, yy: (zz + xx - yy) / 2, zz: (xx + yy - zz) / 2, xy: -xy, yz: -yz, zx: -zx });
  return { ...measurement, shells, soundness: { ...measurement.soundness, shells: 4, cavities: 1 }, boundingBox: { min: [-1, -1.5, -2], max: [4.5, 1.5, 2] } };
}

const assembly = makeAssembly();
const setting: Setting = { ...plainSetting, densityKgM3: 1000, densitySpreadKgM3: 10 };
const state = (given: Partial<Setting>, measurement = assembly): StatementRecord => {
  const statement = computeStatement(measurement, { ...setting, ...given }, { file: '', sha256: '' });
  if (statement === undefined) throw new Error('There is no statement.');
  expect(statementRecord.parse(statement)).toEqual(statement);
  return statement;
};

function expectBody(statement: StatementRecord, bodies: ReturnType<typeof block>[]): void {
  const body = findCombinedBody(bodies);
  expect((statement.massKg ?? NaN) / (body?.massKg ?? NaN)).toBeCloseTo(1, 12);
  for (const k of [0, 1, 2] as const) expect(statement.centreOfMassM?.[k]).toBeCloseTo(body?.centreOfMassM[k] ?? NaN, 12);
  for (const key of ['xx', 'yy', 'zz', 'xy', 'yz', 'zx'] as const) expect(statement.inertiaAtCentreOfMassKgM2?.[key]).toBeCloseTo(body?.inertiaAtCentreOfMassKgM2[key] ?? NaN, 8);
}

describe('shells with a density of their own, or left out', () => {
  it('with none stated the whole is of one density', () => {
    expectBody(state({ shellDensities: [] }), [block(0, 1000), block(1, 1000), block(2, 1000), block(3, 1000)]);
    expect(state({ shellDensities: [] })).toEqual(state({}));
  });

  it('a shell of another density counts with that', () => {
    expectBody(state({ shellDensities: [{ shell: 3, densityKgM3: 7800 }] }), [block(0, 1000), block(1, 1000), block(2, 1000), block(3, 7800)]);
  });

  it('a cavity goes with the shell around it, and what lies loose in it does not', () => {
    expectBody(state({ shellDensities: [{ shell: 0, densityKgM3: 7800 }] }), [block(0, 7800), block(1, 7800), block(2, 1000), block(3, 1000)]);
  });

  it('a shell that is left out weighs nothing and has no volume; a cavity that is left out is filled', () => {
    const without = state({ shellDensities: [{ shell: 0, densityKgM3: null }] });
    expectBody(without, [block(2, 1000), block(3, 1000)]);
    expect(without.volumeM3).toBeCloseTo(2.125, 14);
    expectBody(state({ shellDensities: [{ shell: 1, densityKgM3: null }] }), [block(0, 1000), block(2, 1000), block(3, 1000)]);
  });

  it('the spread of the density is that of the rest alone', () => {
    const { uncertainty, massKg } = state({ shellDensities: [{ shell: 3, densityKgM3: 7800 }] });
    const rest = 24 - 2 + 0.125;
    expect(uncertainty?.massKg).toBeCloseTo((2 * 10 * rest) / Math.sqrt(3), 2);
    expect((uncertainty?.massKg ?? NaN) / (massKg ?? NaN)).toBeLessThan(0.01);
    expect(uncertainty?.centreOfMassM[0]).toBeGreaterThan(1e-4);
  });

  it('a weighing weighs all of it: the density of the rest follows from what is left', () => {
    const { densityKgM3, massKg, weighing, uncertainty } = state({ densityKgM3: null, densitySpreadKgM3: null, shellDensities: [{ shell: 3, densityKgM3: 7800 }], weighing: { massKg: 40_000, uncertaintyKg: 10 } });
    expect(densityKgM3).toBeCloseTo((40_000 - 2 * 7800) / 22.125, 9);
    expect(massKg).toBeCloseTo(40_000, 8);
    expect(weighing?.massKg).toBe(40_000);
    expect(uncertainty?.massKg).toBeCloseTo(10, 6);
  });

  it('without a density of the rest there is no mass, unless every shell has its own', () => {
    expect(state({ densityKgM3: null, densitySpreadKgM3: null, shellDensities: [{ shell: 3, densityKgM3: 7800 }] })).toMatchObject({ massKg: null, centreOfMassM: null, uncertainty: null });
    const all = state({ densityKgM3: null, densitySpreadKgM3: null, shellDensities: [0, 2, 3].map((shell) => ({ shell, densityKgM3: 2000 })) });
    expectBody(all, [block(0, 2000), block(1, 2000), block(2, 2000), block(3, 2000)]);
    expect(all.uncertainty?.terms.map(({ name }) => name)).not.toContain('density');
  });

  it('where shells were not listed, are too many, are not there or are open, nothing is given that hangs on them, and a sentence says why', () => {
    const given = { shellDensities: [{ shell: 3, densityKgM3: 7800 }] };
    const cases: [Measurement, Pick<Setting, 'shellDensities'>, RegExp][] = [
      [{ ...assembly, shells: null }, given, /not examined/],
      [{ ...assembly, soundness: { ...assembly.soundness, shells: 900 } }, given, /Only 4 shells/],
      [{ ...assembly, soundness: { ...assembly.soundness, cavities: null } }, given, /lie in which was not examined/],
      [assembly, { shellDensities: [{ shell: 4, densityKgM3: 1 }] }, /no shell 5/],
      [assembly, { shellDensities: [{ shell: 3, densityKgM3: 1 }, { shell: 3, densityKgM3: 2 }] }, /two densities/],
      [{ ...assembly, shells: shells.map((shell, k) => (k === 2 ? { ...shell, kind: 'open', volume: null } : shell)) }, given, /Shell 3 is open/],
    ];
    for (const [measurement, shellDensities, sentence] of cases) {
      expect(checkShellDensities(measurement, shellDensities)).toMatch(sentence);
      expect(state(shellDensities, measurement)).toMatchObject({ massKg: null, centreOfMassM: null, principalMomentsKgM2: null, correction: null, uncertainty: null });
    }
    expect(checkShellDensities({ ...assembly, shells: null }, {})).toBeUndefined();
    expect(checkShellDensities(assembly, given)).toBeUndefined();
  });
});
