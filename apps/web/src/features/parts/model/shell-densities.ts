import type { Measurement, Setting, ShellDensity } from '@masswright/contracts';
import { checkShellDensities } from '@masswright/mechanics';

/** How a shell counts: with the part's density, one of its own, or not at all. */
export type ShellChoice = 'part' | 'own' | 'out';

export function findShellDensity(densities: readonly ShellDensity[] | undefined, shell: number): ShellDensity | undefined {
  return densities?.find((one) => one.shell === shell);
}

export function findShellChoice(densities: readonly ShellDensity[] | undefined, shell: number): ShellChoice {
  const stated = findShellDensity(densities, shell);
  return stated === undefined ? 'part' : stated.densityKgM3 === null ? 'out' : 'own';
}

/** The list with another density for one shell: undefined gives it the part's, null leaves it out. Ascending, so that equal choices are equal lists. */
export function changeShellDensity(densities: readonly ShellDensity[] | undefined, shell: number, densityKgM3: number | null | undefined): ShellDensity[] {
  const others = (densities ?? []).filter((one) => one.shell !== shell);
  if (densityKgM3 === undefined) return others;
  return [...others, { shell, densityKgM3 }].sort((one, other) => one.shell - other.shell);
}

/** Why no shell of a mesh can have a density of its own; undefined where each can. */
export function findShellRefusal(measurement: Pick<Measurement, 'shells' | 'soundness'>): string | undefined {
  return checkShellDensities(measurement, { shellDensities: [{ shell: 0, densityKgM3: null }] });
}

/** Why the densities of shells that are stated can't be taken into account. */
export const findShellFault = (measurement: Measurement, setting: Setting): string | undefined => checkShellDensities(measurement, setting);
