/*
 * Whether the directed edges of a mesh cancel, in constant memory. A vertex has three numbers u, w and t of 64 bits, mixed from the bits of its coordinates
 * with secrets; an edge from a to b adds u(a) w(b) - u(b) w(a) to one sum and the same with t to another, modulo 2^64. An edge that is run along once each
 * way adds nothing, so both sums of a closed and oriented mesh are zero, whatever the order of its facets. Of any other mesh they are both zero with a
 * probability near 2^-128; two different vertices have the same u with one near 2^-64 (20 million facets: about one in a million that any two have).
 * The compiled kernel does the same (assembly/sketch.ts), by other mixing for packed facets.
 */

const mask = (1n << 64n) - 1n;

/** Eight secrets; the multipliers, at odd places and at the third, are odd. */
export type SketchSecrets = BigUint64Array;

/** Any bits: nothing that comes out depends on them but with a probability that can be neglected. They are secret so that no file can be made to deceive. */
export function drawSecrets(): SketchSecrets {
  const words = Uint32Array.from({ length: 16 }, () => Math.floor(Math.random() * 4_294_967_296));
  return new BigUint64Array(words.buffer).map((word) => word | 1n);
}

export interface ClosednessSketch {
  /** Adds facets of nine coordinates each. */
  add(corners: Float64Array, count: number): void;
  readonly sums: readonly [bigint, bigint];
}

/** The sketch in plain words: the reference of the compiled one, and what runs where that can't. Some thousand times slower than the compiled one. */
export function createSketch(secrets: SketchSecrets): ClosednessSketch {
  const secret = (place: number): bigint => secrets[place] ?? 0n;
  const key = new Float64Array(1);
  const bits = new BigUint64Array(key.buffer);
  const read = (coordinate: number): bigint => {
    // Adding 0 makes +0 of -0.
    key[0] = coordinate + 0;
    return bits[0] ?? 0n;
  };
  let one = 0n;
  let two = 0n;

  function hashVertex(x: number, y: number, z: number): bigint {
    let hash = ((read(x) ^ secret(0)) * secret(1)) & mask;
    hash ^= hash >> 32n;
    hash = (((hash + read(y)) & mask) * secret(2)) & mask;
    hash ^= hash >> 29n;
    hash = (((hash + read(z)) & mask) * secret(3)) & mask;
    return hash ^ (hash >> 29n);
  }

  function mix(hash: bigint, place: number): bigint {
    const mixed = ((hash ^ secret(place)) * secret(place + 1)) & mask;
    return mixed ^ (mixed >> 32n);
  }

  function addEdges([a, b, c]: readonly [bigint, bigint, bigint], place: number): bigint {
    const [p, q, r] = [mix(a, place), mix(b, place), mix(c, place)];
    return a * (q - r) + b * (r - p) + c * (p - q);
  }

  return {
    add(corners, count) {
      for (let at = 0; at < 9 * count; at += 9) {
        const hash = (from: number): bigint => hashVertex(corners[from] ?? 0, corners[from + 1] ?? 0, corners[from + 2] ?? 0);
        const vertices = [hash(at), hash(at + 3), hash(at + 6)] as const;
        one = (one + addEdges(vertices, 4)) & mask;
        two = (two + addEdges(vertices, 6)) & mask;
      }
    },
    get sums() {
      return [one, two] as const;
    },
  };
}
