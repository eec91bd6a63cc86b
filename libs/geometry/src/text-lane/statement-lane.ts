import type { ReadingLimits } from '../limits';
import { laneLayout, mostStatements } from './lane-memory';
import { createLaneWindow, findLaneWithin } from './lane-window';

/** How much a mesh has, and what it still takes. */
export interface MeshRoom {
  readonly vertexCount: number;
  readonly vertexRoom: number;
  readonly facetRoom: number;
}

/**
 * Reads whole lines of OBJ of the usual shape, fast: vertices, polygons of three and four corners, comments, and statements that are passed over. It stops before the
 * first line that is anything else; what that means is for the reader to say, so that it makes no difference but for time.
 */
export interface StatementLane {
  /** To be called where a new chunk begins. */
  beginChunk(): void;
  /**
   * Reads lines from the beginning of one on, and says whether there were any.
   *
   * @param before the byte before the chunk
   */
  read(bytes: Uint8Array, from: number, before: number, room: MeshRoom): boolean;
  /** The place after what was read, and the ends of lines in it. */
  readonly position: number;
  readonly lineEnds: number;
  /** How many vertices were read, of three coordinates each; they stay there until the next reading of any lane. */
  readonly vertexCount: number;
  readonly vertices: Float64Array;
  /** How many polygons were read, of four numbers of vertices each (from 0); a triangle has `noCorner` as its fourth. */
  readonly polygonCount: number;
  readonly polygons: Uint32Array;
}

/** Undefined where WebAssembly is missing, or where limits are so narrow that only the reader watches them. */
export function createStatementLane(limits: ReadingLimits): StatementLane | undefined {
  const lane = limits.maximumPolygonCorners >= 4 ? findLaneWithin(limits) : undefined;
  if (lane === undefined) return undefined;
  const window = createLaneWindow(lane);
  const { counts, vertices, polygons, readStatements } = lane;
  let position = 0;
  const getCount = (place: number): number => counts[place >> 2] ?? 0;
  return {
    beginChunk: () => window.forget(),
    read(bytes, from, before, { vertexCount, vertexRoom, facetRoom }) {
      const start = window.place(bytes, from, before);
      if (start === undefined) return false;
      // Two facets a polygon at the most.
      readStatements(start, vertexCount, Math.min(vertexRoom, mostStatements), Math.min(Math.floor(facetRoom / 2), mostStatements));
      position = from + getCount(laneLayout.POSITION) - start;
      return position > from;
    },
    get position() {
      return position;
    },
    get lineEnds() {
      return getCount(laneLayout.LINES);
    },
    get vertexCount() {
      return getCount(laneLayout.VERTICES);
    },
    vertices,
    get polygonCount() {
      return getCount(laneLayout.POLYGONS);
    },
    polygons,
  };
}
