import { next, undoZigzag, type Cursor } from './meshopt-stream';

/** A number of seven bits a byte, the lowest first. */
function readVarint(cursor: Cursor): number {
  let value = 0;
  for (let shift = 0; shift < 35; shift += 7) {
    const byte = next(cursor);
    value |= (byte & 127) << shift;
    if (byte < 128) break;
  }
  return value >>> 0;
}

/** The corners of separate triangles, told by edges and vertices that came shortly before: mode "TRIANGLES". */
export function decodeMeshoptTriangles(source: Uint8Array, count: number): Uint32Array<ArrayBuffer> | undefined {
  const codesAt = 1;
  const cursor: Cursor = { bytes: source, at: codesAt + count / 3 };
  const end = source.length - 16;
  if (source[0] !== 0xe1 || count % 3 !== 0 || cursor.at > end) return undefined;
  const table = source.subarray(end);
  const target = new Uint32Array(count);
  const edges = new Uint32Array(32);
  const vertices = new Uint32Array(16);
  let edgeAt = 0, vertexAt = 0, fresh = 0, last = 0;

  const pushEdge = (from: number, to: number): void => {
    edges[2 * edgeAt] = from;
    edges[2 * edgeAt + 1] = to;
    edgeAt = (edgeAt + 1) & 15;
  };
  const pushVertex = (vertex: number): void => {
    vertices[vertexAt] = vertex;
    vertexAt = (vertexAt + 1) & 15;
  };
  const recent = (back: number): number => vertices[(vertexAt - 1 - back) & 15] ?? 0;
  const explicit = (): number => (last = (last + undoZigzag(readVarint(cursor))) >>> 0);
  /** A corner by half a byte: the next new one, one of the last, or (where that is allowed) one that is written out. */
  const corner = (code: number, mayBeExplicit: boolean): number => (code === 0 ? fresh++ : mayBeExplicit && code === 15 ? explicit() : recent(code - 1));

  function takeByEdge(code: number, at: number): void {
    const edge = (edgeAt - 1 - (code >> 4)) & 15;
    const a = edges[2 * edge] ?? 0, b = edges[2 * edge + 1] ?? 0;
    const low = code & 15;
    const c = low === 0 ? fresh++ : low < 13 ? recent(low) : low === 15 ? explicit() : (last = (last + (low === 13 ? -1 : 1)) >>> 0);
    if (low === 0 || low >= 13) pushVertex(c);
    pushEdge(c, b);
    pushEdge(a, c);
    target.set([a, b, c], at);
  }

  function takeFree(code: number, at: number): void {
    const written = code >= 0xfe;
    const pair = written ? next(cursor) : (table[code & 15] ?? 0);
    if (written && pair === 0) fresh = 0;
    const a = code === 0xff ? explicit() : fresh++;
    const high = pair >> 4, low = pair & 15;
    const b = corner(high, written);
    const c = corner(low, written);
    pushVertex(a);
    if (high === 0 || (written && high === 15)) pushVertex(b);
    if (low === 0 || (written && low === 15)) pushVertex(c);
    pushEdge(b, a);
    pushEdge(c, b);
    pushEdge(a, c);
    target.set([a, b, c], at);
  }

  for (let at = 0; at < count; at += 3) {
    const code = source[codesAt + at / 3] ?? 0;
    if (code < 0xf0) takeByEdge(code, at);
    else takeFree(code, at);
    if (cursor.at > end) return undefined;
  }
  return cursor.at === end ? target : undefined;
}

/** Indices of any kind, as differences from one of two before: mode "INDICES". */
export function decodeMeshoptIndices(source: Uint8Array, count: number): Uint32Array<ArrayBuffer> | undefined {
  const cursor: Cursor = { bytes: source, at: 1 };
  const end = source.length - 4;
  // Each takes a byte at least.
  if (source[0] !== 0xd1 || count > end - 1) return undefined;
  const target = new Uint32Array(count);
  const last: [number, number] = [0, 0];
  for (let k = 0; k < count; k++) {
    const value = readVarint(cursor);
    const which = (value & 1) as 0 | 1;
    last[which] = (last[which] + undoZigzag(value >>> 1)) >>> 0;
    target[k] = last[which];
    if (cursor.at > end) return undefined;
  }
  return cursor.at === end ? target : undefined;
}
