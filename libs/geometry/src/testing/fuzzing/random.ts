/** Draws that a seed decides. */
export interface Random {
  /** A whole number from 0 up to, and without, `end`. */
  below(end: number): number;
  /** True once in so many times. */
  oneIn(times: number): boolean;
  pick<Item>(items: readonly Item[]): Item;
}

/** A generator of 32 bits with a multiplication a draw (after Tommy Ettinger's public-domain mulberry32). */
export function createRandom(seed: number): Random {
  let state = seed | 0;
  const draw = (): number => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
  const below = (end: number): number => Math.floor(draw() * end);
  return {
    below,
    oneIn: (times) => below(times) === 0,
    pick: (items) => {
      if (items.length === 0) throw new Error('Nothing to pick from.');
      return items[below(items.length)] as (typeof items)[number];
    },
  };
}
