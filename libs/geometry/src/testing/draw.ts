/** Numbers by chance that a seed says again. */
export interface Draw {
  readonly seed: number;
  /** From 0 to below 1. */
  readonly next: () => number;
  readonly between: (least: number, greatest: number) => number;
  /** A whole number, both ends included. */
  readonly whole: (least: number, greatest: number) => number;
  readonly pick: <Item>(items: readonly Item[]) => Item;
}

/** The seed of the run: given as FC_SEED, or another one every time. */
export const runSeed = Number(process.env['FC_SEED'] ?? Math.floor(Math.random() * 2 ** 31));

/** Mulberry32: 32 bits of state, enough to choose test bodies by. */
export function createDraw(seed = runSeed): Draw {
  let state = seed | 0;
  const next = (): number => {
    state = (state + 0x6d2b79f5) | 0;
    let bits = Math.imul(state ^ (state >>> 15), state | 1);
    bits ^= bits + Math.imul(bits ^ (bits >>> 7), bits | 61);
    return ((bits ^ (bits >>> 14)) >>> 0) / 4_294_967_296;
  };
  const whole = (least: number, greatest: number): number => least + Math.floor(next() * (greatest - least + 1));
  return {
    seed,
    next,
    whole,
    between: (least, greatest) => least + next() * (greatest - least),
    pick: (items) => {
      const item = items[whole(0, items.length - 1)];
      if (item === undefined) throw new Error('There is nothing to pick from.');
      return item;
    },
  };
}
