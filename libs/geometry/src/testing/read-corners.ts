import type { ReadingLimits } from '../limits';
import { createMeshReader, type MeshSummary } from '../mesh-reader';
import type { Corners } from './shapes';

export interface ReadFile extends MeshSummary {
  corners: Corners;
}

/** The facets of a file, and what was said of it, in chunks of one size. */
export function readFile(bytes: Uint8Array, chunkBytes = Infinity, limits: Partial<ReadingLimits> = {}): ReadFile {
  const corners: number[] = [];
  const reader = createMeshReader({ sizeBytes: bytes.length, ...limits, onFacets: (batch) => corners.push(...batch.corners.subarray(0, 9 * batch.count)) });
  for (let at = 0; at < bytes.length; at += chunkBytes) reader.push(bytes.slice(at, Math.min(bytes.length, at + chunkBytes)));
  return { ...reader.finish(), corners: Float64Array.from(corners) };
}

export const readCorners = (bytes: Uint8Array): Corners => readFile(bytes).corners;

/** The volume between the origin and the facets, in plain sums. */
export function measureVolume(corners: Corners): number {
  let sixfold = 0;
  for (let at = 0; at < corners.length; at += 9) {
    const [ax = 0, ay = 0, az = 0, bx = 0, by = 0, bz = 0, cx = 0, cy = 0, cz = 0] = corners.subarray(at, at + 9);
    sixfold += ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx);
  }
  return sixfold / 6;
}
