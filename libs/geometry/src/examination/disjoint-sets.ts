import { allocate } from '../grow-array';

/** Sets of the numbers below a count, which are joined and never parted; 4 bytes a number. */
export interface DisjointSets {
  /** The number that stands for a member's set: its least member. */
  find(member: number): number;
  /** Joins two sets; false where they were one already. */
  join(one: number, two: number): boolean;
}

export function createDisjointSets(count: number): DisjointSets {
  const parents = allocate(() => new Uint32Array(count));
  for (let k = 0; k < count; k++) parents[k] = k;

  function find(member: number): number {
    let at = member;
    for (;;) {
      const parent = parents[at] ?? 0;
      if (parent === at) return at;
      const next = parents[parent] ?? 0;
      // Halving the path on the way keeps later searches short.
      parents[at] = next;
      at = next;
    }
  }

  return {
    find,
    join(one, two) {
      const a = find(one);
      const b = find(two);
      if (a === b) return false;
      if (a < b) parents[b] = a;
      else parents[a] = b;
      return true;
    },
  };
}
