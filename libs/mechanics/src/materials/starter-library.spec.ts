import { describe, expect, it } from 'vitest';
import { material } from '@masswright/contracts';
import { findStarterMaterial, findStarterMaterialByName, starterLibrary } from './starter-library';

// Typed again from the check values, section 7, in g/cm³ as they stand there (woods in kg/m³): densities, and ranges where one is given.
// Sources: nist = NIST list as shipped with Geant4 (secondary), handbook = room-temperature list (secondary), tpsx = NASA, physics = OpenStax, memory.
const table: [id: string, gramsPerCm3: number | [number, number], source: string, other?: number][] = [
  ['al', 2.699, 'NIST'], ['al-6061-t6', 2.7, 'handbook'], ['al-7075-t6', 2.81, 'handbook'], ['al-2024', 2.78, 'handbook'], ['al-2219', 2.81, 'TPSX'], ['al-5052', 2.68, 'memory'], ['al-a380', 2.74, 'memory'],
  ['iron', 7.874, 'NIST'], ['steel-1020', 7.87, 'handbook'], ['steel-1040', 7.845, 'handbook'], ['steel-mild', 7.85, 'memory'], ['steel-4140', 7.85, 'handbook'], ['steel-4340', 7.85, 'handbook'],
  ['steel-304', 8.0, 'memory', 7.9], ['steel-316', 8.0, 'handbook'], ['steel-321', 8.03, 'TPSX'], ['steel-17-4ph', 7.8, 'memory', 7.83], ['iron-grey', 7.15, 'handbook'], ['iron-ductile', 7.15, 'handbook'],
  ['cu', 8.96, 'NIST'], ['cu-c110', 8.89, 'handbook'], ['cu-c360', 8.5, 'handbook'], ['cu-c260', 8.53, 'handbook'], ['cu-c280', 8.39, 'handbook'], ['cu-c220', 8.8, 'handbook'], ['cu-c170', 8.26, 'handbook'], ['cu-bronze', 8.82, 'NIST'],
  ['ti', 4.51, 'memory', 4.54], ['ti-6al-4v', 4.43, 'memory'], ['mg', 1.74, 'NIST'], ['mg-az31b', 1.77, 'handbook'], ['mg-az91e', 1.81, 'handbook'], ['ni', 8.902, 'NIST'], ['ni-718', 8.19, 'memory'], ['ni-625', 8.44, 'memory'],
  ['zn', 7.133, 'NIST'], ['pb', 11.35, 'NIST'], ['sn', 7.31, 'NIST'], ['w', 19.3, 'NIST'], ['w-heavy-alloy', [17, 18.5], 'memory'],
  ['abs', [1.01, 1.07], 'memory'], ['pla', [1.21, 1.27], 'memory'], ['petg', [1.25, 1.29], 'memory'], ['asa', 1.07, 'memory'], ['pa12', 1.01, 'memory'], ['pa12-sintered', [0.93, 0.99], 'memory'], ['pa66', 1.14, 'NIST'],
  ['pc', 1.2, 'NIST'], ['pom', 1.425, 'NIST'], ['peek', [1.28, 1.32], 'memory'], ['pe', 0.94, 'NIST'], ['pp', 0.9, 'NIST'], ['ps', 1.06, 'NIST'], ['pvc-rigid', 1.4, 'memory', 1.3], ['pmma', 1.19, 'NIST'], ['ptfe', 2.2, 'NIST'],
  ['pet', 1.4, 'NIST'], ['polyimide', 1.42, 'NIST'], ['natural-rubber', 0.92, 'NIST'], ['neoprene', 1.23, 'NIST'], ['fkm', 1.8, 'NIST'], ['tpu', 1.2, 'memory'], ['resin-cured', [1.15, 1.2], 'memory'],
  ['balsa', 0.13, 'TPSX'], ['cypress', 0.46, 'TPSX'], ['mahogany', 0.54, 'TPSX'], ['maple', 0.71, 'TPSX'], ['teak', 0.64, 'TPSX'], ['oak', 0.71, 'OpenStax'], ['pine', 0.373, 'OpenStax'],
  ['glass', 2.4, 'NIST'], ['glass-borosilicate', 2.23, 'NIST'], ['concrete', 2.3, 'NIST'], ['granite', 2.7, 'OpenStax'], ['graphite', [1.75, 1.9], 'memory'], ['alumina', 3.97, 'NIST'],
  ['aramid-fibre', 1.44, 'NIST'], ['cfrp', [1.5, 1.6], 'memory'], ['fr4', 1.85, 'memory'], ['water', 0.9982, 'OpenStax'], ['cork', 0.24, 'OpenStax'], ['eps', 0.0163, 'TPSX'],
];

describe('the starter library', () => {
  it('holds the materials of the check values and no others', () => {
    expect(starterLibrary.map(({ id }) => id).sort()).toEqual(table.map(([id]) => id).sort());
  });

  it.each(table)('%s has the density of the check values and names its source', (id, density, source, other) => {
    const found = findStarterMaterial(id);
    if (found === undefined) throw new Error('It is not in the library.');
    const { densityKgM3, densitySpreadKgM3 } = found;
    if (typeof density === 'number') expect(densityKgM3).toBeCloseTo(density * 1000, 9);
    else {
      expect(densityKgM3 - densitySpreadKgM3).toBeCloseTo(density[0] * 1000, 9);
      expect(densityKgM3 + densitySpreadKgM3).toBeCloseTo(density[1] * 1000, 9);
    }
    expect(found.source).toContain(source);
    // Where another source has another density, the spread reaches it.
    if (other !== undefined) expect(Math.abs(other * 1000 - densityKgM3)).toBeLessThanOrEqual(densitySpreadKgM3);
  });

  it('names each material once, letter case left aside, and finds it by that name', () => {
    expect(new Set(starterLibrary.map(({ id }) => id)).size).toBe(starterLibrary.length);
    expect(new Set(starterLibrary.map(({ name }) => name.toLowerCase())).size).toBe(starterLibrary.length);
    for (const one of starterLibrary) expect(findStarterMaterialByName(`  ${one.name.toUpperCase()} `)).toBe(one);
    expect(findStarterMaterialByName('Unobtainium')).toBeUndefined();
  });

  it('has ids that can stand in an address and never look like an organisation’s own', () => {
    for (const { id } of starterLibrary) expect(id).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/);
    for (const { id } of starterLibrary) expect(id.length).toBeLessThan(30);
  });

  it('states spreads of half a per cent to a sixth of the density, and keeps to the contract', () => {
    for (const one of starterLibrary) {
      const share = one.densitySpreadKgM3 / one.densityKgM3;
      expect(share, one.id).toBeGreaterThanOrEqual(0.003);
      expect(share, one.id).toBeLessThanOrEqual(0.16);
      const whole = { ...one, origin: 'starter', version: 1, archivedAt: null, usedByParts: 0, can: { edit: false } };
      expect(material.parse(whole)).toEqual(whole);
    }
  });

  it.each([
    ['steel', 0.013],
    ['aluminium', 0.03],
    ['wood', 0.15],
  ] as const)('of %s the widest spread is %d of the density', (group, widest) => {
    const shares = starterLibrary.filter((one) => one.group === group && !one.id.startsWith('iron-')).map((one) => one.densitySpreadKgM3 / one.densityKgM3);
    expect(Math.max(...shares)).toBeLessThanOrEqual(widest + 1e-9);
  });
});
