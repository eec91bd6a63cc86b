import type { FacetBatch } from './facet-batch';
import { allocate, growArray } from './grow-array';

/** A mesh whose corners with the same coordinates have become one vertex. Arrays may be longer than what is used. */
export interface WeldedMesh {
  facetCount: number;
  vertexCount: number;
  /** Three vertices a facet. */
  corners: Uint32Array;
  /** Three coordinates a vertex, numbered as they first occur. */
  coordinates: Float64Array;
}

export interface Welder {
  add(batch: FacetBatch): void;
  /** The mesh; the welder's own table is dropped. */
  finish(): WeldedMesh;
}

/** The table stays at most this full; linear probing slows down beyond. */
const fullest = 0.7;

/** Any 32 bits. Vertices are numbered as they first occur, so that nothing that comes out depends on them. */
const drawSecret = (): number => Math.floor(Math.random() * 4_294_967_296) | 0;

/**
 * Gives corners that agree in every bit the same vertex number (-0 counts as +0). Nothing is merged by nearness: a gap of one
 * unit in the last place stays a gap. Open addressing with linear probing, after a mixed hash of the coordinates' bits that begins with secrets: a file
 * made so that all its vertices meet in one slot would otherwise take hours.
 *
 * @param mostFacets how many facets can come; bounds the growth of the arrays, allocates nothing
 * @param expectedFacets how many probably will; lets the table grow in fewer steps
 */
export function createWelder(mostFacets: number, expectedFacets = mostFacets): Welder {
  let corners = new Uint32Array(3 * Math.min(mostFacets, 1024));
  let coordinates = new Float64Array(3 * Math.min(3 * mostFacets, 1024));
  // A slot holds a vertex number plus one; 0 is free.
  let slots = new Uint32Array(4096);
  let facetCount = 0;
  let vertexCount = 0;
  const seed = drawSecret();
  const factor = drawSecret() | 1;
  const key = new Float64Array(3);
  const keyBits = new Uint32Array(key.buffer);

  /** Murmur3 (Appleby) over one word a coordinate: its upper half with the lower one times a secret, turned by three, where binary32 has its last bits. */
  function hashKey(): number {
    let hash = seed;
    for (let k = 0; k < 6; k += 2) {
      const low = Math.imul(keyBits[k] ?? 0, factor);
      let word = Math.imul((keyBits[k + 1] ?? 0) ^ ((low << 3) | (low >>> 29)), 0xcc9e2d51);
      word = Math.imul((word << 15) | (word >>> 17), 0x1b873593);
      hash ^= word;
      hash = (Math.imul((hash << 13) | (hash >>> 19), 5) + 0xe6546b64) | 0;
    }
    hash = Math.imul(hash ^ (hash >>> 16), 0x85ebca6b);
    hash = Math.imul(hash ^ (hash >>> 13), 0xc2b2ae35);
    return hash ^ (hash >>> 16);
  }

  function findVertex(x: number, y: number, z: number): number {
    // Adding 0 turns -0 into +0 and changes nothing else.
    key[0] = x + 0;
    key[1] = y + 0;
    key[2] = z + 0;
    const mask = slots.length - 1;
    let slot = hashKey() & mask;
    for (let entry = slots[slot] ?? 0; entry !== 0; entry = slots[slot] ?? 0) {
      const at = 3 * (entry - 1);
      if (coordinates[at] === x && coordinates[at + 1] === y && coordinates[at + 2] === z) return entry - 1;
      slot = (slot + 1) & mask;
    }
    slots[slot] = vertexCount + 1;
    if (3 * vertexCount === coordinates.length) coordinates = growArray(coordinates, 3 * vertexCount + 3, 9 * mostFacets);
    coordinates[3 * vertexCount] = key[0];
    coordinates[3 * vertexCount + 1] = key[1];
    coordinates[3 * vertexCount + 2] = key[2];
    vertexCount += 1;
    if (vertexCount > fullest * slots.length) rehash();
    return vertexCount - 1;
  }

  function rehash(): void {
    // As many as all facets that are expected would need at the present rate of new vertices, within what the facets received justify.
    const expected = (vertexCount / facetCount) * expectedFacets;
    let length = 2 * slots.length;
    while (length < 8 * slots.length && fullest * length < expected) length *= 2;
    slots = allocate(() => new Uint32Array(length));
    const mask = length - 1;
    for (let vertex = 0; vertex < vertexCount; vertex++) {
      key[0] = coordinates[3 * vertex] ?? 0;
      key[1] = coordinates[3 * vertex + 1] ?? 0;
      key[2] = coordinates[3 * vertex + 2] ?? 0;
      let slot = hashKey() & mask;
      while (slots[slot] !== 0) slot = (slot + 1) & mask;
      slots[slot] = vertex + 1;
    }
  }

  return {
    add(batch) {
      const needed = 3 * (facetCount + batch.count);
      if (needed > corners.length) corners = growArray(corners, needed, 3 * mostFacets);
      for (let at = 0; at < 9 * batch.count; at += 9) {
        const facet = 3 * facetCount;
        facetCount += 1;
        corners[facet] = findVertex(batch.corners[at] ?? 0, batch.corners[at + 1] ?? 0, batch.corners[at + 2] ?? 0);
        corners[facet + 1] = findVertex(batch.corners[at + 3] ?? 0, batch.corners[at + 4] ?? 0, batch.corners[at + 5] ?? 0);
        corners[facet + 2] = findVertex(batch.corners[at + 6] ?? 0, batch.corners[at + 7] ?? 0, batch.corners[at + 8] ?? 0);
      }
    },
    finish() {
      slots = new Uint32Array(0);
      return { facetCount, vertexCount, corners, coordinates };
    },
  };
}
