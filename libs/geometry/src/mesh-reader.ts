import { decidingBytes, detectFormat, facetBytes, headerBytes } from './detect-format';
import type { FacetSink } from './facet-batch';
import type { MeshFormat } from './measurement';
import { MeshError, spellCounted } from './mesh-error';
import { createAsciiStlReader, tooManyFacets } from './read-stl-ascii';
import { createBinaryStlReader, type FileRemarks, type FormatReader } from './read-stl-binary';

export interface MeshReaderOptions {
  /** Size of the whole file; so many bytes must arrive. */
  sizeBytes: number;
  /** A file with more facets is refused before anything is kept for them. */
  maximumFacets: number;
  /** Takes the facets in the order of the file. */
  onFacets: FacetSink;
}

export interface MeshSummary extends FileRemarks {
  format: MeshFormat;
  facets: number;
  /** Bytes after the last facet of a binary file; fewer than one facet's. */
  trailingBytes: number;
}

export interface MeshReader {
  push(chunk: Uint8Array): void;
  finish(): MeshSummary;
  readonly facetsRead: number;
}

/**
 * Reads a mesh file that is pushed in chunks of any size; what comes out does not depend on the sizes. Memory is constant: a batch of facets
 * and the pieces that straddle chunks. `push` and `finish` throw a MeshError; after that the reader is of no more use.
 */
export function createMeshReader({ sizeBytes, maximumFacets, onFacets }: MeshReaderOptions): MeshReader {
  const beginning = new Uint8Array(Math.min(decidingBytes, sizeBytes));
  let received = 0;
  let begun: { reader: FormatReader; format: MeshFormat; trailingBytes: number } | undefined;

  function begin(): NonNullable<typeof begun> {
    const detected = detectFormat(beginning, sizeBytes);
    if (detected.format === 'stl-ascii') {
      return { reader: createAsciiStlReader(maximumFacets, onFacets), format: detected.format, trailingBytes: 0 };
    }
    const { declaredFacets, trailingBytes } = detected;
    if (declaredFacets > maximumFacets) throw tooManyFacets(maximumFacets, { byte: headerBytes + facetBytes * maximumFacets });
    return { reader: createBinaryStlReader(declaredFacets, onFacets), format: detected.format, trailingBytes };
  }

  function push(chunk: Uint8Array): void {
    if (received + chunk.length > sizeBytes) throw sizeDiffers(`more than ${spellCounted(sizeBytes, 'byte')} arrived`, sizeBytes);
    let rest = chunk;
    if (begun === undefined) {
      const taken = Math.min(beginning.length - received, chunk.length);
      beginning.set(chunk.subarray(0, taken), received);
      received += taken;
      if (received < beginning.length) return;
      begun = begin();
      begun.reader.push(beginning);
      rest = chunk.subarray(taken);
    }
    received += rest.length;
    if (rest.length > 0) begun.reader.push(rest);
  }

  function finish(): MeshSummary {
    if (received !== sizeBytes) throw sizeDiffers(`only ${spellCounted(received, 'byte')} of ${spellCounted(sizeBytes, 'byte')} arrived`, received);
    const { reader, format, trailingBytes } = begun ?? begin();
    const remarks = reader.finish();
    if (reader.facetsRead === 0) throw new MeshError('facets-none', 'The file is an STL mesh without a single facet. Check that something was selected when it was exported.');
    return { format, facets: reader.facetsRead, trailingBytes, ...remarks };
  }

  return {
    push,
    finish,
    get facetsRead() {
      return begun?.reader.facetsRead ?? 0;
    },
  };
}

function sizeDiffers(what: string, byte: number): MeshError {
  return new MeshError('size-differs', `The file is not as long as was said: ${what}. Send it again.`, { byte });
}
