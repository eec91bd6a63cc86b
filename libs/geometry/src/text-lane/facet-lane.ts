import type { ReadingLimits } from '../limits';
import { laneLayout, mostFacets } from './lane-memory';
import { createLaneWindow, findLaneWithin } from './lane-window';

/**
 * Reads whole facets of ASCII STL of the usual shape, fast. It stops before the first that is unusual in any way; what that means is for the reader to say, so
 * that it makes no difference but for time.
 */
export interface FacetLane {
  /** To be called where a new chunk begins. */
  beginChunk(): void;
  /**
   * Reads facets from a place between two words on, and gives how many.
   *
   * @param before the byte before the chunk
   * @param most so many at the most
   */
  read(bytes: Uint8Array, from: number, before: number, most: number): number;
  /** The place after the last word of what was read, and the ends of lines in it. */
  readonly position: number;
  readonly lineEnds: number;
  /** Nine coordinates a facet that was read, and three numbers of its normal; until the next reading of any lane. */
  readonly corners: Float64Array;
  readonly normals: Float64Array;
}

/** Undefined where WebAssembly is missing, or where limits are so narrow that only the reader watches them. */
export function createFacetLane(limits: ReadingLimits): FacetLane | undefined {
  const lane = findLaneWithin(limits);
  if (lane === undefined) return undefined;
  const window = createLaneWindow(lane);
  const { counts, corners, normals, readFacets } = lane;
  let position = 0;
  return {
    beginChunk: () => window.forget(),
    read(bytes, from, before, most) {
      const start = most > 0 ? window.place(bytes, from, before) : undefined;
      if (start === undefined) return 0;
      const facets = readFacets(start, Math.min(most, mostFacets));
      position = from + (counts[laneLayout.POSITION >> 2] ?? 0) - start;
      return facets;
    },
    get position() {
      return position;
    },
    get lineEnds() {
      return counts[laneLayout.LINES >> 2] ?? 0;
    },
    corners,
    normals,
  };
}
