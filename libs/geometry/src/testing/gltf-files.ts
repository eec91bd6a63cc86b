import { indexMesh } from './indexed-mesh';
import { encode } from './obj-files';
import type { Corners } from './shapes';

type Json = Record<string, unknown>;

/** A JSON and the bytes of its first buffer, as a GLB file. */
export function packGlb(json: Json, binary: Uint8Array = new Uint8Array(0)): Uint8Array<ArrayBuffer> {
  const text = new TextEncoder().encode(JSON.stringify(json));
  const pad = (length: number): number => Math.ceil(length / 4) * 4;
  const jsonLength = pad(text.length);
  const binaryLength = pad(binary.length);
  const total = 12 + 8 + jsonLength + (binary.length > 0 ? 8 + binaryLength : 0);
  const bytes = new Uint8Array(total);
  const view = new DataView(bytes.buffer);
  bytes.set(encode('glTF'));
  view.setUint32(4, 2, true);
  view.setUint32(8, total, true);
  view.setUint32(12, jsonLength, true);
  bytes.set(encode('JSON'), 16);
  bytes.fill(32, 20, 20 + jsonLength);
  bytes.set(text, 20);
  if (binary.length > 0) {
    view.setUint32(20 + jsonLength, binaryLength, true);
    bytes.set(encode('BIN\0'), 24 + jsonLength);
    bytes.set(binary, 28 + jsonLength);
  }
  return bytes;
}

/** The same as JSON, with the bytes embedded. */
export function embedGltf(json: Json, binary: Uint8Array): Uint8Array<ArrayBuffer> {
  const uri = `data:application/octet-stream;base64,${btoa(String.fromCharCode(...binary))}`;
  return new TextEncoder().encode(JSON.stringify({ ...json, buffers: [{ byteLength: binary.length, uri }] }));
}

export interface GltfParts {
  json: Json;
  binary: Uint8Array;
}

/** A model of one mesh with indices of 16 bits, and a node for each placing. */
export function makeGltf(corners: Corners, nodes: Json[] = [{}]): GltfParts {
  const { vertices, triangles } = indexMesh(corners);
  const positions = Float32Array.from(vertices);
  const indices = Uint16Array.from(triangles.length % 2 === 1 ? [...triangles, 0] : triangles);
  const binary = new Uint8Array(positions.byteLength + indices.byteLength);
  binary.set(new Uint8Array(positions.buffer));
  binary.set(new Uint8Array(indices.buffer), positions.byteLength);
  const json = {
    asset: { version: '2.0' },
    scene: 0,
    scenes: [{ nodes: nodes.map((_, k) => k) }],
    nodes: nodes.map((node) => ({ mesh: 0, ...node })),
    meshes: [{ primitives: [{ attributes: { POSITION: 0 }, indices: 1 }] }],
    accessors: [
      { bufferView: 0, componentType: 5126, count: positions.length / 3, type: 'VEC3' },
      { bufferView: 1, componentType: 5123, count: triangles.length, type: 'SCALAR' },
    ],
    bufferViews: [
      { buffer: 0, byteOffset: 0, byteLength: positions.byteLength },
      { buffer: 0, byteOffset: positions.byteLength, byteLength: 2 * triangles.length },
    ],
    buffers: [{ byteLength: binary.length }],
  };
  return { json, binary };
}

export function writeGlb(corners: Corners, nodes?: Json[]): Uint8Array<ArrayBuffer> {
  const { json, binary } = makeGltf(corners, nodes);
  return packGlb(json, binary);
}

export function writeGltf(corners: Corners, nodes?: Json[]): Uint8Array<ArrayBuffer> {
  const { json, binary } = makeGltf(corners, nodes);
  return embedGltf(json, binary);
}
