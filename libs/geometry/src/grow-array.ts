import { MeshError } from './mesh-error';

type NumberArray = Float64Array<ArrayBuffer> | Uint32Array<ArrayBuffer> | Int32Array<ArrayBuffer> | Uint8Array<ArrayBuffer>;

/** A copy of at least `needed` elements, twice as long as before but never longer than `most` (the number that can come at all). */
export function growArray<Kind extends NumberArray>(array: Kind, needed: number, most: number): Kind {
  const length = Math.max(needed, Math.min(2 * array.length, most));
  const grown = allocate(() => new (array.constructor as new (length: number) => Kind)(length));
  grown.set(array);
  return grown;
}

/** A typed array, or a refusal in words where there is no memory for it. */
export function allocate<Kind extends NumberArray>(create: () => Kind): Kind {
  try {
    return create();
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    throw new MeshError('too-many-facets', 'There is not enough memory to examine a mesh of so many facets. Reduce it or split it into parts.');
  }
}
