/*
 * Decoders of the byte streams that EXT_meshopt_compression and KHR_meshopt_compression put in the place of buffer views, after Appendix A of those
 * specifications. Written here because the package that has them too compiles WebAssembly in the background, and a reader can't wait. Each returns
 * undefined where a stream does not make sense.
 */

import { next, undoZigzag, type Cursor } from './meshopt-stream';

/** Bits of a delta for each of the four codes of a group: in version 0, and in version 1 by the control mode. */
const widths = { zero: [0, 2, 4, 8], narrow: [0, 1, 2, 4], wide: [1, 2, 4, 8] } as const;
type Widths = (typeof widths)[keyof typeof widths];

/** Elements of any kind, as differences byte by byte: mode "ATTRIBUTES". */
export function decodeMeshoptAttributes(source: Uint8Array, count: number, stride: number): Uint8Array<ArrayBuffer> | undefined {
  const version = (source[0] ?? 0) - 0xa0;
  if ((version !== 0 && version !== 1) || stride % 4 !== 0 || stride < 4 || stride > 256) return undefined;
  const tail = version === 0 ? Math.max(32, stride) : Math.max(24, stride + stride / 4);
  const end = source.length - tail;
  if (end < 1) return undefined;
  const baselineAt = source.length - stride - (version === 0 ? 0 : stride / 4);
  const channels = version === 0 ? new Uint8Array(stride / 4) : source.subarray(source.length - stride / 4);
  if (channels.some((channel) => (channel & 15) > 2 || ((channel & 15) < 2 && channel > 15))) return undefined;

  const target = new Uint8Array(count * stride);
  const previous = Uint8Array.from(source.subarray(baselineAt, baselineAt + stride));
  const blockElements = Math.min(Math.floor(8192 / stride) & ~15, 256);
  const deltas = new Uint8Array(blockElements * stride);
  const cursor: Cursor = { bytes: source, at: 1 };
  for (let first = 0; first < count; first += blockElements) {
    const elements = Math.min(blockElements, count - first);
    readBlock(cursor, version, elements, stride, blockElements, deltas);
    if (cursor.at > end) return undefined;
    for (let channel = 0; channel < stride / 4; channel++) addDeltas(channels[channel] ?? 0, deltas, blockElements, 4 * channel, previous, target, first, elements, stride);
  }
  return cursor.at === end ? target : undefined;
}

/** Reads the differences of one block: those of each byte of the element together. */
function readBlock(cursor: Cursor, version: number, elements: number, stride: number, spacing: number, deltas: Uint8Array): void {
  const controlAt = cursor.at;
  if (version === 1) cursor.at += stride / 4;
  for (let byte = 0; byte < stride; byte++) {
    const mode = version === 0 ? -1 : ((cursor.bytes[controlAt + (byte >> 2)] ?? 0) >> (2 * (byte & 3))) & 3;
    const row = deltas.subarray(byte * spacing, (byte + 1) * spacing);
    if (mode === 2) row.fill(0);
    else if (mode === 3) for (let k = 0; k < elements; k++) row[k] = next(cursor);
    else readGroups(cursor, mode === -1 ? widths.zero : mode === 0 ? widths.narrow : widths.wide, Math.ceil(elements / 16), row);
    if (cursor.at > cursor.bytes.length) return;
  }
}

function readGroups(cursor: Cursor, bits: Widths, groups: number, row: Uint8Array): void {
  const headerAt = cursor.at;
  cursor.at += Math.ceil(groups / 4);
  for (let group = 0; group < groups; group++) {
    const width = bits[((cursor.bytes[headerAt + (group >> 2)] ?? 0) >> (2 * (group & 3))) & 3] ?? 0;
    readGroup(cursor, width, row, 16 * group);
  }
}

function readGroup(cursor: Cursor, width: number, row: Uint8Array, at: number): void {
  if (width === 0) row.fill(0, at, at + 16);
  else if (width === 8) for (let k = 0; k < 16; k++) row[at + k] = next(cursor);
  else {
    const packedAt = cursor.at;
    const sentinel = (1 << width) - 1;
    const perByte = 8 / width;
    cursor.at += 2 * width;
    for (let k = 0; k < 16; k++) {
      const within = k % perByte;
      // Single bits run from the lowest up, wider ones from the highest down.
      const shift = width === 1 ? within : 8 - width * (within + 1);
      const value = ((cursor.bytes[packedAt + Math.floor(k / perByte)] ?? 0) >> shift) & sentinel;
      row[at + k] = value === sentinel ? next(cursor) : value;
    }
  }
}

/** Adds the differences of four bytes to those of the element before, as the channel says. */
function addDeltas(channel: number, deltas: Uint8Array, spacing: number, byte: number, previous: Uint8Array, target: Uint8Array, first: number, elements: number, stride: number): void {
  const [a, b, c, d] = [byte * spacing, (byte + 1) * spacing, (byte + 2) * spacing, (byte + 3) * spacing];
  let p0 = previous[byte] ?? 0, p1 = previous[byte + 1] ?? 0, p2 = previous[byte + 2] ?? 0, p3 = previous[byte + 3] ?? 0;
  const turn = channel >> 4;
  for (let k = 0; k < elements; k++) {
    const d0 = deltas[a + k] ?? 0, d1 = deltas[b + k] ?? 0, d2 = deltas[c + k] ?? 0, d3 = deltas[d + k] ?? 0;
    if ((channel & 15) === 0) {
      p0 = (p0 + undoZigzag(d0)) & 255;
      p1 = (p1 + undoZigzag(d1)) & 255;
      p2 = (p2 + undoZigzag(d2)) & 255;
      p3 = (p3 + undoZigzag(d3)) & 255;
    } else {
      const delta = d0 | (d1 << 8) | (d2 << 16) | (d3 << 24);
      const before = p0 | (p1 << 8) | (p2 << 16) | (p3 << 24);
      const value = (channel & 15) === 2 ? before ^ ((delta >>> turn) | (delta << ((32 - turn) & 31))) : addHalves(before, delta);
      p0 = value & 255;
      p1 = (value >>> 8) & 255;
      p2 = (value >>> 16) & 255;
      p3 = value >>> 24;
    }
    const at = (first + k) * stride + byte;
    target[at] = p0;
    target[at + 1] = p1;
    target[at + 2] = p2;
    target[at + 3] = p3;
  }
  previous.set([p0, p1, p2, p3], byte);
}

const addHalves = (before: number, delta: number): number =>
  (((before & 0xffff) + undoZigzag(delta & 0xffff)) & 0xffff) | (((before >>> 16) + undoZigzag(delta >>> 16)) << 16);

/** Turns 24 bits of a number and 8 of a power of two into binary32, in place: filter "EXPONENTIAL". */
export function applyExponentialFilter(bytes: Uint8Array<ArrayBuffer>): void {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const power = new DataView(new ArrayBuffer(8));
  for (let at = 0; at + 4 <= bytes.length; at += 4) {
    const stored = view.getInt32(at, true);
    // The exponent of a binary64 number with nothing else in it.
    power.setInt32(0, ((stored >> 24) + 1023) << 20);
    view.setFloat32(at, power.getFloat64(0) * ((stored << 8) >> 8), true);
  }
}
