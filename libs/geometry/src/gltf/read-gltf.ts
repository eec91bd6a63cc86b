import type { FacetSink } from '../facet-batch';
import type { FormatReader } from '../format-reader';
import { createByteStore } from '../keep-bytes';
import type { ReadingLimits } from '../limits';
import { readGltfModel } from './read-model';

/** Reads a glTF model in JSON, with its numbers embedded in it; pushed in chunks of any size, and kept until the last has come. */
export function createGltfReader(limits: ReadingLimits, sink: FacetSink): FormatReader {
  const store = createByteStore('gltf', Math.min(limits.maximumKeptBytes, limits.maximumJsonBytes));
  let facets = 0;
  return {
    push: (bytes) => store.push(bytes),
    finish() {
      const bytes = store.finish();
      const read = readGltfModel({ format: 'gltf', json: { bytes, start: 0 }, chunk: null, sizeBytes: bytes.length }, limits, sink);
      facets = read.facets;
      return read.remarks;
    },
    get facetsRead() {
      return facets;
    },
  };
}
