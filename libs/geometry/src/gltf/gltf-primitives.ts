import { openIndices, openPositions, type GltfIndices, type GltfPositions } from './gltf-accessors';
import type { JsonObject } from './gltf-json';
import type { GltfViews } from './gltf-views';

/** A piece of a mesh that has facets. */
export interface GltfPrimitive {
  positions: GltfPositions;
  /** Undefined where the vertices follow in their order. */
  indices: GltfIndices | undefined;
  facets: number;
  /** Which corner (from 0, in the order of the indices) is the first, second or third of a facet. */
  cornerOf(facet: number, k: 0 | 1 | 2): number;
  material: number | undefined;
  owner: JsonObject;
}

const [triangles, strip, fan] = [4, 5, 6];

const cornerOf: Readonly<Record<number, GltfPrimitive['cornerOf']>> = {
  [triangles]: (facet, k) => 3 * facet + k,
  // Every other facet of a strip runs the other way round.
  [strip]: (facet, k) => facet + (facet % 2 === 1 && k > 0 ? 3 - k : k),
  [fan]: (facet, k) => (k === 0 ? 0 : facet + k),
};

/** Opens the pieces of a mesh that have facets; points and lines have none, and neither have pieces without positions. */
export function openPrimitives(mesh: JsonObject, model: JsonObject, views: GltfViews, sizeBytes: number): GltfPrimitive[] {
  const opened: GltfPrimitive[] = [];
  for (let index = 0; index < mesh.count('primitives'); index++) {
    const primitive = openPrimitive(mesh.item('primitives', index), model, views, sizeBytes);
    if (primitive !== undefined && primitive.facets > 0) opened.push(primitive);
  }
  return opened;
}

function openPrimitive(primitive: JsonObject, model: JsonObject, views: GltfViews, sizeBytes: number): GltfPrimitive | undefined {
  const mode = primitive.wholeOr('mode', triangles);
  if (mode > fan) primitive.refuse('syntax-invalid', `In this glTF model, ${primitive.name} has a mode that glTF does not have. Export it again.`, 'mode');
  const position = primitive.object('attributes')?.wholeOr('POSITION', undefined);
  const corner = cornerOf[mode];
  if (corner === undefined || position === undefined) return undefined;
  const accessor = model.item('accessors', position);
  if (primitive.object('extensions')?.has('KHR_draco_mesh_compression') === true && !accessor.has('bufferView')) {
    primitive.refuse('syntax-invalid', 'This glTF model is compressed by Draco, which is not read. Export it without compression, or with that of meshopt.', 'extensions');
  }
  const positions = openPositions(accessor, views, sizeBytes);
  const indexed = primitive.wholeOr('indices', undefined);
  const indices = indexed === undefined ? undefined : openIndices(model.item('accessors', indexed), views);
  const count = indices?.count ?? positions.count;
  if (mode === triangles && count % 3 !== 0) primitive.refuse('syntax-invalid', `In this glTF model, the corners of ${primitive.name} do not make up whole triangles. Export it again.`);
  return { positions, indices, facets: mode === triangles ? count / 3 : Math.max(0, count - 2), cornerOf: corner, material: primitive.wholeOr('material', undefined), owner: primitive };
}
