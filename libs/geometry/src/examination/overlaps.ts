import type { WeldedMesh } from '../weld-corners';
import { createContacts, findPassages, type Contacts } from './contacts';
import { createFacetTree, type FacetTree } from './facet-tree';
import { haveSeparatePictures, shareCorner } from './relate-facets';
import { visitBox } from './search-tree';
import { createPairList, haveSameCorners, visitMeetings, type Meeting, type PairList } from './self-intersections';
import type { ShellFigures } from './shell-figures';
import { facetsOfShell, noShell, type ShellTable } from './shells';

export interface Overlaps {
  /** Null where the mesh was not examined to the end. */
  selfIntersections: PairList | null;
  /** Shells that pass through others. */
  shells: Set<number>;
  /** Facets of different shells that pass through each other. */
  meetings: PairList;
}

export interface OverlapSearch {
  mesh: WeldedMesh;
  /** Facets from here on were added to close gaps, and are held against none. */
  fileFacets: number;
  /** Over all facets of the shells. */
  tree: FacetTree;
  shells: ShellTable;
  figures: ShellFigures;
  /** Facets that are read the other way round. */
  flips: Uint8Array | undefined;
  /** Groups of facets with the same corners. */
  duplicates: readonly (readonly number[])[];
  /** Pairs of shells whose boxes meet; undefined where there are too many. */
  closePairs: readonly (readonly [number, number])[] | undefined;
  maximumIntersectionFacets: number;
}

/**
 * Which facets pass through each other, and which shells. Up to the limit all facets are held against all; beyond it only those in the boxes that shells have
 * in common, if they are no more than that.
 */
export function findOverlaps(search: OverlapSearch): Overlaps {
  const { mesh, shells, tree, flips, fileFacets } = search;
  const isWhole = fileFacets <= search.maximumIntersectionFacets;
  const overlaps: Overlaps = { selfIntersections: createPairList(mesh), shells: new Set(), meetings: createPairList(mesh) };
  const contacts = createContacts(shells.count);
  const visit = (meeting: Meeting): void => noteMeeting(search, overlaps, contacts, meeting);
  if (isWhole) {
    // Neighbours in one shell may touch; only what passes through or lies upon another counts.
    const areApart = (one: number, two: number): boolean => shells.shellOf[one] === shells.shellOf[two] && shareCorner(mesh, one, two) && haveSeparatePictures(mesh, one, two);
    const wanted = (one: number, two: number): boolean => one < fileFacets && two < fileFacets && !areApart(one, two);
    if (!visitMeetings(mesh, tree, flips, wanted, visit)) overlaps.selfIntersections = null;
  } else {
    overlaps.selfIntersections = null;
    const common = findCommonFacets(search);
    const wanted = (one: number, two: number): boolean => shells.shellOf[one] !== shells.shellOf[two];
    if (common.length > 0) visitMeetings(mesh, createFacetTree(mesh, common), flips, wanted, visit);
  }
  for (const { shells: passing, facets } of findPassages(search, contacts, overlaps.shells)) {
    for (const shell of passing) overlaps.shells.add(shell);
    overlaps.meetings.add(...facets);
  }
  noteDoubled(search, overlaps);
  return overlaps;
}

function noteMeeting({ mesh, shells, figures }: OverlapSearch, overlaps: Overlaps, contacts: Contacts, { one, two, relation }: Meeting): void {
  const passes = relation === 'crossing' || relation === 'upon';
  // Doubled facets have a finding of their own, and `noteDoubled`.
  const isDoubled = haveSameCorners(mesh, one, two);
  if (passes && !isDoubled) overlaps.selfIntersections?.add(one, two);
  const a = shells.shellOf[one] ?? noShell, b = shells.shellOf[two] ?? noShell;
  if (a === b || !encloses(shells, figures, a) || !encloses(shells, figures, b)) return;
  if (passes && isDoubled) return;
  if (passes) {
    overlaps.shells.add(a).add(b);
    overlaps.meetings.add(one, two);
    return;
  }
  if (relation === 'against') {
    contacts.addUpon(one, b);
    contacts.addUpon(two, a);
  } else {
    contacts.add(a, b, one, two);
    contacts.add(b, a, two, one);
  }
}

const encloses = ({ open }: ShellTable, { signs }: ShellFigures, shell: number): boolean => shell !== noShell && open[shell] === 0 && signs[shell] !== 0;

/**
 * Two facets with the same corners that face the same way count the space behind them twice, whether they belong to two shells or to one: bodies of which one is
 * inside out may share faces so that nothing tells them apart.
 */
function noteDoubled({ mesh, shells, figures, flips, duplicates }: OverlapSearch, overlaps: Overlaps): void {
  for (const group of duplicates) {
    const first: [number | undefined, number | undefined] = [undefined, undefined];
    for (const facet of group) {
      const shell = shells.shellOf[facet] ?? noShell;
      if (!encloses(shells, figures, shell)) continue;
      const facing = findFacing(mesh, facet) ^ (flips?.[facet] ?? 0) ? 1 : 0;
      const other = first[facing];
      first[facing] ??= facet;
      if (other === undefined) continue;
      overlaps.shells.add(shell).add(shells.shellOf[other] ?? shell);
      overlaps.meetings.add(other, facet);
    }
  }
}

/** 1 where the greatest corner of a facet follows its least one, else 0. */
function findFacing({ corners }: WeldedMesh, facet: number): number {
  const [a, b, c] = [corners[3 * facet] ?? 0, corners[3 * facet + 1] ?? 0, corners[3 * facet + 2] ?? 0];
  const least = Math.min(a, b, c), greatest = Math.max(a, b, c);
  return (a === least ? b : b === least ? c : a) === greatest ? 1 : 0;
}

/** Facets looked at for being in a common box, before there are too many such boxes. */
const mostLookedAt = 50_000_000;

/** Facets in the boxes that two shells have in common; none where there are more than the limit. */
function findCommonFacets({ tree, shells, figures, closePairs, fileFacets, maximumIntersectionFacets }: OverlapSearch): Uint32Array {
  const found = new Set<number>();
  let lookedAt = 0;
  for (const [one, two] of closePairs ?? []) {
    if (!encloses(shells, figures, one) || !encloses(shells, figures, two)) continue;
    const common = new Float64Array(6);
    for (let k = 0; k < 6; k++) {
      const p = figures.boxes[6 * one + k] ?? 0, q = figures.boxes[6 * two + k] ?? 0;
      common[k] = k < 3 ? Math.max(p, q) : Math.min(p, q);
    }
    const complete = visitBox(tree, common, (facet) => {
      lookedAt += 1;
      const shell = shells.shellOf[facet];
      if (facet < fileFacets && (shell === one || shell === two)) found.add(facet);
      return found.size <= maximumIntersectionFacets && lookedAt <= mostLookedAt;
    });
    if (!complete) return new Uint32Array(0);
  }
  return Uint32Array.from(found).sort();
}

/** All facets that belong to shells: those for which a tree is made. */
export function listShellFacets(shells: ShellTable): Uint32Array {
  return shells.count === 1 ? facetsOfShell(shells, 0) : shells.facets.slice().sort();
}
