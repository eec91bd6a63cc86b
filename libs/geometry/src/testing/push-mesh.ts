import type { ReadingLimits } from '../limits';
import { createMeasurer } from '../measurer';
import type { Measurement } from '../measurement';
import { MeshError } from '../mesh-error';

/** Measures bytes that come in chunks of these sizes, in turn and over again, each chunk a copy of its own. */
export function measureInChunks(bytes: Uint8Array, sizes: readonly number[], limits: Partial<ReadingLimits> = {}): Measurement {
  const measurer = createMeasurer({ sizeBytes: bytes.length, ...limits });
  for (let at = 0, k = 0; at < bytes.length; k++) {
    const end = Math.min(bytes.length, at + (sizes[k % sizes.length] ?? bytes.length));
    measurer.push(bytes.slice(at, end));
    at = end;
  }
  return measurer.finish();
}

/** The refusal of bytes that come in chunks of one size; fails where they are not refused. */
export function refuseInChunks(bytes: Uint8Array, chunkBytes = Infinity, limits: Partial<ReadingLimits> = {}): MeshError {
  try {
    measureInChunks(bytes, [chunkBytes], limits);
  } catch (error) {
    if (error instanceof MeshError) return error;
    throw error;
  }
  throw new Error('The file was not refused.');
}
