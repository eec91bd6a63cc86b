import { createDraw } from '../draw';

/** Draws that a seed decides. */
export interface Random {
  /** A whole number from 0 up to, and without, `end`. */
  below(end: number): number;
  /** True once in so many times. */
  oneIn(times: number): boolean;
  pick<Item>(items: readonly Item[]): Item;
}

export function createRandom(seed: number): Random {
  const { next, pick } = createDraw(seed);
  const below = (end: number): number => Math.floor(next() * end);
  return { below, oneIn: (times) => below(times) === 0, pick };
}
