import { gzipSync } from 'node:zlib';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { MeshError } from './mesh-error';
import { blockObj, encode, writeObj } from './testing/obj-files';
import { measureInChunks, refuseInChunks } from './testing/push-mesh';
import { makeBlock, makeSphere } from './testing/shapes';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

const block = makeBlock([0, 0, 0], [2, 3, 4]);
const sphere = makeSphere(7, 44);
const pack = (bytes: Uint8Array | string, level = 6): Uint8Array<ArrayBuffer> => Uint8Array.from(gzipSync(bytes, { level }));
const join = (...pieces: Uint8Array[]): Uint8Array<ArrayBuffer> => Uint8Array.from(pieces.flatMap((piece) => Array.from(piece)));

/** A binary STL file with a changed header or with bytes after it. */
function patched(corners: Float64Array, change: (view: DataView) => void, extra = 0): Uint8Array<ArrayBuffer> {
  const bytes = join(writeBinaryStl(corners), new Uint8Array(extra));
  change(new DataView(bytes.buffer));
  return bytes;
}

describe('a mesh packed with gzip', () => {
  const files: [name: string, bytes: Uint8Array][] = [
    ['a short binary STL', writeBinaryStl(block)],
    ['a binary STL', writeBinaryStl(sphere)],
    ['a binary STL that begins with "solid"', writeBinaryStl(sphere, 'solid sphere')],
    ['a binary STL with a title that looks like a picture', writeBinaryStl(sphere, 'BM')],
    ['a binary STL with a few bytes after the last facet', patched(sphere, () => undefined, 49)],
    ['an ASCII STL', writeAsciiStl(sphere)],
    ['an OBJ', encode(writeObj(sphere))],
    ['a short OBJ', encode(blockObj)],
    ['an OBJ in UTF-16', new Uint8Array(Uint16Array.from(`\ufeff${blockObj}`, (character) => character.charCodeAt(0)).buffer)],
  ];

  it.each(files)('gives what %s gives, and says that it was packed', (_name, bytes) => {
    for (const level of [0, 1, 9]) expect(measureMesh(pack(bytes, level))).toEqual({ ...measureMesh(bytes), compression: 'gzip' });
    expect(measureMesh(bytes).compression).toBeNull();
  });

  it.each(files)('in several members gives the same: %s', (_name, bytes) => {
    const cut = Math.floor(bytes.length / 3);
    const members = join(pack(bytes.subarray(0, cut)), pack(new Uint8Array(0)), pack(bytes.subarray(cut)), new Uint8Array(700));
    expect(measureMesh(members)).toEqual({ ...measureMesh(bytes), compression: 'gzip' });
  });

  it('gives the same whatever the sizes of the chunks, down to one byte', () => {
    const packed = files.flatMap(([, bytes]) => [pack(bytes), join(pack(bytes.subarray(0, 500)), pack(bytes.subarray(500)))]);
    const wholes = packed.map((bytes) => JSON.stringify(measureMesh(bytes)));
    fc.assert(
      fc.property(fc.nat(packed.length - 1), fc.array(fc.oneof(fc.integer({ min: 1, max: 3 }), fc.integer({ min: 1, max: 20_000 })), { minLength: 1, maxLength: 8 }), (which, sizes) => {
        expect(JSON.stringify(measureInChunks(packed[which] ?? new Uint8Array(0), sizes))).toBe(wholes[which]);
      }),
      { numRuns: 60, examples: packed.map((_, which) => [which, [1]] as [number, number[]]) },
    );
  });

  const packedSphere = pack(writeBinaryStl(sphere));
  const flip = (bytes: Uint8Array, at: number): Uint8Array => bytes.map((byte, k) => (k === at ? byte ^ 0x55 : byte));
  const refused: [name: string, bytes: Uint8Array, code: string, sentence: RegExp][] = [
    ['cut off in its header', packedSphere.subarray(0, 7), 'file-truncated', /gzip archive ends before its content does/],
    ['cut off in its content', packedSphere.subarray(0, packedSphere.length >> 1), 'file-truncated', /gzip archive ends before/],
    ['cut off in its checksum', packedSphere.subarray(0, -5), 'file-truncated', /gzip archive ends before/],
    ['with a wrong checksum', flip(packedSphere, packedSphere.length - 7), 'archive-damaged', /gzip archive is damaged/],
    ['with a wrong length', flip(packedSphere, packedSphere.length - 3), 'archive-damaged', /gzip archive is damaged/],
    ['with a method that does not exist', flip(packedSphere, 2), 'archive-damaged', /gzip archive is damaged/],
    ['with a block that does not exist', join(packedSphere.subarray(0, 10), Uint8Array.of(7), packedSphere.subarray(11)), 'archive-damaged', /gzip archive is damaged/],
    ['with something else after it', join(packedSphere, encode('and so on')), 'archive-damaged', /gzip archive is damaged/],
    ['with something else after it and zeros', join(packedSphere, new Uint8Array(9), encode('and so on')), 'archive-damaged', /gzip archive is damaged/],
    ['twice', pack(packedSphere), 'format-unknown', /gzip archive within a gzip archive/],
    ['but empty', pack(''), 'file-empty', /The file is empty/],
    ['but a picture', pack(Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10, ...new Uint8Array(5000)])), 'format-unknown', /looks like a PNG picture/],
    ['but a ZIP archive', pack(Uint8Array.from([0x50, 0x4b, 3, 4, ...new Uint8Array(2000)])), 'file-truncated', /ends before its directory/],
    ['but a tar archive', pack(join(encode('part.stl'.padEnd(257, '\0')), encode('ustar  '), new Uint8Array(9000))), 'format-unknown', /looks like a tar archive/],
    ['but some text', pack('Dear all, '.repeat(300)), 'format-unknown', /text, but no mesh/],
    ['with fifty bytes too many', pack(patched(sphere, () => undefined, 50)), 'count-contradicts-size', /header says 1\u2009848 facets but the file holds 1\u2009849/],
    ['with a count that is too small', pack(patched(sphere, (view) => view.setUint32(80, 10, true))), 'count-contradicts-size', /says 10 facets but the file holds 1\u2009848/],
    ['with a count that is too large', pack(patched(sphere, (view) => view.setUint32(80, 5000, true))), 'count-contradicts-size', /says 5\u2009000 facets but the file holds exactly 1\u2009848/],
    ['with a declared 2³² - 1 facets', pack(patched(sphere, (view) => view.setUint32(80, 0xffffffff, true))), 'count-contradicts-size', /says 4\u2009294\u2009967\u2009295 facets but the file holds exactly/],
    ['of a mesh that was cut off', pack(writeBinaryStl(sphere).subarray(0, 20_001)), 'file-truncated', /says 1\u2009848 facets but the file has room for 398/],
    ['of a short mesh that was cut off', pack(writeBinaryStl(block).subarray(0, 500)), 'file-truncated', /says 12 facets but the file has room for 8/],
    ['of a mesh with a coordinate that is NaN', pack(patched(sphere, (view) => view.setFloat32(84 + 50 * 1000 + 12, NaN, true))), 'number-not-finite', /Corner 1 of facet 1\u2009001/],
    ['of an ASCII mesh that was cut off', pack(writeAsciiStl(sphere).subarray(0, 20_000)), 'file-truncated', /"endsolid" is missing/],
  ];

  it.each(refused)('is refused %s', (_name, bytes, code, sentence) => {
    const error = refuseInChunks(bytes);
    expect(error.code).toBe(code);
    expect(error.message).toMatch(sentence);
    if (code !== 'file-empty') expect(error.at).not.toBeNull();
    for (const chunkBytes of [1, 17, 5000]) expect(refuseInChunks(bytes, chunkBytes)).toMatchObject({ code, message: error.message, at: error.at });
  });

  it('of more facets than the caller allows is refused as soon as they have come', () => {
    const facets = sphere.length / 9;
    for (const bytes of [writeBinaryStl(sphere), writeAsciiStl(sphere), encode(writeObj(sphere))]) {
      expect(refuseInChunks(pack(bytes), Infinity, { maximumFacets: facets - 1 }).code).toBe('too-many-facets');
      expect(measureMesh(pack(bytes), { maximumFacets: facets }).facets).toBe(facets);
    }
    expect(refuseInChunks(pack(writeBinaryStl(sphere)), Infinity, { maximumFacets: 100 }).at).toEqual({ byte: 84 + 50 * 100 });
  });

  it('that was damaged anywhere is refused in words, or measured, never anything else', () => {
    const packed = files.map(([, bytes]) => pack(bytes));
    fc.assert(
      fc.property(fc.nat(packed.length - 1), fc.array(fc.tuple(fc.nat(), fc.nat(255)), { minLength: 1, maxLength: 3 }), (which, changes) => {
        const bytes = Uint8Array.from(packed[which] ?? []);
        for (const [place, value] of changes) bytes[place % bytes.length] = value;
        try {
          expect(measureMesh(bytes).facets).toBeGreaterThan(0);
        } catch (error) {
          expect(error).toBeInstanceOf(MeshError);
        }
      }),
      { numRuns: 600 },
    );
  });
});
