import type { ShellFigures } from './shell-figures';
import type { ShellTable } from './shells';

/** How the shells are read, and which of them can't be read as a body or as the wall of a hollow. */
export interface ShellReading {
  /** 1 where a shell's facets are read the other way round. */
  turned: Uint8Array;
  /** Sign of each volume as it is read. */
  signs: Int8Array;
  /** Shells that add to a body they lie within, or take away where there is none. */
  misplaced: number[];
}

/**
 * Where the whole is negative, every facet is read the other way round; then only shells that lie within no other and are negative are, each by itself. What is
 * negative at an odd depth is a cavity. All else is left as it is and told.
 *
 * @param containers undefined where it was not examined: then no shell is turned by itself, nor misplaced
 */
export function readShells(shells: ShellTable, figures: ShellFigures, containers: readonly (readonly number[])[] | undefined, isWholeNegative: boolean): ShellReading {
  const reading: ShellReading = { turned: new Uint8Array(shells.count), signs: new Int8Array(shells.count), misplaced: [] };
  for (let shell = 0; shell < shells.count; shell++) {
    if (shells.open[shell] === 1) continue;
    const depth = containers?.[shell]?.length ?? 0;
    const stored = figures.signs[shell] ?? 0;
    const whole = isWholeNegative ? -stored : stored;
    const turnsBack = containers !== undefined && depth === 0 && whole < 0;
    reading.turned[shell] = isWholeNegative !== turnsBack ? 1 : 0;
    const sign = turnsBack ? -whole : whole;
    reading.signs[shell] = sign;
    if (containers !== undefined && sign !== 0 && sign > 0 === (depth % 2 === 1)) reading.misplaced.push(shell);
  }
  return reading;
}

/** The smallest of the shells around one; undefined where there is none. */
export function findParent(figures: ShellFigures, containers: readonly number[]): number | undefined {
  let parent: number | undefined;
  for (const outer of containers) {
    if (parent === undefined || Math.abs(figures.volumes[outer] ?? 0) < Math.abs(figures.volumes[parent] ?? 0)) parent = outer;
  }
  return parent;
}
