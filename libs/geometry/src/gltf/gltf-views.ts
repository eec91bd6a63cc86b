import type { ReadingLimits } from '../limits';
import { MeshError, spellCount, spellCounted } from '../mesh-error';
import { showText } from '../mesh-words';
import { applyExponentialFilter, decodeMeshoptAttributes } from './decode-meshopt-attributes';
import { decodeMeshoptIndices, decodeMeshoptTriangles } from './decode-meshopt-indices';
import type { JsonObject } from './gltf-json';

/** Bytes of a buffer view. */
export interface GltfView {
  bytes: Uint8Array;
  /** Undefined where its elements stand one after another. */
  stride: number | undefined;
  /** Where its first byte is in the file; null where it was packed or written as text. */
  start: number | null;
}

/** The binary part of a GLB file. */
export interface BinaryChunk {
  bytes: Uint8Array;
  start: number;
}

type Bytes = Pick<GltfView, 'bytes' | 'start'>;

export interface GltfViews {
  get(index: number): GltfView;
}

const meshoptNames = ['EXT_meshopt_compression', 'KHR_meshopt_compression'] as const;

/**
 * Finds the bytes of buffer views, and unpacks them; each once. Throws a MeshError for buffers in other files.
 *
 * @param sizeBytes how long the file is, which bounds what may be unpacked of it
 */
export function createGltfViews(model: JsonObject, chunk: BinaryChunk | null, sizeBytes: number, limits: ReadingLimits): GltfViews {
  const buffers = new Map<number, Bytes>();
  const views = new Map<number, GltfView>();
  let unpacked = 0;

  function getBuffer(index: number): Bytes {
    const known = buffers.get(index);
    if (known !== undefined) return known;
    const found = openBuffer(model.item('buffers', index), index === 0 ? chunk : null);
    buffers.set(index, found);
    return found;
  }

  /** The part of a buffer that an object tells of. */
  function cutBuffer(object: JsonObject): Bytes {
    const buffer = getBuffer(object.whole('buffer'));
    const [offset, length] = [object.wholeOr('byteOffset', 0), object.whole('byteLength')];
    if (offset + length > buffer.bytes.length) object.refuse('syntax-invalid', `In this glTF model, ${object.name} reaches beyond the end of its buffer, which has ${spellCounted(buffer.bytes.length, 'byte')}. Export it again.`);
    return { bytes: buffer.bytes.subarray(offset, offset + length), start: buffer.start === null ? null : buffer.start + offset };
  }

  function unpack(packed: JsonObject): GltfView {
    const { bytes } = cutBuffer(packed);
    const [count, stride] = [packed.whole('count'), packed.whole('byteStride')];
    unpacked += count * stride;
    if (unpacked > Math.min(limits.maximumExpandedBytes, limits.maximumKeptBytes, limits.freeExpansionBytes + limits.maximumExpansion * sizeBytes)) {
      packed.refuse('too-large-expanded', `This glTF model holds more than can be examined here: ${spellCounted(unpacked, 'byte')} would come of its ${spellCounted(sizeBytes, 'byte')}. Give it without packing it, or reduce it.`);
    }
    const target = unpackMeshopt(packed, bytes, count, stride);
    if (target === undefined) return packed.refuse('archive-damaged', `In this glTF model, the bytes that ${packed.name} has packed are damaged. Export it again, packed or not.`);
    return { bytes: target, stride, start: null };
  }

  return {
    get(index) {
      const known = views.get(index);
      if (known !== undefined) return known;
      const view = model.item('bufferViews', index);
      const extensions = view.object('extensions');
      const packed = meshoptNames.map((name) => extensions?.object(name)).find((object) => object !== undefined);
      const found = packed === undefined ? { ...cutBuffer(view), stride: view.wholeOr('byteStride', undefined) } : unpack(packed);
      views.set(index, found);
      return found;
    },
  };
}

function openBuffer(buffer: JsonObject, chunk: BinaryChunk | null): Bytes {
  const length = buffer.whole('byteLength');
  const uri = buffer.text('uri');
  if (uri === undefined && chunk === null) return buffer.refuse('syntax-invalid', `In this glTF model, the numbers of ${buffer.name} are missing. Export it again, as one file.`);
  const { bytes, start } = uri === undefined ? (chunk as BinaryChunk) : { bytes: readDataUri(uri, buffer), start: null };
  if (bytes.length < length) throw new MeshError('file-truncated', `In this glTF model, ${buffer.name} has ${spellCount(bytes.length)} of ${spellCounted(length, 'byte')}: it was cut off. Export it again.`, { byte: start === null ? 0 : start + bytes.length });
  return { bytes: bytes.subarray(0, length), start };
}

function readDataUri(uri: string, buffer: JsonObject): Uint8Array {
  const head = /^data:[^,]{0,200};base64,/.exec(uri)?.[0];
  if (head === undefined) {
    const name = uri.startsWith('data:') ? 'in a way of writing that is not read' : `in another file (“${showText(uri, 60)}”)`;
    return buffer.refuse('syntax-invalid', `This glTF model keeps its numbers ${name}; a mesh has to be in one file. Export it as GLB, or with everything embedded.`, 'uri');
  }
  try {
    const text = atob(uri.slice(head.length));
    return Uint8Array.from({ length: text.length }, (_, k) => text.charCodeAt(k));
  } catch {
    return buffer.refuse('syntax-invalid', `In this glTF model, what ${buffer.name} has embedded is not base64. Export it again.`, 'uri');
  }
}

/** The bytes that were packed; undefined where they are damaged. */
function unpackMeshopt(packed: JsonObject, bytes: Uint8Array, count: number, stride: number): Uint8Array | undefined {
  const mode = packed.text('mode');
  const filter = packed.text('filter') ?? 'NONE';
  if (mode === 'ATTRIBUTES') {
    const target = decodeMeshoptAttributes(bytes, count, stride);
    if (filter === 'EXPONENTIAL' && target !== undefined) applyExponentialFilter(target);
    if (filter === 'EXPONENTIAL' || filter === 'NONE') return target;
    return packed.refuse('syntax-invalid', `In this glTF model, ${packed.name} packs positions as what they are not ("${showText(filter, 24)}"). Export it again.`, 'filter');
  }
  const indices = mode === 'TRIANGLES' ? decodeMeshoptTriangles(bytes, count) : mode === 'INDICES' ? decodeMeshoptIndices(bytes, count) : packed.refuse('syntax-invalid', `In this glTF model, ${packed.name} is packed in a way that is not read. Export it without packing.`, 'mode');
  if (indices === undefined || (stride !== 2 && stride !== 4)) return undefined;
  const target = new DataView(new ArrayBuffer(count * stride));
  for (const [k, index] of indices.entries()) {
    if (stride === 2) target.setUint16(2 * k, index, true);
    else target.setUint32(4 * k, index, true);
  }
  return new Uint8Array(target.buffer);
}
