import type { FacetSink } from '../facet-batch';
import type { FormatReader } from '../format-reader';
import { createByteStore } from '../keep-bytes';
import type { ReadingLimits } from '../limits';
import { MeshError, spellCount, spellCounted } from '../mesh-error';
import { readGltfModel, type GltfSource } from './read-model';

const headerBytes = 12;
const chunkHeaderBytes = 8;
const [jsonChunk, binaryChunk] = [0x4e4f534a, 0x004e4942];
/** So few bytes after the end that the header names are tolerated: some programs pad. */
const slackBytes = 50;

/** Reads a binary glTF model (GLB), pushed in chunks of any size and kept until the last has come. */
export function createGlbReader(limits: ReadingLimits, sink: FacetSink): FormatReader {
  const store = createByteStore('glb', limits.maximumKeptBytes);
  let facets = 0;
  return {
    push: (bytes) => store.push(bytes),
    finish() {
      const bytes = store.finish();
      const length = checkHeader(bytes);
      const read = readGltfModel(openChunks(bytes.subarray(0, length)), limits, sink);
      facets = read.facets;
      return { ...read.remarks, trailingBytes: bytes.length - length };
    },
    get facetsRead() {
      return facets;
    },
  };
}

const viewOf = (bytes: Uint8Array): DataView => new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);

/** How long the header says the model is. */
function checkHeader(bytes: Uint8Array): number {
  if (bytes.length < headerBytes + chunkHeaderBytes) throw new MeshError('file-truncated', `This binary glTF model has ${spellCounted(bytes.length, 'byte')}: it was cut off. Export it again.`, { byte: bytes.length });
  const [version, length] = [viewOf(bytes).getUint32(4, true), viewOf(bytes).getUint32(8, true)];
  if (version !== 2) throw new MeshError('syntax-invalid', `This binary glTF model is of version ${version}; only 2 is read. Export it in that version.`, { byte: 4 });
  const facts = `The header of this binary glTF model says ${spellCounted(length, 'byte')}`;
  if (length > bytes.length) throw new MeshError('file-truncated', `${facts} but the file has ${spellCount(bytes.length)}: it was cut off. Export it again.`, { byte: bytes.length });
  if (length < bytes.length - slackBytes) throw new MeshError('count-contradicts-size', `${facts} but the file has ${spellCount(bytes.length)}. Export it again.`, { byte: 8 });
  return length;
}

/** Finds the JSON, which comes first, and the numbers, which may follow; other chunks are passed over. */
function openChunks(bytes: Uint8Array): GltfSource {
  const view = viewOf(bytes);
  let json: GltfSource['json'] | undefined;
  let chunk: GltfSource['chunk'] = null;
  for (let at = headerBytes; at + chunkHeaderBytes <= bytes.length; ) {
    const [length, type] = [view.getUint32(at, true), view.getUint32(at + 4, true)];
    const start = at + chunkHeaderBytes;
    if (start + length > bytes.length) throw new MeshError('syntax-invalid', `In this binary glTF model, the chunk at byte ${spellCount(at)} reaches beyond the end. Export it again.`, { byte: at });
    const content = { bytes: bytes.subarray(start, start + length), start };
    if (json === undefined && type !== jsonChunk) break;
    if (json === undefined) json = content;
    else if (type === binaryChunk) chunk ??= content;
    at = start + length;
  }
  if (json === undefined) throw new MeshError('syntax-invalid', 'This binary glTF model does not begin with its JSON. Export it again.', { byte: headerBytes });
  return { format: 'glb', json, chunk, sizeBytes: bytes.length };
}
