import { createUtf16Decoder } from './decode-utf16';
import { decidingBytes, detectFormat, facetBytes, headerBytes, type Detected } from './detect-format';
import type { FacetSink } from './facet-batch';
import { formatNames, tooManyFacets, type FileRemarks, type FormatReader } from './format-reader';
import { createInflater } from './inflate-gzip';
import type { ReadingLimits } from './limits';
import type { MeshCompression, MeshFormat } from './measurement';
import { MeshError } from './mesh-error';
import { createThreeMfReader } from './3mf/read-3mf';
import { createGlbReader } from './gltf/read-glb';
import { createGltfReader } from './gltf/read-gltf';
import { createPlyReader } from './ply/read-ply';
import { createObjReader } from './read-obj';
import { createOffReader } from './read-off';
import { createAsciiStlReader } from './read-stl-ascii';
import type { PackedFacetSink } from './packed-facets';
import { createBinaryStlReader } from './read-stl-binary';

export interface ContentSummary extends FileRemarks {
  format: MeshFormat;
  compression: MeshCompression | null;
  facets: number;
}

/** most: an upper bound. expected: an estimate, 0 where there is none. Neither takes what a header declares for granted. */
export interface FacetsToCome {
  most: number;
  expected: number;
}

export interface ContentReader {
  push(bytes: Uint8Array): void;
  finish(): ContentSummary;
  readonly facetsRead: number;
  readonly facetsToCome: FacetsToCome;
}

export interface ContentOptions {
  /** Null where only the end will tell. */
  sizeBytes: number | null;
  limits: ReadingLimits;
  onFacets: FacetSink;
  /** Takes the facets of a binary STL file as they are, in place of `onFacets`. */
  packed?: PackedFacetSink | undefined;
  /** What this content came out of. */
  wrap?: 'gzip' | 'utf-16';
}

/** Reads a mesh, finding out what it is from its first bytes; what it is packed or encoded in is undone, each once. */
export function createContentReader(options: ContentOptions): ContentReader {
  const { sizeBytes } = options;
  const beginning = new Uint8Array(sizeBytes === null ? decidingBytes : Math.min(decidingBytes, sizeBytes));
  let received = 0;
  let begun: ContentReader | undefined;

  function begin(bytes: Uint8Array, size: number | null): ContentReader {
    const reader = beginReading(detectFormat(bytes, size), options);
    if (bytes.length > 0) reader.push(bytes);
    return reader;
  }

  return {
    push(bytes) {
      let rest = bytes;
      if (begun === undefined) {
        const taken = Math.min(beginning.length - received, bytes.length);
        beginning.set(bytes.subarray(0, taken), received);
        received += taken;
        if (received < beginning.length) return;
        begun = begin(beginning, sizeBytes);
        rest = bytes.subarray(taken);
      }
      if (rest.length > 0) begun.push(rest);
    },
    finish() {
      begun ??= begin(beginning.subarray(0, received), received);
      return begun.finish();
    },
    get facetsRead() {
      return begun?.facetsRead ?? 0;
    },
    get facetsToCome() {
      return begun?.facetsToCome ?? { most: options.limits.maximumFacets, expected: 0 };
    },
  };
}

function beginReading(detected: Detected, options: ContentOptions): ContentReader {
  const { limits, onFacets, sizeBytes } = options;
  switch (detected.format) {
    case 'gzip':
      if (options.wrap === 'gzip') throw new MeshError('format-unknown', 'This is a gzip archive within a gzip archive. Unpack it, and give the mesh packed once at most.', { byte: 0 });
      return unwrap('gzip', options, (take) => createInflater(limits, take));
    case 'utf-16':
      return unwrap('utf-16', options, (take) => createUtf16Decoder(detected.bigEndian, take));
    case 'stl-binary': {
      if (options.wrap === 'utf-16') throw new MeshError('format-unknown', 'This begins like text in UTF-16, but it is not text. Give the mesh itself.', { byte: 0 });
      const { declaredFacets } = detected;
      // Where the size is known it agrees with the count, and nothing needs to be read to know that the mesh is too large.
      if (sizeBytes !== null && declaredFacets > limits.maximumFacets) throw tooManyFacets(limits.maximumFacets, 'stl-binary', { byte: headerBytes + facetBytes * limits.maximumFacets });
      return read('stl-binary', createBinaryStlReader(declaredFacets, limits.maximumFacets, onFacets, options.packed), estimateFacets(options, facetBytes, facetBytes));
    }
    default: {
      const { format } = detected;
      if (options.wrap === 'utf-16' && !wordFormats.has(format)) throw new MeshError('format-unknown', `This is ${formatNames[format]} in UTF-16, which that format can't be in. Export the mesh again.`, { byte: 0 });
      return read(format, createFormatReader(format, limits, onFacets), estimateFacets(options, ...bytesPerFacet[format]));
    }
  }
}

function createFormatReader(format: Exclude<MeshFormat, 'stl-binary'>, limits: ReadingLimits, sink: FacetSink): FormatReader {
  switch (format) {
    case 'stl-ascii':
      return createAsciiStlReader(limits, sink);
    case 'obj':
      return createObjReader(limits, sink);
    case 'ply-ascii':
    case 'ply-binary':
      return createPlyReader(format, limits, sink);
    case 'off':
      return createOffReader(limits, sink);
    case '3mf':
      return createThreeMfReader(limits, sink);
    case 'gltf':
      return createGltfReader(limits, sink);
    case 'glb':
      return createGlbReader(limits, sink);
  }
}

/** Formats that may be in UTF-16: every word of them that counts is ASCII. */
const wordFormats: ReadonlySet<MeshFormat> = new Set<MeshFormat>(['stl-ascii', 'obj', 'ply-ascii', 'off']);

/** The fewest bytes that a facet more can take, and how many it usually takes; what can place one piece many times has no fewest. */
const bytesPerFacet: Readonly<Record<Exclude<MeshFormat, 'stl-binary'>, [least: number, usual: number]>> = {
  'stl-ascii': [facetBytes, facetBytes],
  // A polygon may name the same one-digit vertex over and over: two bytes for a facet more. A facet and its half of a vertex, shortly written.
  obj: [2, 40],
  'ply-ascii': [2, 40],
  'ply-binary': [1, 19],
  off: [2, 40],
  '3mf': [0, 16],
  gltf: [0, 24],
  glb: [0, 18],
};

function estimateFacets({ sizeBytes, limits: { maximumFacets } }: ContentOptions, leastBytes: number, usualBytes: number): FacetsToCome {
  if (sizeBytes === null) return { most: maximumFacets, expected: 0 };
  const most = (bytes: number): number => (bytes === 0 ? maximumFacets : Math.min(maximumFacets, Math.max(1, Math.floor(sizeBytes / bytes))));
  return { most: most(leastBytes), expected: most(usualBytes) };
}

function read(format: MeshFormat, reader: FormatReader, facetsToCome: FacetsToCome): ContentReader {
  return {
    push: (bytes) => withFormat(format, () => reader.push(bytes)),
    finish: () =>
      withFormat(format, () => {
        const remarks = reader.finish();
        if (reader.facetsRead > 0) return { format, compression: null, facets: reader.facetsRead, ...remarks };
        throw new MeshError('facets-none', `The file (${formatNames[format]}) is a mesh without a single facet. Check that something was selected when it was exported.`);
      }),
    get facetsRead() {
      return reader.facetsRead;
    },
    facetsToCome,
  };
}

/** Has a refusal say what format was being read. */
function withFormat<Result>(format: MeshFormat, run: () => Result): Result {
  try {
    return run();
  } catch (error) {
    if (error instanceof MeshError) error.format = format;
    throw error;
  }
}

type Unwrapper = Pick<ContentReader, 'push'> & { finish: () => void };

function unwrap(wrap: 'gzip' | 'utf-16', options: ContentOptions, createUnwrapper: (take: (bytes: Uint8Array) => void) => Unwrapper): ContentReader {
  const content = createContentReader({ ...options, sizeBytes: null, wrap });
  const unwrapper = createUnwrapper((bytes) => content.push(bytes));
  return {
    push: (bytes) => unwrapper.push(bytes),
    finish() {
      unwrapper.finish();
      const summary = content.finish();
      return wrap === 'gzip' ? { ...summary, compression: 'gzip' } : summary;
    },
    get facetsRead() {
      return content.facetsRead;
    },
    get facetsToCome() {
      return content.facetsToCome;
    },
  };
}
