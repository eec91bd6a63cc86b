import type { WeldedMesh } from '../weld-corners';
import { findClosePairs, isBoxWithin } from './close-shells';
import { findContainers } from './containment';
import { createFacetTree } from './facet-tree';
import { readShells } from './judge-shells';
import type { JudgedShells } from './list-shells';
import type { Notes } from './notes';
import { findOverlaps, listShellFacets } from './overlaps';
import { findShellFigures } from './shell-figures';
import { facetsOfShell, noShell, type ShellTable } from './shells';

export interface ShellExamination {
  judged: JudgedShells;
  /** For each facet 1 where it is read the other way round; undefined where none is. */
  turned: Uint8Array | undefined;
  selfIntersections: number | null;
}

export interface ShellContext {
  fileFacets: number;
  diagonal: number;
  /** The mesh encloses a body, whose volume as stored is negative. */
  isWholeNegative: boolean;
  /** Facets that are turned against their neighbours. */
  flipped: Uint8Array | undefined;
  /** Groups of facets with the same corners. */
  duplicates: readonly (readonly number[])[];
  maximumIntersectionFacets: number;
  maximumFacetsMet: number | undefined;
}

/** How the shells lie to each other, how each is read, and which facets pass through each other; notes what is wrong. */
export function examineShells(notes: Notes, mesh: WeldedMesh, shells: ShellTable, context: ShellContext): ShellExamination {
  const { fileFacets, maximumIntersectionFacets } = context;
  const figures = findShellFigures(mesh, shells, context.diagonal);
  const closePairs = shells.count > 1 ? findClosePairs(figures.boxes) : [];
  const needsTree = shells.count > 0 && (fileFacets <= maximumIntersectionFacets || context.duplicates.length > 0 || closePairs === undefined || closePairs.length > 0);
  const tree = needsTree ? createFacetTree(mesh, listShellFacets(shells)) : undefined;
  const asked = closePairs === undefined ? Array.from({ length: shells.count }, (_, shell) => shell) : listInner(figures.boxes, closePairs);
  const containers = tree === undefined ? [] : findContainers(mesh, tree, shells, figures, asked.filter((shell) => shells.open[shell] === 0), context.maximumFacetsMet);
  const reading = readShells(shells, figures, containers, context.isWholeNegative);
  const turned = spreadTurns(shells, reading.turned);
  const flips = combine(turned, context.flipped);
  const overlaps = tree && findOverlaps({ mesh, fileFacets, tree, shells, figures, flips, duplicates: context.duplicates, closePairs, maximumIntersectionFacets });
  const overlapping = new Set([...(overlaps?.shells ?? []), ...reading.misplaced]);
  noteShells(notes, shells, reading.turned, overlapping, reading.misplaced);
  overlaps?.meetings.note(notes, 'overlapping-shells');
  overlaps?.selfIntersections?.note(notes, 'self-intersections');
  notes.add('self-intersections', overlaps?.selfIntersections?.count ?? 0);
  const isExamined = fileFacets <= maximumIntersectionFacets && overlaps?.selfIntersections !== null;
  return { judged: { shells, figures, containers, reading, overlapping }, turned, selfIntersections: isExamined ? notes.count('self-intersections') : null };
}

/** Shells whose box lies within that of another. */
function listInner(boxes: Float64Array, closePairs: readonly (readonly [number, number])[]): number[] {
  const inner = new Set<number>();
  for (const [one, two] of closePairs) {
    if (isBoxWithin(boxes, one, two)) inner.add(one);
    if (isBoxWithin(boxes, two, one)) inner.add(two);
  }
  return [...inner].sort((one, two) => one - two);
}

function spreadTurns({ shellOf }: ShellTable, turnedShells: Uint8Array): Uint8Array | undefined {
  if (!turnedShells.includes(1)) return undefined;
  return Uint8Array.from(shellOf, (shell) => (shell === noShell ? 0 : (turnedShells[shell] ?? 0)));
}

function combine(one: Uint8Array | undefined, two: Uint8Array | undefined): Uint8Array | undefined {
  if (one === undefined || two === undefined) return one ?? two;
  return one.map((flip, facet) => flip ^ (two[facet] ?? 0));
}

function noteShells(notes: Notes, shells: ShellTable, turned: Uint8Array, overlapping: ReadonlySet<number>, misplaced: readonly number[]): void {
  const count = turned.reduce((sum, one) => sum + one, 0);
  if (count === shells.count && count > 0) notes.add('turned-whole');
  else {
    for (let shell = 0; shell < shells.count; shell++) {
      if (turned[shell] !== 1) continue;
      notes.add('turned-shells');
      for (const facet of facetsOfShell(shells, shell)) notes.mark('turned-shells', facet);
    }
  }
  notes.add('overlapping-shells', overlapping.size);
  for (const shell of misplaced) for (const facet of facetsOfShell(shells, shell)) notes.mark('overlapping-shells', facet);
}
