import { formatNames } from './format-reader';
import { growArray } from './grow-array';
import type { ReadingLimits } from './limits';
import type { MeshFormat } from './measurement';
import { MeshError, spellCounted } from './mesh-error';

/** Bytes of a format that has to be there as a whole before it can be read. */
export interface ByteStore {
  push(bytes: Uint8Array): void;
  /** All that came, and nothing more may. */
  finish(): Uint8Array<ArrayBuffer>;
}

/** Keeps what it is given; memory is at most three times that, while it grows. Throws a MeshError where it becomes too much. */
export function createByteStore(format: MeshFormat, maximumBytes: number): ByteStore {
  let bytes = new Uint8Array(0);
  let length = 0;

  return {
    push(chunk) {
      if (length + chunk.length > maximumBytes) {
        throw new MeshError('too-large-expanded', `The file (${formatNames[format]}) has more than ${spellCounted(maximumBytes, 'byte')}, the most that is read of this format. Reduce the mesh, or export it as binary STL or PLY.`, { byte: maximumBytes });
      }
      if (length + chunk.length > bytes.length) bytes = growArray(bytes, length + chunk.length, maximumBytes);
      bytes.set(chunk, length);
      length += chunk.length;
    },
    finish: () => bytes.subarray(0, length),
  };
}

/** Throws a MeshError where a file would place so many facets of so few bytes. */
export function checkPlacedFacets(facets: number, bytes: number, format: MeshFormat, { maximumFacetsPerByte, freePlacedFacets }: Pick<ReadingLimits, 'maximumFacetsPerByte' | 'freePlacedFacets'>): void {
  if (facets <= freePlacedFacets + maximumFacetsPerByte * bytes) return;
  throw new MeshError('too-large-expanded', `The file (${formatNames[format]}) places its pieces so often that more than ${spellCounted(Math.floor(freePlacedFacets + maximumFacetsPerByte * bytes), 'facet')} come of its ${spellCounted(bytes, 'byte')}. Export fewer copies.`, { byte: 0 });
}
