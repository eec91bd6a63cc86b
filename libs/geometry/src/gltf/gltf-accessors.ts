import { spellCounted } from '../mesh-error';
import type { JsonObject } from './gltf-json';
import type { GltfView, GltfViews } from './gltf-views';

/** Three coordinates for each of a number of vertices. */
export interface GltfPositions {
  readonly count: number;
  /** Writes the coordinates of a vertex into the first three places. */
  read(vertex: number, target: Float64Array): void;
  /** Where the vertex is in the file; that of what tells of it, where it was packed. */
  placeOf(vertex: number): number | null;
}

/** Numbers of vertices. */
export interface GltfIndices {
  readonly count: number;
  get(k: number): number;
  placeOf(k: number): number | null;
}

interface Component {
  bytes: number;
  get(view: DataView, at: number): number;
  /** What counts as 1 where integers stand for fractions. */
  one: number;
}

const components: Readonly<Record<number, Component>> = {
  5120: { bytes: 1, get: (view, at) => view.getInt8(at), one: 127 },
  5121: { bytes: 1, get: (view, at) => view.getUint8(at), one: 255 },
  5122: { bytes: 2, get: (view, at) => view.getInt16(at, true), one: 32767 },
  5123: { bytes: 2, get: (view, at) => view.getUint16(at, true), one: 65535 },
  5125: { bytes: 4, get: (view, at) => view.getUint32(at, true), one: 4294967295 },
  5126: { bytes: 4, get: (view, at) => view.getFloat32(at, true), one: 1 },
};
const unsigned = new Set([5121, 5123, 5125]);

/** Where the elements of an accessor are in the bytes of its view. */
interface Elements {
  view: DataView;
  offset: number;
  stride: number;
  start: number | null;
}

function findElements(object: JsonObject, { bytes, stride: declared, start }: GltfView, count: number, elementBytes: number): Elements {
  const offset = object.wholeOr('byteOffset', 0);
  const stride = declared ?? elementBytes;
  if (stride < elementBytes) object.refuse('syntax-invalid', `In this glTF model, the elements of ${object.name} overlap. Export it again.`);
  if (offset + stride * (count - 1) + elementBytes > bytes.length) {
    object.refuse('syntax-invalid', `In this glTF model, ${object.name} reaches beyond the end of its buffer view, which has ${spellCounted(bytes.length, 'byte')}. Export it again.`);
  }
  return { view: new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength), offset, stride, start };
}

function getComponent(object: JsonObject, isAllowed: (type: number) => boolean): Component {
  const type = object.whole('componentType');
  const component = isAllowed(type) ? components[type] : undefined;
  return component ?? object.refuse('syntax-invalid', `In this glTF model, the numbers of ${object.name} are of a type (${type}) that it can't have. Export it again.`, 'componentType');
}

function checkCount(accessor: JsonObject, type: string): number {
  if (accessor.text('type') !== type) accessor.refuse('syntax-invalid', `In this glTF model, ${accessor.name} is not of the type "${type}". Export it again.`, 'type');
  const count = accessor.whole('count');
  return count > 0 ? count : accessor.refuse('syntax-invalid', `In this glTF model, ${accessor.name} has no elements. Export it again.`, 'count');
}

/** Opens an accessor of indices. */
export function openIndices(accessor: JsonObject, views: GltfViews): GltfIndices {
  const count = checkCount(accessor, 'SCALAR');
  if (accessor.has('sparse')) accessor.refuse('syntax-invalid', `In this glTF model, ${accessor.name} has indices that are sparse, which is not read. Export it again.`, 'sparse');
  return openWholeNumbers(accessor, views, count);
}

function openWholeNumbers(object: JsonObject, views: GltfViews, count: number): GltfIndices {
  const component = getComponent(object, (type) => unsigned.has(type));
  const { view, offset, stride, start } = findElements(object, views.get(object.whole('bufferView')), count, component.bytes);
  return {
    count,
    get: (k) => component.get(view, offset + stride * k),
    placeOf: (k) => (start === null ? null : start + offset + stride * k),
  };
}

/**
 * Opens an accessor of positions: binary32, or whole numbers as KHR_mesh_quantization has them; sparse ones too.
 *
 * @param sizeBytes how long the file is: it can't tell of more vertices than it has bytes
 */
export function openPositions(accessor: JsonObject, views: GltfViews, sizeBytes: number): GltfPositions {
  const count = checkCount(accessor, 'VEC3');
  const component = getComponent(accessor, (type) => type !== 5125);
  const { one } = component;
  const isFraction = accessor.flag('normalized') && component.bytes < 4;
  const scale = (value: number): number => (isFraction ? Math.max(value / one, -1) : value);
  const sparse = accessor.object('sparse');
  const base = openBase(accessor, views, count, component, sparse !== undefined, sizeBytes);
  const changes = sparse === undefined ? undefined : openChanges(sparse, views, count, component);

  /** The elements that a vertex is in, and its place among them. */
  const find = (vertex: number): { elements: Elements | undefined; at: number } => {
    const changed = changes?.find(vertex);
    return changed === undefined ? { elements: base, at: vertex } : { elements: changes?.elements, at: changed };
  };

  return {
    count,
    read(vertex, target) {
      const { elements, at } = find(vertex);
      for (let k = 0; k < 3; k++) target[k] = elements === undefined ? 0 : scale(component.get(elements.view, elements.offset + elements.stride * at + component.bytes * k));
    },
    placeOf(vertex) {
      const { elements, at } = find(vertex);
      return elements === undefined || elements.start === null ? null : elements.start + elements.offset + elements.stride * at;
    },
  };
}

/** Undefined where all vertices are at zero but for those that are changed. */
function openBase(accessor: JsonObject, views: GltfViews, count: number, component: Component, sparse: boolean, sizeBytes: number): Elements | undefined {
  const index = accessor.wholeOr('bufferView', undefined);
  if (index !== undefined) return findElements(accessor, views.get(index), count, 3 * component.bytes);
  if (!sparse || count > sizeBytes) accessor.refuse('syntax-invalid', `In this glTF model, the numbers of ${accessor.name} are missing. Export it again.`);
  return undefined;
}

interface Changes {
  /** The place among the changed ones; undefined where a vertex is not one. */
  find(vertex: number): number | undefined;
  elements: Elements;
}

function openChanges(sparse: JsonObject, views: GltfViews, count: number, component: Component): Changes {
  const changed = sparse.whole('count');
  const [indices, values] = [sparse.object('indices'), sparse.object('values')];
  if (indices === undefined || values === undefined || changed === 0 || changed > count) return sparse.refuse('syntax-invalid', `In this glTF model, ${sparse.name} is not whole. Export it again.`);
  const numbers = openWholeNumbers(indices, views, changed);
  for (let k = 0; k < changed; k++) {
    if (numbers.get(k) >= count || (k > 0 && numbers.get(k) <= numbers.get(k - 1))) indices.refuse('syntax-invalid', `In this glTF model, ${indices.name} is not in ascending order, or goes beyond the vertices. Export it again.`);
  }
  const elements = findElements(values, views.get(values.whole('bufferView')), changed, 3 * component.bytes);
  return {
    find(vertex) {
      let low = 0;
      let high = changed - 1;
      while (low < high) {
        const middle = (low + high) >> 1;
        if (numbers.get(middle) < vertex) low = middle + 1;
        else high = middle;
      }
      return numbers.get(low) === vertex ? low : undefined;
    },
    elements,
  };
}
