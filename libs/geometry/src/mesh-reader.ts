import { createContentReader, type ContentSummary, type FacetsToCome } from './content-reader';
import type { FacetSink } from './facet-batch';
import { completeLimits, type ReadingLimits } from './limits';
import type { PackedFacetSink } from './packed-facets';
import { MeshError, spellCounted } from './mesh-error';

export interface MeshReaderOptions extends Partial<ReadingLimits> {
  /** Size of the whole file, packed where it is packed; so many bytes must arrive. */
  sizeBytes: number;
  /** Takes the facets in the order of the file. */
  onFacets: FacetSink;
  /** Takes the facets of a binary STL file as they are, in place of `onFacets`. */
  packed?: PackedFacetSink | undefined;
}

export type MeshSummary = ContentSummary;

export interface MeshReader {
  push(chunk: Uint8Array): void;
  finish(): MeshSummary;
  readonly facetsRead: number;
  /** How many facets can come; known from the first one on. */
  readonly facetsToCome: FacetsToCome;
}

/**
 * Reads a mesh file that is pushed in chunks of any size; what comes out does not depend on the sizes. Memory is constant for STL: a batch of facets
 * and the pieces that straddle chunks; of OBJ, PLY and OFF the vertices are kept, 3MF and glTF as they are. `push` and `finish` throw a MeshError; after
 * that the reader is of no more use.
 */
export function createMeshReader({ sizeBytes, onFacets, packed, ...limits }: MeshReaderOptions): MeshReader {
  const content = createContentReader({ sizeBytes, limits: completeLimits(limits), onFacets, packed });
  let received = 0;

  return {
    push(chunk) {
      if (received + chunk.length > sizeBytes) throw sizeDiffers(`more than ${spellCounted(sizeBytes, 'byte')} arrived`, sizeBytes);
      received += chunk.length;
      content.push(chunk);
    },
    finish() {
      if (received !== sizeBytes) throw sizeDiffers(`only ${spellCounted(received, 'byte')} of ${spellCounted(sizeBytes, 'byte')} arrived`, received);
      return content.finish();
    },
    get facetsRead() {
      return content.facetsRead;
    },
    get facetsToCome() {
      return content.facetsToCome;
    },
  };
}

function sizeDiffers(what: string, byte: number): MeshError {
  return new MeshError('size-differs', `The file is not as long as was said: ${what}. Send it again.`, { byte });
}
