import { allocate } from '../grow-array';
import { facetOf, runsForward, type EdgeTable } from './edge-table';
import type { Notes } from './notes';

/**
 * Notes facets that are turned against their neighbours (`turned-facets`): in every piece that hangs together by edges of two facets, winding is carried from
 * facet to facet, and the lesser number of facets is the turned one (at a tie, those that do not wind as the first facet of the piece). A piece that can't be
 * wound one way throughout, as a Möbius strip can't, has no turned facets: its `unbalanced-edges` tell of it.
 *
 * @returns for each facet 1 where it is turned; undefined where none is
 */
export function checkOrientation(notes: Notes, table: EdgeTable): Uint8Array | undefined {
  if (!hasTurnedPair(notes, table)) return undefined;
  const { facetCount } = notes.mesh;
  const pieces = createParitySets(facetCount);
  const { starts, halfEdges, edgeCount } = table;
  for (let edge = 0; edge < edgeCount; edge++) {
    const begin = starts[edge] ?? 0;
    if ((starts[edge + 1] ?? 0) !== begin + 2) continue;
    const one = halfEdges[begin] ?? 0, two = halfEdges[begin + 1] ?? 0;
    pieces.join(facetOf(one), facetOf(two), runsForward(notes.mesh, one) === runsForward(notes.mesh, two) ? 1 : 0);
  }
  // Facets less twice the turned ones of each piece, by its first facet.
  const majority = new Int32Array(facetCount);
  for (let facet = 0; facet < facetCount; facet++) {
    const { root, parity } = pieces.find(facet);
    majority[root] = (majority[root] ?? 0) + (parity === 1 ? -1 : 1);
  }
  const turned = new Uint8Array(facetCount);
  for (let facet = 0; facet < facetCount; facet++) {
    const { root, parity } = pieces.find(facet);
    if (pieces.isTwisted(root) || (parity === 1) === (majority[root] ?? 0) < 0) continue;
    turned[facet] = 1;
    notes.add('turned-facets');
    notes.mark('turned-facets', facet);
  }
  return notes.count('turned-facets') > 0 ? turned : undefined;
}

function hasTurnedPair({ mesh }: Notes, { starts, halfEdges, edgeCount }: EdgeTable): boolean {
  for (let edge = 0; edge < edgeCount; edge++) {
    const begin = starts[edge] ?? 0;
    if ((starts[edge + 1] ?? 0) === begin + 2 && runsForward(mesh, halfEdges[begin] ?? 0) === runsForward(mesh, halfEdges[begin + 1] ?? 0)) return true;
  }
  return false;
}

/** Disjoint sets whose members each know whether they wind as the one that stands for the set, which is the least. */
function createParitySets(count: number) {
  const parents = allocate(() => new Uint32Array(count));
  for (let k = 0; k < count; k++) parents[k] = k;
  const parities = new Uint8Array(count);
  const twisted = new Uint8Array(count);

  function find(member: number): { root: number; parity: number } {
    let root = member;
    let parity = 0;
    while ((parents[root] ?? 0) !== root) {
      parity ^= parities[root] ?? 0;
      root = parents[root] ?? 0;
    }
    // The path is shortened on a second walk.
    for (let at = member, left = parity; (parents[at] ?? 0) !== root && at !== root; ) {
      const next = parents[at] ?? 0;
      const step = parities[at] ?? 0;
      parents[at] = root;
      parities[at] = left;
      left ^= step;
      at = next;
    }
    return { root, parity };
  }

  return {
    find,
    isTwisted: (root: number): boolean => twisted[root] === 1,
    join(one: number, two: number, differs: number): void {
      const a = find(one);
      const b = find(two);
      const between = a.parity ^ b.parity ^ differs;
      if (a.root === b.root) {
        if (between === 1) twisted[a.root] = 1;
        return;
      }
      const [least, greatest] = a.root < b.root ? [a.root, b.root] : [b.root, a.root];
      parents[greatest] = least;
      parities[greatest] = between;
      if (twisted[greatest] === 1) twisted[least] = 1;
    },
  };
}
