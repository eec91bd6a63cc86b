import { findDeterminant, mapPoint, type Affine } from '../affine';
import { listMaterialNames } from '../declared-materials';
import type { FacetSink } from '../facet-batch';
import { createFacetWriter, type FacetWriter } from '../facet-writer';
import { formatNames, noRemarks, tooManyFacets, type FileRemarks } from '../format-reader';
import { checkPlacedFacets } from '../keep-bytes';
import type { ReadingLimits } from '../limits';
import { MeshError, spellCount } from '../mesh-error';
import { isCoordinate, showText } from '../mesh-words';
import { parseGltfJson, type JsonObject } from './gltf-json';
import { openPrimitives, type GltfPrimitive } from './gltf-primitives';
import { createGltfViews, type BinaryChunk } from './gltf-views';
import { placeNodes, type PlacedMesh } from './place-nodes';

export interface GltfSource {
  format: 'gltf' | 'glb';
  json: { bytes: Uint8Array; start: number };
  chunk: BinaryChunk | null;
  sizeBytes: number;
}

export interface ReadGltf {
  remarks: FileRemarks;
  facets: number;
}

/** A mesh that was opened once, however often it is placed. */
interface OpenedMesh {
  primitives: readonly GltfPrimitive[];
  facets: number;
  /** Its shape may be mixed with others. */
  morphs: boolean;
}

interface Placement extends PlacedMesh {
  opened: OpenedMesh;
}

/**
 * Reads the facets of a glTF 2.0 model, in metres and the frame of its scene: every mesh that a node of the scene places, in the order of the nodes. What a
 * mirroring node places is read the other way round, so that its volume stays positive. Throws a MeshError with a byte for what does not belong there.
 */
export function readGltfModel({ format, json, chunk, sizeBytes }: GltfSource, limits: ReadingLimits, sink: FacetSink): ReadGltf {
  if (json.bytes.length > limits.maximumJsonBytes) {
    throw new MeshError('too-large-expanded', `The JSON of this glTF model has more than ${spellCount(limits.maximumJsonBytes)} bytes, the most that is read. Export it as GLB.`, { byte: json.start });
  }
  const model = parseGltfJson(json.bytes, json.start);
  checkAsset(model);
  const views = createGltfViews(model, chunk, sizeBytes, limits);
  const meshes = new Map<number, OpenedMesh>();
  const openMesh = (index: number): OpenedMesh => {
    const known = meshes.get(index);
    if (known !== undefined) return known;
    const primitives = openPrimitives(model.item('meshes', index), model, views, sizeBytes);
    const opened = { primitives, facets: primitives.reduce((sum, { facets }) => sum + facets, 0), morphs: primitives.some(({ owner }) => owner.count('targets') > 0) };
    meshes.set(index, opened);
    return opened;
  };
  const placements = placeNodes(model, limits)
    .map((placed): Placement => ({ ...placed, opened: openMesh(placed.mesh) }))
    .filter(({ opened }) => opened.facets > 0);
  for (const placement of placements) checkMorphing(model, placement);
  const facets = placements.reduce((sum, { opened }) => sum + opened.facets, 0);
  if (facets > limits.maximumFacets) throw tooManyFacets(limits.maximumFacets, format, { byte: json.start });
  checkPlacedFacets(facets, sizeBytes, format, limits);

  const writer = createFacetWriter(format, limits.maximumFacets, sink, () => ({ byte: json.start }));
  for (const { opened, affine } of placements) for (const primitive of opened.primitives) writeFacets(primitive, affine, writer, `(${formatNames[format]})`);
  writer.finish();
  return { remarks: { ...noRemarks(), declaredUnit: 'm', declaredMaterials: listMaterials(model, [...meshes.values()]) }, facets: writer.count };
}

/** Names of the materials that meshes have, in the order in which the model lists them. */
function listMaterials(model: JsonObject, meshes: readonly OpenedMesh[]): string[] {
  const used = new Set(meshes.flatMap(({ primitives }) => primitives.map(({ material }) => material).filter((material) => material !== undefined)));
  const ascending = [...used].sort((one, two) => one - two);
  return listMaterialNames(ascending.map((material) => model.item('materials', material).text('name') ?? ''));
}

/** Extensions that say nothing about the shape of a body, and those that are read. */
const harmless = /^((KHR|EXT|ADOBE|MSFT|NV|CESIUM|AGI|GODOT|FB)_(materials|texture|lights|image|xmp|primitive_outline)\w*|KHR_mesh_quantization|(EXT|KHR)_meshopt_compression|KHR_animation_pointer)$/;

function checkAsset(model: JsonObject): void {
  const asset = model.object('asset');
  const version = asset?.text('minVersion') ?? asset?.text('version');
  if (version !== '2.0') asset?.refuse('syntax-invalid', `This glTF model is of version “${showText(version ?? '', 8)}”; only 2.0 is read. Export it in that version.`);
  for (const name of model.texts('extensionsRequired')) {
    if (name === 'KHR_draco_mesh_compression') model.refuse('syntax-invalid', 'This glTF model is compressed by Draco, which is not read. Export it without compression, or with that of meshopt.', 'extensionsRequired');
    if (!harmless.test(name)) model.refuse('syntax-invalid', `This glTF model can't be read without “${showText(name, 40)}”, which is not read. Export it without.`, 'extensionsRequired');
  }
}

/** Throws a MeshError where a mesh does not have its own shape but one that is mixed of it and others. */
function checkMorphing(model: JsonObject, { node, mesh, opened }: Placement): void {
  if (!opened.morphs) return;
  const owner = node.has('weights') ? node : model.item('meshes', mesh);
  if (owner.numbers('weights', owner.count('weights'))?.some((weight) => weight !== 0) === true) {
    owner.refuse('syntax-invalid', `In this glTF model, ${owner.name} has a shape mixed of several (morph targets), which is not read. Export the body as it stands.`, 'weights');
  }
}

function writeFacets(primitive: GltfPrimitive, affine: Affine, writer: FacetWriter, format: string): void {
  const { positions, indices, facets, owner } = primitive;
  const stored = new Float64Array(3);
  const placed = new Float64Array(9);
  const mirrors = findDeterminant(affine) < 0;
  for (let facet = 0; facet < facets; facet++) {
    for (const k of [0, 1, 2] as const) {
      const corner = primitive.cornerOf(facet, k);
      const vertex = indices === undefined ? corner : indices.get(corner);
      if (vertex >= positions.count) {
        const message = `In this mesh ${format}, ${owner.name} has the corner ${spellCount(vertex)}, but its vertices are numbered from 0 to ${spellCount(positions.count - 1)}. Export it again.`;
        refuseAt(owner, indices?.placeOf(corner) ?? null, 'vertex-missing', message);
      }
      positions.read(vertex, stored);
      mapPoint(affine, stored, 0, placed, 3 * k);
      if (!isCoordinate(placed[3 * k] ?? 0) || !isCoordinate(placed[3 * k + 1] ?? 0) || !isCoordinate(placed[3 * k + 2] ?? 0)) {
        refuseAt(owner, positions.placeOf(vertex), 'number-not-finite', `In this mesh ${format}, vertex ${spellCount(vertex)} of ${owner.name} has a coordinate that is not a finite number, or beyond 3.4e38. Export it again.`);
      }
    }
    writer.add(placed, 0, mirrors ? 2 : 1, mirrors ? 1 : 2);
  }
}

function refuseAt(owner: JsonObject, byte: number | null, code: 'vertex-missing' | 'number-not-finite', message: string): never {
  if (byte === null) return owner.refuse(code, message);
  throw new MeshError(code, message, { byte });
}
