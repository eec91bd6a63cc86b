import { findLane, type CompiledLane } from './compiled-lane';
import { windowBytes } from './lane-memory';
import type { ReadingLimits } from '../limits';

/** So little text is read sooner without the lane. */
const leastBytes = 128;
/** The lane takes no word that is longer. */
const longestWord = 256;

/** The part of a chunk that lies in the lane's memory. */
export interface LaneWindow {
  /** Forgets what lies there: to be called where a new chunk begins, whose bytes may lie where others did. */
  forget(): void;
  /**
   * Sees to it that the text from `from` on lies in the lane's memory; gives the place in the window. Undefined where too little is left of the chunk.
   *
   * @param before the byte before the chunk
   */
  place(bytes: Uint8Array, from: number, before: number): number | undefined;
}

/** The window that was placed last: there is one memory for all readers. */
let holder: object | undefined;

export function createLaneWindow({ text }: CompiledLane): LaneWindow {
  const self = {};
  let begin = 0;
  let end = 0;

  function load(bytes: Uint8Array, from: number, before: number): void {
    begin = from;
    end = Math.min(bytes.length, from + windowBytes);
    text[0] = from > 0 ? (bytes[from - 1] ?? 0) : before;
    text.set(bytes.subarray(from, end), 1);
    text[1 + end - from] = 0;
    holder = self;
  }

  return {
    forget() {
      if (holder === self) holder = undefined;
    },
    place(bytes, from, before) {
      if (bytes.length - from < leastBytes) return undefined;
      // What is left of a window is used up to its last quarter, so that a text which the lane often stops in isn't copied again and again.
      const isLoaded = holder === self && from >= begin && (end === bytes.length || end - from >= windowBytes / 4);
      if (!isLoaded) load(bytes, from, before);
      return from - begin;
    },
  };
}

/** The lane, where it runs and what it takes stays within the limits on words and lines; those it does not watch. */
export function findLaneWithin({ maximumWordBytes, maximumLineBytes }: Pick<ReadingLimits, 'maximumWordBytes' | 'maximumLineBytes'>): CompiledLane | undefined {
  return maximumWordBytes >= longestWord && maximumLineBytes >= 2 * windowBytes ? findLane() : undefined;
}
