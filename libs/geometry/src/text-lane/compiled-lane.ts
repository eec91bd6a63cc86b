import { compileModule } from '../kernel/web-assembly';
import { compiledLane } from './lane.generated';
import { laneLayout, mostFacets, mostStatements, windowBytes } from './lane-memory';
import { writePowers } from './powers-of-ten';

interface LaneExports {
  memory: { buffer: ArrayBuffer };
  readFacets: (start: number, most: number) => number;
  readStatements: (start: number, known: number, mostVertices: number, mostPolygons: number) => void;
  readNumber: (at: number, target: number) => number;
}

/** The compiled lane, with the views of its memory, which never grows. */
export interface CompiledLane extends Omit<LaneExports, 'memory'> {
  /** The byte before the window, and the window. */
  readonly text: Uint8Array;
  readonly counts: Int32Array;
  readonly corners: Float64Array;
  readonly normals: Float64Array;
  readonly vertices: Float64Array;
  readonly polygons: Uint32Array;
}

let lane: CompiledLane | null | undefined;

/** The compiled lane, the one there is; undefined where it can't run. Nothing in its memory outlasts the call that uses it. */
export function findLane(): CompiledLane | undefined {
  if (lane === undefined) lane = instantiate();
  return lane ?? undefined;
}

function instantiate(): CompiledLane | null {
  const make = compileModule(compiledLane);
  if (make === null) return null;
  // It exports what assembly/text/index.ts does.
  const { memory, ...functions } = make() as LaneExports;
  const { buffer } = memory;
  writePowers(buffer);
  return {
    ...functions,
    text: new Uint8Array(buffer, laneLayout.WINDOW - 1, windowBytes + 2),
    counts: new Int32Array(buffer, 0, 4),
    corners: new Float64Array(buffer, laneLayout.FIRST, 9 * mostFacets),
    normals: new Float64Array(buffer, laneLayout.SECOND, 3 * mostFacets),
    vertices: new Float64Array(buffer, laneLayout.FIRST, 3 * mostStatements),
    polygons: new Uint32Array(buffer, laneLayout.SECOND, 4 * mostStatements),
  };
}
