import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { anyMesh } from './testing/arbitrary-meshes';
import { encode } from './testing/obj-files';
import { writePly, writePlyTables, type PlyEncodingName, type PlyNumberType, type PlyValue } from './testing/ply-files';
import { measureInChunks, refuseInChunks } from './testing/push-mesh';
import { readFile } from './testing/read-corners';
import { makeBlock, makeSphere, roundToBinary32 } from './testing/shapes';

const encodings: PlyEncodingName[] = ['ascii', 'binary_little_endian', 'binary_big_endian'];
const block = makeBlock([0, 0, 0], [2, 3, 4]);
const head = 'ply\nformat ascii 1.0\nelement vertex 4\nproperty float x\nproperty float y\nproperty float z\nelement face 2\nproperty list uchar int vertex_indices\nend_header\n';
const points = '0 0 0\n1 0 0\n1 1 0\n0 1 0\n';
const square = `${head}${points}3 0 1 2\n3 0 2 3\n`;

describe('a PLY mesh', () => {
  it('has its facets to the last bit, whatever its encoding and types', () => {
    const whole = fc.constantFrom<PlyNumberType>('uchar', 'short', 'ushort', 'int', 'uint');
    fc.assert(
      fc.property(anyMesh, fc.constantFrom(...encodings), whole, whole, fc.constantFrom('float' as const, 'double' as const), fc.constantFrom('\n', '\r\n', '\r'), (mesh, encoding, countType, indexType, coordinateType, lineEnd) => {
        const { format, corners, trailingBytes } = readFile(writePly(mesh, encoding, { countType, indexType, coordinateType, lineEnd }));
        expect(format).toBe(encoding === 'ascii' ? 'ply-ascii' : 'ply-binary');
        expect(corners).toEqual(coordinateType === 'float' && encoding !== 'ascii' ? roundToBinary32(mesh) : mesh);
        expect(trailingBytes).toBe(0);
      }),
      { numRuns: 150 },
    );
  });

  it('may have any other elements and properties, of any type and in any order', () => {
    const pair: PlyValue = ['uchar', 'double', [1.5, -2]];
    for (const encoding of encodings) {
      const bytes = writePlyTables(encoding, [
        { name: 'camera', properties: ['float view', 'list uchar double pair'], rows: [[['float', 3], pair]] },
        { name: 'nothing', properties: [], rows: [[], []] },
        {
          name: 'vertex',
          properties: ['uchar red', 'double z', 'list ushort char weights', 'float y', 'short x'],
          rows: [[0, 0, 0], [2, 0, 0], [0, 3, 0], [0, 0, 4]].map(([x = 0, y = 0, z = 0]) => [['uchar', 255], ['double', z], ['ushort', 'char', [1, 2, 3]], ['float', y], ['short', x]]),
        },
        { name: 'edge', properties: ['int vertex1', 'int vertex2'], rows: [[['int', 0], ['int', 1]]] },
        {
          name: 'face',
          properties: ['uchar flags', 'list uchar uint vertex_index', 'list uchar float texcoord'],
          rows: [[0, 2, 1], [0, 1, 3], [0, 3, 2], [1, 2, 3]].map((face) => [['uchar', 7], ['uchar', 'uint', face], ['uchar', 'float', []]]),
        },
        { name: 'tail', properties: ['double value'], rows: [[['double', 1]]] },
      ]);
      expect(measureMesh(bytes)).toMatchObject({ facets: 4, volume: { content: 4 } });
    }
  });

  it('of polygons is cut as those of OBJ are', () => {
    const angle: PlyValue[][] = [[4, 1], [1, 1], [1, 5], [0, 5], [0, 0], [4, 0]].map(([x = 0, y = 0]) => [['float', x], ['float', y], ['float', 0]]);
    const bytes = writePlyTables('binary_big_endian', [
      { name: 'vertex', properties: ['float x', 'float y', 'float z'], rows: angle },
      { name: 'face', properties: ['list uchar uchar vertex_indices'], rows: [[['uchar', 'uchar', [0, 1, 2, 3, 4, 5]]]] },
    ]);
    expect(measureMesh(bytes)).toMatchObject({ facets: 4, surface: { content: 8 } });
  });

  it('may have comments, words that PLY does not have before its elements, blank lines, and numbers that don’t count', () => {
    const odd = square.replace('element vertex', 'obj_info 3\nCreated by nobody\ncomment element vertex 9\nelement vertex').replace('0 0 0\n', '\n 0 -0 0  \n\n').replace('float x', 'float nx\nproperty float x');
    expect(measureMesh(encode(odd.replaceAll(/^(\d|-| 0 -0 0).*$/gm, (line) => (/^3/.test(line) ? line : `nan ${line}`)))).surface.content).toBe(1);
  });

  it('of a binary file may have a few bytes after its end, and says how many', () => {
    const bytes = Uint8Array.from([...writePly(block, 'binary_little_endian'), 0, 0, 0]);
    expect(readFile(bytes).trailingBytes).toBe(3);
    expect(refuseInChunks(Uint8Array.from([...bytes, ...new Uint8Array(10)]))).toMatchObject({ code: 'count-contradicts-size' });
  });
});

describe('PLY files that are refused', () => {
  const binary = writePly(block, 'binary_little_endian');
  const bodyAt = String.fromCharCode(...binary).indexOf('end_header\n') + 11;
  const patched = (at: number, change: (view: DataView, at: number) => void): Uint8Array<ArrayBuffer> => {
    const bytes = Uint8Array.from(binary);
    change(new DataView(bytes.buffer), bodyAt + at);
    return bytes;
  };
  const cases: [name: string, file: string | Uint8Array<ArrayBuffer>, code: string, sentence: RegExp, at: object][] = [
    ['an index beyond the vertices', square.replace('3 0 2 3', '3 0 2 4'), 'vertex-missing', /The face 2 of 2 of this PLY mesh has the corner “4”, but its vertices are numbered from 0 to 3/, { line: 15 }],
    ['a negative index', square.replace('3 0 2 3', '3 0 2 -1'), 'vertex-missing', /corner “-1”/, { line: 15 }],
    ['an index with a fraction', square.replace('3 0 2 3', '3 0 2 1.5'), 'vertex-missing', /corner “1\.5”/, { line: 15 }],
    ['a face of two corners', square.replace('3 0 2 3', '2 0 2'), 'syntax-invalid', /has 2 corners; a polygon needs three/, { line: 15 }],
    ['a line that is too short', square.replace('1 1 0', '1 1'), 'syntax-invalid', /Line 12 of this PLY file ends before vertex 3 of 4 is whole/, { line: 12 }],
    ['a line that is too long', square.replace('1 1 0', '1 1 0 0'), 'syntax-invalid', /Line 12 of this PLY file has more values/, { line: 12 }],
    ['a line too many', `${square}3 0 1 3\n`, 'count-contradicts-size', /Line 16 comes after all/, { line: 16 }],
    ['a line too few', square.replace('3 0 2 3\n', ''), 'file-truncated', /\(ASCII PLY\) ends before face 2 of 2 is whole/, { line: 15 }],
    ['a word for a number', square.replace('1 1 0', '1 x 0'), 'syntax-invalid', /Line 12: "x" stands where a number belongs in PLY/, { line: 12 }],
    ['a decimal comma', square.replace('1 1 0', '1 1,5 0'), 'number-invalid', /decimal comma; PLY has/, { line: 12 }],
    ['NaN', square.replace('1 1 0', '1 nan 0'), 'number-not-finite', /vertex 3 of 4 of this PLY mesh has a coordinate that is not a number/, { line: 12 }],
    ['a coordinate beyond all bounds', square.replace('1 1 0', '1 1e39 0'), 'number-not-finite', /infinite or beyond 3\.4e38/, { line: 12 }],
    ['no faces', square.replace('face 2', 'face 0'), 'facets-none', /points but no faces/, { line: 9 }],
    ['no element for faces', square.replace('face 2', 'patch 2'), 'facets-none', /points but no faces/, { line: 9 }],
    ['strips', square.replace('element face 2', 'element tristrips 2'), 'syntax-invalid', /triangle strips/, { line: 9 }],
    ['faces before the vertices', 'ply\nformat ascii 1.0\nelement face 1\nproperty list uchar int vertex_index\nelement vertex 3\nproperty float x\nproperty float y\nproperty float z\nend_header\n3 0 1 2\n0 0 0\n1 0 0\n0 1 0\n', 'syntax-invalid', /faces before its vertices/, { line: 9 }],
    ['no x', square.replace('float x', 'float u'), 'syntax-invalid', /have no x/, { line: 9 }],
    ['no indices', square.replace('vertex_indices', 'corners'), 'syntax-invalid', /no list "vertex_indices"/, { line: 9 }],
    ['an element twice', square.replace('element face 2', 'element vertex 2'), 'syntax-invalid', /Line 7 of the PLY header has the element "vertex" for a second time/, { line: 7 }],
    ['a type that PLY does not have', square.replace('float y', 'real y'), 'syntax-invalid', /Line 5 of the PLY header has a property whose type or name/, { line: 5 }],
    ['a list by fractions', square.replace('list uchar', 'list float'), 'syntax-invalid', /length is not a whole number/, { line: 8 }],
    ['a word after an element', square.replace('property float y', 'propetry float y'), 'syntax-invalid', /Line 5 of the PLY header begins with a word/, { line: 5 }],
    ['another version', square.replace('ascii 1.0', 'ascii 2.0'), 'syntax-invalid', /version other than 1\.0/, { line: 2 }],
    ['another encoding', square.replace('ascii 1.0', 'packed 1.0'), 'syntax-invalid', /no format that PLY knows/, { line: 2 }],
    ['no format', square.replace('format ascii 1.0\n', ''), 'syntax-invalid', /none before has said what format/, { line: 8 }],
    ['a format after a thousand bytes', square.replace('format ascii 1.0', `comment ${'-'.repeat(1100)}\nformat binary_little_endian 1.0`), 'syntax-invalid', /says too late what format/, { line: 10 }],
    ['a property without an element', square.replace('element vertex 4\n', ''), 'syntax-invalid', /before any element/, { line: 3 }],
    ['an element without a number', square.replace('vertex 4', 'vertex many'), 'syntax-invalid', /without a name or number/, { line: 3 }],
    ['too many vertices', square.replace('vertex 4', 'vertex 99999999999'), 'too-many-vertices', /\(PLY\) has more than [\d\u2009]+ vertices/, { line: 9 }],
    ['too many faces', square.replace('face 2', 'face 99999999999'), 'too-many-facets', /\(ASCII PLY\) has more than [\d\u2009]+ facets/, { line: 9 }],
    ['a header that was cut off', square.slice(0, 100), 'file-truncated', /ends in its header/, { line: 7 }],
    ['a header without end', square.replace('end_header', `comment ${'-'.repeat(1 << 20)}`), 'syntax-invalid', /header of this PLY file goes on/, { line: 9 }],
    ['a binary file that was cut off', binary.subarray(0, -3), 'file-truncated', /\(binary PLY\) ends before face 12 of 12 is whole/, { byte: binary.length - 3 }],
    ['a binary file with NaN', patched(8 * 4, (view, at) => view.setFloat64(at, NaN, true)), 'number-not-finite', /vertex 2 of 8/, { byte: bodyAt + 32 }],
    ['a binary file with an infinite number', patched(0, (view, at) => view.setFloat64(at, -Infinity, true)), 'number-not-finite', /vertex 1 of 8/, { byte: bodyAt }],
    ['a binary file with an index beyond the vertices', patched(8 * 24 + 1, (view, at) => view.setInt32(at, 8, true)), 'vertex-missing', /face 1 of 12 of this PLY mesh has the corner “8”/, { byte: bodyAt + 193 }],
    ['a binary file with a negative index', patched(8 * 24 + 1, (view, at) => view.setInt32(at, -1, true)), 'vertex-missing', /corner “-1”/, { byte: bodyAt + 193 }],
  ];

  it.each(cases)('%s', (_name, file, code, sentence, at) => {
    const bytes = typeof file === 'string' ? encode(file) : file;
    const error = refuseInChunks(bytes);
    expect(error.message).toMatch(sentence);
    expect(error).toMatchObject({ code, at });
    for (const chunkBytes of bytes.length > 5000 ? [4096] : [1, 7]) expect(refuseInChunks(bytes, chunkBytes)).toMatchObject({ code, message: error.message, at });
  });

  it('more corners of one polygon than are read', () => {
    expect(refuseInChunks(encode(square.replace('3 0 2 3', `70000 ${'0 1 2 '.repeat(23_334)}`)))).toMatchObject({ code: 'polygon-too-large', at: { line: 15 } });
  });
});

describe('how a PLY file is cut into chunks', () => {
  const sphere = makeSphere(7, 20);
  const files = [encode(square), encode(square.replaceAll('\n', '\r')), ...encodings.map((encoding) => writePly(sphere, encoding, { lineEnd: '\r\n' })), writePly(sphere, 'binary_big_endian', { indexType: 'ushort', lineEnd: '\r' })];
  const wholes = files.map((bytes) => JSON.stringify(measureMesh(bytes)));

  it('changes nothing, down to one byte', () => {
    fc.assert(
      fc.property(fc.nat(files.length - 1), fc.array(fc.oneof(fc.integer({ min: 1, max: 3 }), fc.integer({ min: 1, max: 5000 })), { minLength: 1, maxLength: 12 }), (which, sizes) => {
        expect(JSON.stringify(measureInChunks(files[which] ?? new Uint8Array(0), sizes))).toBe(wholes[which]);
      }),
      { numRuns: 60, examples: files.map((_, which) => [which, [1]] as [number, number[]]) },
    );
  });
});
