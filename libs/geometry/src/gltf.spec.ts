import { Document, NodeIO, type Accessor, type Primitive } from '@gltf-transform/core';
import { EXTMeshoptCompression, KHRMeshQuantization } from '@gltf-transform/extensions';
import fc from 'fast-check';
import { MeshoptEncoder } from 'meshoptimizer/encoder';
import { describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { anyMesh, anyRotation } from './testing/arbitrary-meshes';
import { embedGltf, makeGltf, packGlb, writeGlb, writeGltf } from './testing/gltf-files';
import { indexMesh } from './testing/indexed-mesh';
import { encode } from './testing/obj-files';
import { measureInChunks, refuseInChunks } from './testing/push-mesh';
import { measureVolume, readCorners, readFile } from './testing/read-corners';
import { join, makeBlock, makeSphere, move, rotate, roundToBinary32, stretch, type Corners } from './testing/shapes';
import { writeBinaryStl } from './write-stl';

type Json = Record<string, unknown>;

const block = makeBlock([0, 0, 0], [2, 3, 4]);
/** Numbers as a glTF file keeps them; no sign of zero comes through a transform. */
const asStored = (corners: Corners): Corners => roundToBinary32(corners).map((coordinate) => coordinate + 0);
const close = (found: number, expected: number, share = 1e-9): void => expect(Math.abs(found / expected - 1)).toBeLessThan(share);

/** A model as another program makes it: one mesh, and what is done to its numbers. */
function makeDocument(corners: Corners): { document: Document; primitive: Primitive; position: Accessor; index: Accessor } {
  const document = new Document();
  const buffer = document.createBuffer();
  const { vertices, triangles } = indexMesh(corners);
  const position = document.createAccessor().setType('VEC3').setArray(Float32Array.from(vertices)).setBuffer(buffer);
  const index = document.createAccessor().setType('SCALAR').setArray(Uint32Array.from(triangles)).setBuffer(buffer);
  const primitive = document.createPrimitive().setAttribute('POSITION', position).setIndices(index);
  const node = document.createNode('body').setMesh(document.createMesh().addPrimitive(primitive));
  document.createScene().addChild(node);
  return { document, primitive, position, index };
}

const io = new NodeIO().registerExtensions([EXTMeshoptCompression, KHRMeshQuantization]).registerDependencies({ 'meshopt.encoder': MeshoptEncoder });
const writeDocument = async (document: Document): Promise<Uint8Array<ArrayBuffer>> => Uint8Array.from(await io.writeBinary(document));

describe('a glTF model', () => {
  it('has its facets to the last bit of what it stores, in metres', () => {
    fc.assert(
      fc.property(anyMesh, (mesh) => {
        expect(readFile(writeGlb(mesh))).toMatchObject({ format: 'glb', corners: asStored(mesh), declaredUnit: 'm', trailingBytes: 0 });
        expect(readFile(writeGltf(mesh))).toMatchObject({ format: 'gltf', corners: asStored(mesh), declaredUnit: 'm' });
      }),
      { numRuns: 60 },
    );
  });

  it('as another program writes it has the figures of the same body in STL', async () => {
    for (const mesh of [block, makeSphere(3, 40), move(stretch(makeSphere(1, 24), [1, 2, 5]), [100, 200, -300])]) {
      const { document } = makeDocument(mesh);
      const [binary, stl] = [measureMesh(await writeDocument(document)), measureMesh(writeBinaryStl(mesh))];
      expect(binary.volume).toEqual(stl.volume);
      expect(binary.surface).toEqual(stl.surface);
      const { json, resources } = await io.writeJSON(document, {});
      const [bytes] = Object.values(resources);
      expect(readFile(embedGltf(json as unknown as Json, bytes ?? new Uint8Array(0))).corners).toEqual(asStored(mesh));
    }
  });

  it('packed by meshopt, whole or in fewer bits, is unpacked as another program packed it', async () => {
    await MeshoptEncoder.ready;
    const sphere = makeSphere(3, 90);
    for (const method of ['quantize', 'filter'] as const) {
      const { document, position, index } = makeDocument(sphere);
      index.setArray(Uint32Array.from(index.getArray() as ArrayLike<number>));
      document.createExtension(EXTMeshoptCompression).setRequired(true).setEncoderOptions({ method: EXTMeshoptCompression.EncoderMethod[method === 'quantize' ? 'QUANTIZE' : 'FILTER'] });
      if (method === 'quantize') {
        document.createExtension(KHRMeshQuantization).setRequired(true);
        position.setArray(Int16Array.from(position.getArray() as ArrayLike<number>, (value) => Math.round(value * 10_000)));
      }
      const bytes = await writeDocument(document);
      expect(String.fromCharCode(...bytes.subarray(0, 4000))).toContain('EXT_meshopt_compression');
      const { corners, facets } = readFile(bytes);
      expect(facets).toBe(sphere.length / 9);
      const scale = method === 'quantize' ? 10_000 : 1;
      // The encoder may turn a triangle's corners round; the volume and the box stay.
      close(measureVolume(corners), measureVolume(sphere) * scale ** 3, 1e-3);
      close(Math.max(...corners), 3 * scale, 1e-3);
    }
  });

  it('of quantised numbers has them as they are, or as fractions', () => {
    const numbers = Float64Array.from(block, (value) => value * 10);
    for (const [componentType, array, one] of [
      [5120, Int8Array, 127],
      [5121, Uint8Array, 255],
      [5122, Int16Array, 32767],
      [5123, Uint16Array, 65535],
    ] as const) {
      for (const normalized of [false, true]) {
        const { vertices, triangles } = indexMesh(numbers);
        const stride = 4 * array.BYTES_PER_ELEMENT;
        const binary = new Uint8Array((stride * vertices.length) / 3 + triangles.length);
        for (let at = 0; at < vertices.length; at += 3) binary.set(new Uint8Array(array.from(vertices.slice(at, at + 3)).buffer), (stride * at) / 3);
        binary.set(triangles, (stride * vertices.length) / 3);
        const { json } = makeGltf(block);
        const model = {
          ...json,
          extensionsRequired: ['KHR_mesh_quantization'],
          accessors: [{ bufferView: 0, componentType, normalized, count: vertices.length / 3, type: 'VEC3' }, { bufferView: 1, componentType: 5121, count: triangles.length, type: 'SCALAR' }],
          bufferViews: [{ buffer: 0, byteLength: (stride * vertices.length) / 3, byteStride: stride }, { buffer: 0, byteOffset: (stride * vertices.length) / 3, byteLength: triangles.length }],
          buffers: [{ byteLength: binary.length }],
        };
        const { corners } = readFile(packGlb(model, binary));
        expect(corners).toEqual(Float64Array.from(numbers, (value) => (normalized ? value / one : value)));
      }
    }
  });

  it('places its nodes by translation, rotation, scale and matrix, one in the other', () => {
    fc.assert(
      fc.property(anyRotation, fc.double({ min: -3, max: 3, noNaN: true }), fc.boolean(), (rotation, angle, asMatrix) => {
        const [c, s] = [Math.cos(angle), Math.sin(angle)];
        // About an axis that leans: the quaternion of half the angle's turn, and the matrix of the whole.
        const axis = [0.36, 0.48, 0.8] as const;
        const cross = ([x, y, z]: readonly number[]): number[] => [axis[1] * (z ?? 0) - axis[2] * (y ?? 0), axis[2] * (x ?? 0) - axis[0] * (z ?? 0), axis[0] * (y ?? 0) - axis[1] * (x ?? 0)];
        const turnPoint = (point: readonly number[]): number[] => {
          const along = axis.reduce((sum, value, k) => sum + value * (point[k] ?? 0), 0);
          const side = cross(point);
          return point.map((value, k) => value * c + (side[k] ?? 0) * s + (axis[k] ?? 0) * along * (1 - c));
        };
        const columns = [[2, 0, 0], [0, 3, 0], [0, 0, 0.5]].map(turnPoint);
        const inner = asMatrix
          ? { matrix: [...columns.flatMap((column) => [...column, 0]), 10, 20, 30, 1] }
          : { translation: [10, 20, 30], rotation: [...axis.map((value) => value * Math.sin(angle / 2)), Math.cos(angle / 2)], scale: [2, 3, 0.5] };
        const outer = { matrix: [...[0, 1, 2].flatMap((column) => [...rotation.map((row) => row[column] ?? 0), 0]), 1, 2, 3, 1] };
        const { json, binary } = makeGltf(block);
        const { corners } = readFile(packGlb({ ...json, nodes: [{ ...outer, children: [1] }, { ...inner, mesh: 0 }] }, binary));
        const placed = Float64Array.from(Array.from({ length: block.length / 3 }, (_, k) => turnPoint([2 * (block[3 * k] ?? 0), 3 * (block[3 * k + 1] ?? 0), 0.5 * (block[3 * k + 2] ?? 0)])).flat());
        const expected = move(rotate(move(placed, [10, 20, 30]), rotation), [1, 2, 3]);
        corners.forEach((coordinate, k) => expect(Math.abs(coordinate - (expected[k] ?? NaN))).toBeLessThan(1e-12));
      }),
      { numRuns: 60 },
    );
  });

  it('with nodes that mirror keeps volumes positive, mirrored twice too', () => {
    const sphere = makeSphere(3, 16);
    const { json, binary } = makeGltf(sphere);
    const nodes = [{ scale: [-1, 1, 1], children: [1, 2] }, { mesh: 0, translation: [20, 0, 0] }, { mesh: 0, scale: [1, -2, 1] }, { mesh: 0, scale: [-1, -1, -1] }];
    const { corners } = readFile(packGlb({ ...json, nodes, scenes: [{ nodes: [0, 3] }] }, binary));
    const volume = measureVolume(roundToBinary32(sphere));
    [1, 2, 1].forEach((times, k) => close(measureVolume(corners.subarray(k * sphere.length, (k + 1) * sphere.length)), times * volume));
    expect(measureMesh(packGlb({ ...json, nodes: nodes.slice(0, 2).map((node, k) => (k === 0 ? { ...node, children: [1] } : node)) }, binary)).soundness).toMatchObject({ closed: true, oriented: true, outward: true, turned: false });
  });

  it('shows the scene that it names, or else the first; without scenes what stands in nothing else', () => {
    const { json, binary } = makeGltf(block, [{}, { translation: [10, 0, 0] }, { translation: [20, 0, 0] }]);
    const left = (model: Json): number => Math.min(...readCorners(packGlb(model, binary)).filter((_, k) => k % 3 === 0));
    const scenes = [{ nodes: [1] }, { nodes: [2] }];
    expect(left({ ...json, scenes, scene: 1 })).toBe(20);
    expect(left({ ...json, scenes, scene: undefined })).toBe(10);
    expect(readFile(packGlb({ ...json, scenes: undefined, scene: undefined }, binary)).facets).toBe(36);
    expect(readFile(packGlb({ ...json, scenes: [{ nodes: [2] }], scene: 0 }, binary)).corners).toEqual(move(block, [20, 0, 0]));
  });

  it('of strips and fans has the facets that they stand for, each the right way round', () => {
    const vertices = Float32Array.from([0, 0, 0, 1, 0, 0, 0, 1, 0, 1, 1, 0, 0, 2, 0]);
    const model = (mode: number, count = 5): Json => ({
      asset: { version: '2.0' },
      scenes: [{ nodes: [0] }],
      nodes: [{ mesh: 0 }],
      meshes: [{ primitives: [{ attributes: { POSITION: 0 }, mode }] }],
      accessors: [{ bufferView: 0, componentType: 5126, count, type: 'VEC3' }],
      bufferViews: [{ buffer: 0, byteLength: 60 }],
      buffers: [{ byteLength: 60 }],
    });
    const read = (mode: number, count?: number): number[][] => {
      const { corners } = readFile(packGlb(model(mode, count), new Uint8Array(vertices.buffer)));
      const at = (k: number): number => [0, 1, 2, 3, 4].findIndex((vertex) => vertices[3 * vertex] === corners[k] && vertices[3 * vertex + 1] === corners[k + 1]);
      return Array.from({ length: corners.length / 9 }, (_, facet) => [at(9 * facet), at(9 * facet + 3), at(9 * facet + 6)]);
    };
    expect(read(4, 3)).toEqual([[0, 1, 2]]);
    expect(read(5)).toEqual([[0, 1, 2], [1, 3, 2], [2, 3, 4]]);
    expect(read(6)).toEqual([[0, 1, 2], [0, 2, 3], [0, 3, 4]]);
    for (const mode of [0, 1, 2, 3]) expect(refuseInChunks(packGlb(model(mode), new Uint8Array(vertices.buffer)))).toMatchObject({ code: 'facets-none', format: 'glb' });
  });

  it('with sparse positions has those that differ from the others, or from zero', () => {
    const { json, binary } = makeGltf(block);
    const { vertices } = indexMesh(block);
    const changed = [1, 5];
    const extra = new Uint8Array(4 + 24);
    extra.set(new Uint8Array(Uint16Array.from(changed).buffer));
    extra.set(new Uint8Array(Float32Array.from([7, 8, 9, -7, -8, -9]).buffer), 4);
    const views = [...(json['bufferViews'] as Json[]), { buffer: 0, byteOffset: binary.length, byteLength: 4 }, { buffer: 0, byteOffset: binary.length + 4, byteLength: 24 }];
    const sparse = { count: 2, indices: { bufferView: 2, componentType: 5123 }, values: { bufferView: 3 } };
    const [positions, indices] = json['accessors'] as [Json, Json];
    const all = Uint8Array.from([...binary, ...extra]);
    const model = (accessor: Json): Uint8Array => packGlb({ ...json, bufferViews: views, accessors: [{ ...accessor, sparse }, indices], buffers: [{ byteLength: all.length }] }, all);
    const expected = (base: readonly number[]): Corners => Float64Array.from(indexMesh(block).triangles.flatMap((vertex) => (vertex === 1 ? [7, 8, 9] : vertex === 5 ? [-7, -8, -9] : base.slice(3 * vertex, 3 * vertex + 3))));
    expect(readCorners(model(positions))).toEqual(expected(vertices));
    expect(readCorners(model({ ...positions, bufferView: undefined }))).toEqual(expected(vertices.map(() => 0)));
  });

  it('says the names of the materials that it shows, in their order, and of no others', () => {
    const { json, binary } = makeGltf(block);
    const [primitive] = (json['meshes'] as [{ primitives: [Json] }])[0].primitives;
    const meshes = [{ primitives: [2, 0, 2, undefined].map((material) => ({ ...primitive, material })) }, { primitives: [{ ...primitive, material: 1 }] }];
    const materials = [{ name: 'Brass\u0000 ' }, { name: 'Lead' }, { name: 'Steel' }, {}];
    expect(readFile(packGlb({ ...json, meshes, materials }, binary)).declaredMaterials).toEqual(['Brass', 'Steel']);
  });

  it('may have a base shape to be mixed with others, cameras, and points beside it', () => {
    const { json, binary } = makeGltf(block, [{ children: [1] }, { camera: 0 }]);
    const [primitive] = (json['meshes'] as [{ primitives: [Json] }])[0].primitives;
    const meshes = [{ primitives: [{ ...primitive, targets: [{ POSITION: 0 }] }, { attributes: { POSITION: 0 }, mode: 0 }, { attributes: {} }], weights: [0] }];
    const nodes = [{ mesh: 0, children: [1] }, { camera: 0 }];
    expect(readCorners(packGlb({ ...json, meshes, nodes, scenes: [{ nodes: [0] }] }, binary))).toEqual(block);
  });
});

describe('glTF models that are refused', () => {
  const { json, binary } = makeGltf(block);
  const [positions, indices] = json['accessors'] as [Json, Json];
  const [first, second] = json['bufferViews'] as [Json, Json];
  const [primitive] = (json['meshes'] as [{ primitives: [Json] }])[0].primitives;
  const change = (changes: Json): Uint8Array<ArrayBuffer> => packGlb({ ...json, ...changes }, binary);
  const valid = change({});
  const patch = (edit: (view: DataView) => void): Uint8Array<ArrayBuffer> => {
    const bytes = Uint8Array.from(valid);
    edit(new DataView(bytes.buffer));
    return bytes;
  };
  const binaryAt = valid.length - Math.ceil(binary.length / 4) * 4;
  const deep = Array.from({ length: 150 }, (_, k) => (k < 149 ? { children: [k + 1] } : { mesh: 0 }));
  const packed = (extension: Json): Uint8Array<ArrayBuffer> => change({ bufferViews: [{ ...first, extensions: { EXT_meshopt_compression: { buffer: 0, byteLength: 96, count: 8, byteStride: 12, mode: 'ATTRIBUTES', ...extension } } }, second] });

  const cases: [name: string, bytes: Uint8Array, code: string, sentence: RegExp, byte?: number][] = [
    ['an index beyond the vertices', patch((view) => view.setUint16(binaryAt + 96, 8, true)), 'vertex-missing', /meshes\[0\]\.primitives\[0\] has the corner 8, but its vertices are numbered from 0 to 7/, binaryAt + 96],
    ['a coordinate that is not finite', patch((view) => view.setFloat32(binaryAt + 12, NaN, true)), 'number-not-finite', /vertex 1 of meshes\[0\]\.primitives\[0\]/, binaryAt + 12],
    ['a placing beyond all bounds', change({ nodes: [{ mesh: 0, scale: [1e38, 1e38, 1e39] }] }), 'number-not-finite', /beyond 3\.4e38/],
    ['numbers in another file', change({ buffers: [{ byteLength: 168, uri: 'part.bin' }] }), 'syntax-invalid', /keeps its numbers in another file \(“part\.bin”\)/],
    ['numbers that are not base64', change({ buffers: [{ byteLength: 168, uri: 'data:application/octet-stream;base64,???' }] }), 'syntax-invalid', /not base64/],
    ['numbers that are written in words', change({ buffers: [{ byteLength: 168, uri: 'data:text/plain,abc' }] }), 'syntax-invalid', /a way of writing that is not read/],
    ['fewer numbers than it says', change({ buffers: [{ byteLength: 1e6 }] }), 'file-truncated', /buffers\[0\] has 168 of 1\u2009000\u2009000 bytes/],
    ['a view beyond its buffer', change({ bufferViews: [{ ...first, byteOffset: 100 }, second] }), 'syntax-invalid', /bufferViews\[0\] reaches beyond the end/],
    ['an accessor beyond its view', change({ accessors: [{ ...positions, count: 9 }, indices] }), 'syntax-invalid', /accessors\[0\] reaches beyond the end/],
    ['an accessor without end', change({ accessors: [{ ...positions, count: 2 ** 53 - 1 }, indices] }), 'syntax-invalid', /accessors\[0\] reaches beyond the end/],
    ['an accessor without numbers', change({ accessors: [{ ...positions, bufferView: undefined }, indices] }), 'syntax-invalid', /numbers of accessors\[0\] are missing/],
    ['elements that overlap', change({ bufferViews: [{ ...first, byteStride: 4 }, second] }), 'syntax-invalid', /elements of accessors\[0\] overlap/],
    ['positions of two numbers', change({ accessors: [{ ...positions, type: 'VEC2' }, indices] }), 'syntax-invalid', /not of the type "VEC3"/],
    ['positions of a type that they can’t have', change({ accessors: [{ ...positions, componentType: 5125 }, indices] }), 'syntax-invalid', /of a type \(5125\)/],
    ['indices with a sign', change({ accessors: [positions, { ...indices, componentType: 5122 }] }), 'syntax-invalid', /of a type \(5122\)/],
    ['indices that are no triangles', change({ accessors: [positions, { ...indices, count: 35 }] }), 'syntax-invalid', /do not make up whole triangles/],
    ['an accessor that is missing', change({ accessors: [positions] }), 'syntax-invalid', /refers to accessors\[1\], but there is 1/],
    ['a mesh that is missing', change({ nodes: [{ mesh: 1 }] }), 'syntax-invalid', /refers to meshes\[1\]/],
    ['a node in itself', change({ nodes: [{ mesh: 0, children: [0] }] }), 'syntax-invalid', /stands in more than one place, or in itself/],
    ['nodes deep in one another', change({ nodes: deep }), 'syntax-invalid', /nodes stand more than 100 deep/],
    ['a matrix that bends', change({ nodes: [{ mesh: 0, matrix: [1, 0, 0, 1, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1] }] }), 'syntax-invalid', /no move, turn or stretch/],
    ['a matrix of nine numbers', change({ nodes: [{ mesh: 0, matrix: [1, 0, 0, 0, 1, 0, 0, 0, 1] }] }), 'syntax-invalid', /nodes\[0\]\.matrix is not a list of 16 numbers/],
    ['a rotation of no length', change({ nodes: [{ mesh: 0, rotation: [0, 0, 0, 0] }] }), 'syntax-invalid', /no unit quaternion/],
    ['a skin', change({ nodes: [{ mesh: 0, skin: 0 }] }), 'syntax-invalid', /bent by a skin/],
    ['a mixed shape', change({ meshes: [{ primitives: [{ ...primitive, targets: [{}] }], weights: [0.5] }] }), 'syntax-invalid', /shape mixed of several/],
    ['instances', change({ nodes: [{ mesh: 0, extensions: { EXT_mesh_gpu_instancing: {} } }] }), 'syntax-invalid', /repeats its mesh/],
    ['Draco', change({ extensionsRequired: ['KHR_draco_mesh_compression'] }), 'syntax-invalid', /compressed by Draco/],
    ['an extension that it requires', change({ extensionsRequired: ['KHR_something'] }), 'syntax-invalid', /can't be read without “KHR_something”/],
    ['another version', change({ asset: { version: '1.0' } }), 'syntax-invalid', /of version “1\.0”; only 2\.0/],
    ['another version of the container', patch((view) => view.setUint32(4, 1, true)), 'syntax-invalid', /of version 1; only 2/, 4],
    ['a list that is none', change({ meshes: {} }), 'syntax-invalid', /meshes is not a list/],
    ['a mode that glTF does not have', change({ meshes: [{ primitives: [{ ...primitive, mode: 7 }] }] }), 'syntax-invalid', /a mode that glTF does not have/],
    ['a container that was cut off', valid.subarray(0, -4), 'file-truncated', /says [\d\u2009]+ bytes but the file has/, valid.length - 4],
    ['a container with much after its end', Uint8Array.from([...valid, ...new Uint8Array(60)]), 'count-contradicts-size', /says [\d\u2009]+ bytes but the file has/, 8],
    ['a chunk beyond the end', patch((view) => view.setUint32(12, 1e6, true)), 'syntax-invalid', /chunk at byte 12 reaches beyond/, 12],
    ['a container without JSON', patch((view) => view.setUint32(16, 5, true)), 'syntax-invalid', /does not begin with its JSON/, 12],
    ['JSON that is damaged', patch((view) => view.setUint8(20, 0x5b)), 'syntax-invalid', /JSON of this glTF model is damaged/],
    ['packed bytes that are damaged', packed({}), 'archive-damaged', /has packed are damaged/],
    ['packed bytes of a mode that is not read', packed({ mode: 'POINTS' }), 'syntax-invalid', /packed in a way that is not read/],
    ['packed normals for positions', packed({ filter: 'OCTAHEDRAL' }), 'syntax-invalid', /packs positions as what they are not/],
    ['packed bytes without end', packed({ count: 1e9 }), 'too-large-expanded', /holds more than can be examined/],
    ['copies without end', change({ nodes: Array.from({ length: 1e5 }, () => ({ mesh: 0 })), scenes: [{ nodes: Array.from({ length: 1e5 }, (_, k) => k) }], meshes: [{ primitives: Array.from({ length: 1e4 }, () => primitive) }] }), 'too-many-facets', /\(binary glTF\) has more than [\d\u2009]+ facets/],
    ['many copies', change({ nodes: Array.from({ length: 1000 }, () => ({ mesh: 0 })), scenes: [{ nodes: Array.from({ length: 1000 }, (_, k) => k) }], meshes: [{ primitives: Array.from({ length: 150 }, () => primitive) }] }), 'too-large-expanded', /places its pieces so often/],
  ];

  it.each(cases)('%s', (_name, bytes, code, sentence, byte) => {
    const error = refuseInChunks(bytes);
    expect(error.message).toMatch(sentence);
    expect(error).toMatchObject({ code, format: 'glb' });
    expect(error.at?.byte).toBeLessThanOrEqual(bytes.length);
    if (byte !== undefined) expect(error.at).toEqual({ byte });
  });

  it.each([
    ['[]', 'syntax-invalid'],
    ['{"asset":{"version":"2.0"},"nodes":[{"mesh":0}],"meshes":[{"primitives":[{"attributes":{"POSITION":0}}]}],"accessors":[{"componentType":5126,"count":3,"type":"VEC3","bufferView":0}],"bufferViews":[{"buffer":0,"byteLength":36}],"buffers":[{"byteLength":36}]}', 'syntax-invalid'],
    ['{"asset":{"version":"2.0"}', 'syntax-invalid'],
    ['{"asset":{"version":"2.0"}}', 'facets-none'],
    ['{"assets":{"version":"2.0"}}', 'format-unknown'],
    ['{"asset":{"version":"2.0"},"__proto__":{"nodes":1},"constructor":3}', 'facets-none'],
  ])('JSON: %s', (text, code) => {
    const error = refuseInChunks(encode(text));
    expect(error.code).toBe(text === '[]' ? 'format-unknown' : code);
  });

  it('at the place in the JSON that they are about', () => {
    const text = '{ "nodes" : [ {"name":"a,]}\\"", "mesh": 0 }, {"mesh":"x"} ] ,\n "asset":{"version":"2.0"}, "meshes":[]}';
    const error = refuseInChunks(encode(text));
    expect(error.message).toMatch(/refers to meshes\[0\], but there are 0|nodes\[1\]\.mesh is not a whole number/);
    expect(text.slice(error.at?.byte ?? 0)).toMatch(/^"x"/);
  });
});

describe('how a glTF model is cut into chunks', () => {
  it('changes nothing, down to one byte', () => {
    const sphere = makeSphere(7, 20);
    const files = [writeGlb(sphere, [{}, { translation: [20, 0, 0] }]), writeGltf(sphere)];
    const wholes = files.map((bytes) => JSON.stringify(measureMesh(bytes)));
    fc.assert(
      fc.property(fc.nat(files.length - 1), fc.array(fc.integer({ min: 1, max: 3000 }), { minLength: 1, maxLength: 12 }), (which, sizes) => {
        expect(JSON.stringify(measureInChunks(files[which] ?? new Uint8Array(0), sizes))).toBe(wholes[which]);
      }),
      { numRuns: 30, examples: files.map((_, which) => [which, [1]] as [number, number[]]) },
    );
    expect(measureMesh(writeGlb(sphere, [{}, { translation: [20, 0, 0] }])).volume?.content).toBeCloseTo(2 * measureVolume(roundToBinary32(join(sphere))), 8);
  });
});
