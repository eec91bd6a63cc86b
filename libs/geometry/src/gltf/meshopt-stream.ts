/** Reads a stream byte by byte; `at` runs beyond the end where the stream is too short. */
export interface Cursor {
  readonly bytes: Uint8Array;
  at: number;
}

export const next = (cursor: Cursor): number => cursor.bytes[cursor.at++] ?? 0;

/** Differences of both signs are stored as whole numbers: 0, -1, 1, -2 … */
export const undoZigzag = (value: number): number => (value >>> 1) ^ -(value & 1);
