import type { WeldedMesh } from '../weld-corners';
import { findCrossingLine } from './crossing-line';
import type { FacetTree } from './facet-tree';
import { keptPlaces, type Notes } from './notes';
import { relateFacets, type FacetRelation } from './relate-facets';
import { visitClosePairs } from './search-tree';

/**
 * Pairs of facets whose boxes meet that are looked at before a mesh is given up as too entangled: some seconds' work. A sound mesh has some ten a facet; all facets
 * about one corner meet, so that a fan of 7,000 is given up, too.
 */
export const mostClosePairs = 30_000_000;

export interface Meeting {
  one: number;
  two: number;
  relation: Exclude<FacetRelation, 'apart'>;
}

/**
 * Hands on all pairs of facets that meet in more than the corners and sides that they share. `upon` and `against` are by the winding as it is read: `flips`
 * has 1 for each facet that is read the other way round. Facets with the same three corners are `upon` or `against` each other.
 *
 * @returns false where the mesh is too entangled to be looked at to the end
 */
export function visitMeetings(mesh: WeldedMesh, tree: FacetTree, flips: Uint8Array | undefined, wanted: (one: number, two: number) => boolean, visit: (meeting: Meeting) => void): boolean {
  let looked = 0;
  return visitClosePairs(tree, (f, g) => {
    looked += 1;
    if (!wanted(f, g)) return looked <= mostClosePairs;
    const one = Math.min(f, g), two = Math.max(f, g);
    const relation = relateFacets(mesh, one, two);
    if (relation === 'apart') return looked <= mostClosePairs;
    const flipped = (flips?.[one] ?? 0) !== (flips?.[two] ?? 0);
    if (relation === 'upon' || relation === 'against') visit({ one, two, relation: (relation === 'upon') !== flipped ? 'upon' : 'against' });
    else visit({ one, two, relation });
    return looked <= mostClosePairs;
  });
}

/** Pairs of facets, counted and the first of them kept. */
export interface PairList {
  add(one: number, two: number): void;
  readonly count: number;
  /** Notes the pairs: their facets, and where they meet, in the order of the file. */
  note(notes: Notes, kind: 'self-intersections' | 'overlapping-shells'): void;
}

export function createPairList(mesh: WeldedMesh): PairList {
  const pairs: [one: number, two: number][] = [];
  let count = 0;
  return {
    add(one, two) {
      count += 1;
      if (pairs.length < keptPlaces) pairs.push([one, two]);
    },
    get count() {
      return count;
    },
    note(notes, kind) {
      pairs.sort(([a, b], [c, d]) => a - c || b - d);
      for (const [one, two] of pairs) {
        notes.mark(kind, one);
        notes.mark(kind, two);
        notes.addLine(kind, findCrossingLine(mesh, one, two));
      }
    },
  };
}

/** Whether two facets have the same three corners. */
export function haveSameCorners({ corners }: WeldedMesh, one: number, two: number): boolean {
  const a = corners[3 * one], b = corners[3 * one + 1], c = corners[3 * one + 2];
  for (let k = 0; k < 3; k++) {
    const corner = corners[3 * two + k];
    if (corner !== a && corner !== b && corner !== c) return false;
  }
  return true;
}
