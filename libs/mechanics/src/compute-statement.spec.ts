import { statementRecord, type Measurement, type Setting } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { computeStatement } from './compute-statement';

// Two boxes as an asymmetric housing, in mm: 60 × 40 × 10 at the origin, and x 0–10, y 0–30, z 10–60. Integrals by hand from the boxes.
const second = { xx: 16093461.538461538, yy: 9554000, zz: 9634461.5, xy: 1153846.154, yz: -1384615.385, zx: -6923076.923 };
const measurement: Measurement = {
  measuringVersion: 'm1',
  format: 'stl-binary',
  facets: 28,
  origin: [0, 0, 0],
  boundingBox: { min: [0, 0, 0], max: [60, 40, 60] },
  volume: {
    content: 39000,
    centreFromOrigin: [20.3846153846, 18.0769230769, 16.5384615385],
    // ∫x² from the moments: (Iyy + Izz - Ixx)/2 and so on.
    second: { ...second, xx: (24726923.077 + 17650000 - 16188461.538) / 2, yy: (17650000 + 16188461.538 - 24726923.077) / 2, zz: (16188461.538 + 24726923.077 - 17650000) / 2 },
  },
  surface: { content: 13600, centreFromOrigin: [20, 18, 17], second },
  soundness: { closed: true, oriented: true, outward: true, turned: false, boundaryEdges: 0, nonManifoldEdges: 0, degenerateFacets: 0, duplicateFacets: 0, defensible: true, findings: [] },
};
const setting: Setting = { lengthUnit: 'mm', densityKgM3: 2700, axis: { kind: 'mesh', along: 'z' }, drive: null };
const source = { file: 'housing.stl', sha256: 'ab'.repeat(32) };

describe('the statement of the two-box housing in aluminium', () => {
  const statement = computeStatement(measurement, setting, source);

  it('is a record of the contract', () => {
    expect(statementRecord.parse(statement)).toEqual(statement);
  });

  it('has mass, centre and principal moments in SI', () => {
    expect(statement?.volumeM3).toBeCloseTo(3.9e-5, 18);
    expect(statement?.massKg).toBeCloseTo(0.1053, 14);
    expect(statement?.centreOfMassM?.[0]).toBeCloseTo(0.0203846153846, 14);
    // Computed independently: 9745212.200, 23822394.423, 24997777.992 at unit density.
    const scale = 2700e-15;
    for (const [k, moment] of [9745212.2, 23822394.423, 24997777.992].entries()) {
      expect(Math.abs((statement?.principalMomentsKgM2?.[k] ?? 0) / (moment * scale) - 1)).toBeLessThan(1e-9);
    }
    expect(statement?.axes).toBe('distinct');
    expect(statement?.aboutAxis?.inertiaKgM2).toBeCloseTo(17650000 * scale, 14);
  });

  it('gives volume, area, box and centre without a density, and no mass', () => {
    const bare = computeStatement(measurement, { ...setting, densityKgM3: null }, source);
    expect(bare).toMatchObject({ volumeM3: statement?.volumeM3, areaM2: statement?.areaM2, boundingBoxM: statement?.boundingBoxM, centreOfMassM: statement?.centreOfMassM });
    expect(bare).toMatchObject({ massKg: null, inertiaAtCentreOfMassKgM2: null, principalMomentsKgM2: null, principalAxes: null, axes: null, radiiOfGyrationM: null, aboutAxis: null });
  });

  it('says nothing while the unit is not stated', () => {
    expect(computeStatement(measurement, { ...setting, lengthUnit: null }, source)).toBeUndefined();
  });

  it('gives area and box of a mesh that is not defensible, and no figure that needs an inside', () => {
    const open = computeStatement({ ...measurement, volume: null }, setting, source);
    expect(open?.areaM2).toBeCloseTo(0.0136, 16);
    expect(open).toMatchObject({ volumeM3: null, massKg: null, centreOfMassM: null, inertiaAtCentreOfMassKgM2: null, aboutAxis: null });
  });
});
