import { describe, expect, it } from 'vitest';
import { changeShellDensity, findShellChoice, findShellRefusal } from './shell-densities';

describe('densities of shells', () => {
  it('a shell counts as the part until it is given its own density or left out', () => {
    const given = changeShellDensity([], 2, 7850);
    const both = changeShellDensity(given, 0, null);
    expect(both).toEqual([
      { shell: 0, densityKgM3: null },
      { shell: 2, densityKgM3: 7850 },
    ]);
    expect([0, 1, 2].map((shell) => findShellChoice(both, shell))).toEqual(['out', 'part', 'own']);
    expect(changeShellDensity(both, 2, undefined)).toEqual([{ shell: 0, densityKgM3: null }]);
    expect(findShellChoice(undefined, 0)).toBe('part');
  });
  it('none can have one while the shells are not examined', () => {
    expect(findShellRefusal({ shells: null, soundness: { shells: null } as never })).toContain('not examined');
  });
});
