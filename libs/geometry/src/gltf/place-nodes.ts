import { composeAffine, identity, type Affine } from '../affine';
import type { ReadingLimits } from '../limits';
import type { JsonObject } from './gltf-json';

/** A mesh of a glTF model, and where it is placed. */
export interface PlacedMesh {
  mesh: number;
  affine: Affine;
  node: JsonObject;
}

/**
 * The meshes that a glTF model shows: those of the scene that it names, or else of the first; where it has no scenes, of all nodes that stand in no other.
 * Nodes come in the order of the file, each before those that stand in it.
 */
export function placeNodes(model: JsonObject, { maximumDepth }: Pick<ReadingLimits, 'maximumDepth'>): PlacedMesh[] {
  const count = model.count('nodes');
  const seen = new Uint8Array(count);
  const placed: PlacedMesh[] = [];
  const waiting: { index: number; outer: Affine; depth: number; from: JsonObject }[] = [];

  const wait = (from: JsonObject, indices: number[], outer: Affine, depth: number): void => {
    for (const index of indices.reverse()) waiting.push({ index, outer, depth, from });
  };

  const roots = findRoots(model, count);
  wait(roots.from, roots.indices, identity, 1);
  for (let next = waiting.pop(); next !== undefined; next = waiting.pop()) {
    const { index, outer, depth, from } = next;
    const node = model.item('nodes', index);
    if (seen[index] === 1) from.refuse('syntax-invalid', `In this glTF model, ${node.name} stands in more than one place, or in itself. Export it again.`);
    seen[index] = 1;
    if (depth > maximumDepth) node.refuse('syntax-invalid', `In this glTF model, nodes stand more than ${maximumDepth} deep in one another. Export it with fewer levels.`);
    const affine = composeAffine(outer, findTransform(node));
    const mesh = node.wholeOr('mesh', undefined);
    if (mesh !== undefined) {
      checkNode(node);
      placed.push({ mesh, affine, node });
    }
    wait(node, [...node.indices('children')], affine, depth + 1);
  }
  return placed;
}

function findRoots(model: JsonObject, count: number): { from: JsonObject; indices: number[] } {
  if (model.count('scenes') > 0) {
    const scene = model.item('scenes', model.wholeOr('scene', 0));
    return { from: scene, indices: [...scene.indices('nodes')] };
  }
  const inside = new Uint8Array(count);
  for (let index = 0; index < count; index++) for (const child of model.item('nodes', index).indices('children')) if (child < count) inside[child] = 1;
  return { from: model, indices: Array.from({ length: count }, (_, index) => index).filter((index) => inside[index] === 0) };
}

/** Throws a MeshError where something bends or repeats a mesh in a way that is not read. */
function checkNode(node: JsonObject): void {
  if (node.has('skin')) node.refuse('syntax-invalid', `In this glTF model, the mesh of ${node.name} is bent by a skin, which is not read. Export the body as it stands.`, 'skin');
  if (node.object('extensions')?.has('EXT_mesh_gpu_instancing') === true) {
    node.refuse('syntax-invalid', `In this glTF model, ${node.name} repeats its mesh by EXT_mesh_gpu_instancing, which is not read. Export it with a node for each copy.`, 'extensions');
  }
}

/** How a node is placed in the one that it stands in. */
function findTransform(node: JsonObject): Affine {
  const matrix = node.numbers('matrix', 16);
  if (matrix !== undefined) {
    const [a = 1, b = 0, c = 0, p = 0, d = 0, e = 1, f = 0, q = 0, g = 0, h = 0, i = 1, r = 0, x = 0, y = 0, z = 0, s = 1] = matrix;
    if (p !== 0 || q !== 0 || r !== 0 || s !== 1) node.refuse('syntax-invalid', `In this glTF model, the matrix of ${node.name} is no move, turn or stretch. Export it again.`, 'matrix');
    return [a, b, c, d, e, f, g, h, i, x, y, z];
  }
  if (!node.has('translation') && !node.has('rotation') && !node.has('scale')) return identity;
  const [x = 0, y = 0, z = 0] = node.numbers('translation', 3) ?? [];
  const [sx = 1, sy = 1, sz = 1] = node.numbers('scale', 3) ?? [];
  const [a, b, c, d, e, f, g, h, i] = findRotation(node);
  return [a * sx, b * sx, c * sx, d * sy, e * sy, f * sy, g * sz, h * sz, i * sz, x, y, z];
}

/** Where a rotation turns the unit vectors; it is written as a quaternion, whose length is 1 but for rounding. */
function findRotation(node: JsonObject): [number, number, number, number, number, number, number, number, number] {
  const rotation = node.numbers('rotation', 4);
  if (rotation === undefined) return [1, 0, 0, 0, 1, 0, 0, 0, 1];
  const [x = 0, y = 0, z = 0, w = 1] = rotation;
  const square = x * x + y * y + z * z + w * w;
  if (!(square > 0.9 && square < 1.1)) node.refuse('syntax-invalid', `In this glTF model, the rotation of ${node.name} is no unit quaternion. Export it again.`, 'rotation');
  const s = 2 / square;
  return [
    ...([1 - s * (y * y + z * z), s * (x * y + w * z), s * (x * z - w * y)] as const),
    ...([s * (x * y - w * z), 1 - s * (x * x + z * z), s * (y * z + w * x)] as const),
    ...([s * (x * z + w * y), s * (y * z - w * x), 1 - s * (x * x + y * y)] as const),
  ];
}
