import { gzipSync } from 'fflate';
import { MeshoptEncoder } from 'meshoptimizer/encoder';
import { writeAsciiStl, writeBinaryStl } from '../../write-stl';
import { packModel, writeMeshXml, writeModel, zipFiles, relationships } from '../3mf-files';
import { embedGltf, makeGltf, packGlb } from '../gltf-files';
import { blockObj, encode, writeObj } from '../obj-files';
import { writeOff } from '../off-files';
import { writePly } from '../ply-files';
import { makeBlock, makeSphere } from '../shapes';

/** A file to begin from: what is in it, and how that is packed. */
export interface SeedFile {
  name: string;
  content: Uint8Array;
  /** Makes the file of its content, whatever that has become. */
  pack(content: Uint8Array): Uint8Array;
}

const plain = (name: string, content: Uint8Array): SeedFile => ({ name, content, pack: (bytes) => bytes });
const decode = (bytes: Uint8Array): string => String.fromCharCode(...bytes);

/** A GLB container around a JSON that may be damaged. */
function packRaw(json: Uint8Array, binary: Uint8Array): Uint8Array {
  const bytes = packGlb({}, binary);
  const length = Math.ceil(json.length / 4) * 4;
  const packed = new Uint8Array(20 + length + bytes.length - 24);
  packed.set(bytes.subarray(0, 20));
  packed.fill(32, 20, 20 + length);
  packed.set(json, 20);
  packed.set(bytes.subarray(24), 20 + length);
  const view = new DataView(packed.buffer);
  view.setUint32(8, packed.length, true);
  view.setUint32(12, length, true);
  return packed;
}

/** Small files of every format, valid all of them, with as much of each format in them as there is. */
export async function makeSeedFiles(): Promise<SeedFile[]> {
  await MeshoptEncoder.ready;
  const [block, sphere] = [makeBlock([0, 0, 0], [2, 3, 4]), makeSphere(3, 8)];
  const components = '<object id="3" type="model"><components><component objectid="1"/><component objectid="2" transform="-1 0 0 0 1 0 0 0 1 9 0 0"/></components></object>';
  const materials = '<basematerials id="7"><base name="Steel" displaycolor="#888888"/></basematerials>';
  const model = writeModel(`${materials}<object id="1" pid="7" pindex="0">${writeMeshXml(block)}</object><object id="2" type="model">${writeMeshXml(sphere)}</object>${components}`, '<item objectid="3" transform="1 0 0 0 1 0 0 0 1 0 0 5"/><item objectid="1"/>');
  const spread = writeModel('<object id="1"><components><component objectid="5" p:path="/a.model"/></components></object>', '<item objectid="1"/>', 'requiredextensions="p"');
  const nodes = [{ translation: [1, 2, 3], rotation: [0, 0, 0.6, 0.8], scale: [1, -1, 2], name: 'a' }, { matrix: [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 7, 8, 9, 1] }];
  const { json, binary } = makeGltf(sphere, nodes);
  const packed = packMeshopt();
  return [
    plain('binary STL', writeBinaryStl(sphere)),
    plain('ASCII STL', writeAsciiStl(block, 'block')),
    plain('OBJ of polygons', encode(`# block\ng a\n${blockObj}usemtl b\nf -1//1 -2//1 -3/1/1\n`)),
    plain('OBJ of triangles', encode(writeObj(sphere))),
    plain('ASCII PLY', writePly(sphere, 'ascii')),
    plain('binary PLY, small end first', writePly(block, 'binary_little_endian', { countType: 'uchar', indexType: 'ushort' })),
    plain('binary PLY, big end first', writePly(sphere, 'binary_big_endian', { coordinateType: 'float', countType: 'int', indexType: 'uint' })),
    plain('OFF', encode(writeOff(block).replace('OFF', 'COFF # a').replaceAll(/^(\d \d \d)$/gm, '$1 0 0 255'))),
    plain('glTF', embedGltf(json, binary)),
    { name: 'binary glTF', content: encode(JSON.stringify(json)), pack: (content) => packRaw(content, binary) },
    { name: 'numbers of binary glTF', content: binary, pack: (content) => packGlb(json, content) },
    { name: 'packed glTF', content: encode(JSON.stringify(packed.json)), pack: (content) => packRaw(content, packed.binary) },
    { name: 'numbers of packed glTF', content: packed.binary, pack: (content) => packGlb(packed.json, content) },
    { name: '3MF', content: encode(model), pack: (content) => packModel(decode(content)) },
    { name: '3MF, stored', content: encode(model), pack: (content) => zipFiles({ '_rels/.rels': relationships(), '3D/3dmodel.model': content }, { level: 0 }) },
    { name: 'parts of 3MF', content: encode(spread), pack: (content) => packModel(decode(content), { 'a.model': writeModel(`<object id="5">${writeMeshXml(block)}</object>`, '') }) },
    { name: 'relationships of 3MF', content: encode(relationships()), pack: (content) => zipFiles({ '_rels/.rels': content, '3D/3dmodel.model': model }) },
    { name: 'packed STL', content: writeBinaryStl(block), pack: (content) => gzipSync(content, { mtime: 0 }) },
    { name: 'packed OBJ', content: encode(blockObj), pack: (content) => gzipSync(content, { mtime: 0 }) },
  ];

  /** The sphere packed by meshopt: attributes in both versions, and triangles. */
  function packMeshopt(): { json: Record<string, unknown>; binary: Uint8Array } {
    const [positions, indices] = json['bufferViews'] as [{ byteLength: number }, { byteOffset: number; byteLength: number }];
    const count = positions.byteLength / 12;
    const attributes = MeshoptEncoder.encodeVertexBufferLevel(binary.subarray(0, positions.byteLength), count, 12, 3, 1);
    const triangles = MeshoptEncoder.encodeIndexBuffer(binary.subarray(indices.byteOffset, indices.byteOffset + indices.byteLength), indices.byteLength / 2, 2);
    const bytes = Uint8Array.from([...attributes, ...triangles]);
    const bufferViews = [
      { ...positions, buffer: 1, extensions: { EXT_meshopt_compression: { buffer: 0, byteLength: attributes.length, count, byteStride: 12, mode: 'ATTRIBUTES' } } },
      { ...indices, buffer: 1, extensions: { KHR_meshopt_compression: { buffer: 0, byteOffset: attributes.length, byteLength: triangles.length, count: indices.byteLength / 2, byteStride: 2, mode: 'TRIANGLES' } } },
    ];
    return { json: { ...json, bufferViews, buffers: [{ byteLength: bytes.length }, { byteLength: binary.length }] }, binary: bytes };
  }
}
