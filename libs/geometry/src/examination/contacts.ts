import type { WeldedMesh } from '../weld-corners';
import type { FacetTree } from './facet-tree';
import { locatePoint, type Location, type Probe } from './locate-point';
import type { ShellTable } from './shells';

/** Facets of one shell that touch another without passing through a facet of it. */
export interface Contacts {
  add(shell: number, other: number, facet: number, touched: number): void;
  /** A facet that lies back to back with one of another shell is on neither side of it. */
  addUpon(facet: number, other: number): void;
  list(): Contact[];
}

interface Contact {
  shell: number;
  other: number;
  /** Each with a facet that it touches. */
  facets: [facet: number, touched: number][];
}

/** So many facets of a pair of shells, and in so many pairs, are asked on which side they lie; bodies that touch in more are taken to touch and no more. */
const mostFacets = 2000;
const mostPairs = 50_000;
/** Points inside of facets are asked by exact sums of many terms. */
const mostInsides = 2000;
/** Facets that the rays of all these points may meet: seconds. Where there are more, the rest is taken to touch and no more. */
const mostFacetsMet = 20_000_000;
const mostMetByInsides = 500_000;

export function createContacts(shellCount: number): Contacts {
  // For each pair of shells facets and what they touch, in turn: arrays, since there may be many pairs.
  const pairs = new Map<number, number[]>();
  const upon = new Set<number>();
  return {
    add(shell, other, facet, touched) {
      const key = shell * shellCount + other;
      const known = pairs.get(key);
      if (known === undefined) {
        if (pairs.size < mostPairs) pairs.set(key, [facet, touched]);
      } else if (known.length < 2 * mostFacets && known[known.length - 2] !== facet) known.push(facet, touched);
    },
    addUpon: (facet, other) => void upon.add(facet * shellCount + other),
    list: () =>
      [...pairs.keys()].sort((one, two) => one - two).map((key) => {
        const other = key % shellCount;
        const facets: Contact['facets'] = [];
        const known = pairs.get(key) ?? [];
        for (let k = 0; k < known.length; k += 2) {
          const facet = known[k] ?? 0;
          if (!upon.has(facet * shellCount + other)) facets.push([facet, known[k + 1] ?? 0]);
        }
        return { shell: (key - other) / shellCount, other, facets };
      }),
  };
}

/** Two shells that pass through each other, and a facet within the other one with the facet that it touches. */
export interface Passage {
  shells: readonly [number, number];
  facets: readonly [number, number];
}

/**
 * Surfaces may pass through each other along their edges alone, so that no facet passes through another. Then some of the facets that touch lie within the
 * other shell and some outside.
 *
 * @param known shells that pass through others anyway
 */
export function findPassages({ mesh, tree, shells }: { mesh: WeldedMesh; tree: FacetTree; shells: ShellTable }, contacts: Contacts, known: ReadonlySet<number>): Passage[] {
  const locations = new Map<number, Location>();
  let insides = 0;
  let metByInsides = 0;
  let met = 0;
  const locate = (probe: Probe): Location | undefined => {
    if (!('vertex' in probe)) {
      if (insides >= mostInsides || metByInsides > mostMetByInsides) return undefined;
      const location = locatePoint(mesh, tree, shells, probe);
      insides += 1;
      metByInsides += location.facetsMet;
      return location;
    }
    const known = locations.get(probe.vertex);
    if (known !== undefined || met > mostFacetsMet) return known;
    const location = locatePoint(mesh, tree, shells, probe);
    met += location.facetsMet;
    locations.set(probe.vertex, location);
    return location;
  };
  return contacts.list().flatMap(({ shell, other, facets }): Passage[] => {
    if (known.has(shell) && known.has(other)) return [];
    let inside: readonly [number, number] | undefined;
    let isOutside = false;
    for (const pair of facets) {
      const side = findFacetSide(mesh, pair[0], other, locate);
      if (side === 'inside') inside ??= pair;
      else if (side === 'outside') isOutside = true;
      if (inside !== undefined && isOutside) return [{ shells: [shell, other], facets: inside }];
    }
    return [];
  });
}

/** Where a facet lies that does not pass through a shell: by the first of its points that isn't on the surface of it. */
function findFacetSide({ corners }: WeldedMesh, facet: number, shell: number, locate: (probe: Probe) => Location | undefined): 'inside' | 'outside' | 'upon' {
  const [a, b, c] = [corners[3 * facet] ?? 0, corners[3 * facet + 1] ?? 0, corners[3 * facet + 2] ?? 0];
  for (const probe of [{ vertex: a }, { vertex: b }, { vertex: c }, { inside: [a, b, c] as const }]) {
    const location = locate(probe);
    if (location !== undefined && !location.touched.has(shell)) return location.windings.has(shell) ? 'inside' : 'outside';
  }
  return 'upon';
}
