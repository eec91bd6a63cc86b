import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { MeshError } from './mesh-error';
import { anyMesh } from './testing/arbitrary-meshes';
import { compareExactly } from './testing/compare-exactly';
import { blockFaces, blockObj, blockVertices, encode, writeObj } from './testing/obj-files';
import { measureInChunks, refuseInChunks } from './testing/push-mesh';
import { makeBlock, makeSphere, makeTorus } from './testing/shapes';
import { writeAsciiStl } from './write-stl';

const vertexLines = blockVertices.map((vertex) => `v ${vertex}\n`).join('');
const faceLines = blockFaces.map((face) => `f ${face.join(' ')}\n`).join('');
const faces = (corner: (vertex: number) => string): string => blockFaces.map((face) => `f ${face.map(corner).join(' ')}\n`).join('');

const refusal = (text: string | Uint8Array, chunkBytes?: number): MeshError => refuseInChunks(typeof text === 'string' ? encode(text) : text, chunkBytes);

describe('an OBJ mesh', () => {
  const expected = measureMesh(writeAsciiStl(makeBlock([0, 0, 0], [2, 3, 4])));

  it('of a block gives the same as the block in STL', () => {
    expect(measureMesh(encode(blockObj))).toEqual({ ...expected, format: 'obj' });
  });

  it('gives bit for bit what the same facets give in ASCII STL', () => {
    fc.assert(
      fc.property(anyMesh, (corners) => {
        const { format, ...found } = measureMesh(encode(writeObj(corners)));
        const { format: other, ...same } = measureMesh(writeAsciiStl(corners));
        expect([format, other]).toEqual(['obj', 'stl-ascii']);
        expect(found).toEqual(same);
      }),
      { numRuns: 60 },
    );
  });

  it('keeps binary64: what it gives of a torus far from the origin is exact', () => {
    const corners = makeTorus(5.123456789012345, 1 / 3, 16).map((coordinate) => coordinate + 1000);
    const errors = compareExactly(measureMesh(encode(writeObj(corners))), corners);
    expect(Math.max(errors.volume, errors.centre, errors.second)).toBeLessThan(1e-13);
  });

  it.each([
    ['CRLF line ends', blockObj.replaceAll('\n', '\r\n')],
    ['CR line ends', blockObj.replaceAll('\n', '\r')],
    ['no final newline', blockObj.trimEnd()],
    ['tabs, blanks at both ends and blank lines', blockObj.replaceAll(' ', ' \t ').replaceAll('\n', '  \n \t\n\v\f  ')],
    ['a byte-order mark', `\xef\xbb\xbf${blockObj}`],
    ['a byte-order mark before a comment', `\xef\xbb\xbf# block\n${blockObj}`],
    ['comments everywhere', `# a block\n#\n${blockObj.replaceAll('\n', ' # v 1 2 3\n# f 1 2 3\n')}# the end`],
    ['comments that touch what stands before them', blockObj.replaceAll('\n', '#f 1 2\n')],
    ['a comment that ends with a backslash, which joins nothing', `# C:\\parts\\\n${blockObj.replaceAll('\n', ' # \\\n')}`],
    ['comments longer than what decides', `${'# how this came about\n'.repeat(200)}${blockObj}`],
    ['one comment longer than what decides, of one long word', `#${'x'.repeat(5000)}\n${blockObj}`],
    ['a comment in Latin-1', `# Kl\xf6tzchen\n${blockObj}`],
    ['lines continued by a backslash', blockObj.replaceAll(/(\S+) (\S+)\n/g, '\\\n$1 \\\n $2 \\\n\n')],
    ['lines continued by a backslash at CRLF', blockObj.replaceAll(/ (\S+)\n/g, ' \\\n$1\n').replaceAll('\n', '\r\n')],
    ['a backslash that touches the word before it', blockObj.replaceAll(/(\S) (\S+)\n/g, '$1\\\n$2\n')],
    ['a statement that is passed over, continued', `${blockObj}g one two \\\n three \\\nfour\n`],
    ['texture places and normals', `${vertexLines}vt 0 0\nvt 1 0 0\nvn 0 0 1\n${faces((vertex) => `${vertex}/2/1`)}`],
    ['texture places', `${vertexLines}vt 0 0\n${faces((vertex) => `${vertex}/1`)}`],
    ['normals', `${vertexLines}vn 0 0 1\n${faces((vertex) => `${vertex}//1`)}`],
    ['slashes with nothing after them', `${vertexLines}${faces((vertex) => `${vertex}//`)}`],
    ['indices from the last vertex back', `${vertexLines}${faces((vertex) => `${vertex - 9}`)}`],
    ['indices from the last vertex back, with others', `${vertexLines}vt 0 0\nvn 0 0 1\n${faces((vertex) => `${vertex - 9}/-1/-1`)}`],
    ['vertices after some of the faces', `${blockVertices.slice(0, 4).map((vertex) => `v ${vertex}\n`).join('')}f 1 3 4 2\n${blockVertices.slice(4).map((vertex) => `v ${vertex}\n`).join('')}${faceLines.slice('f 1 3 4 2\n'.length)}`],
    ['objects, groups, smoothing, materials', `mtllib my materials.mtl\no block\ng left right\ns 1\nusemtl steel, brushed\n${blockObj.replaceAll('f 3', 'g other\ns off\no again\nusemtl x\nf 3')}`],
    ['points, lines and parameters', `${blockObj}vp 0.1 0.2\np 1 2\nl 1 2 3\nl 1/1 2/2\n`],
    ['a curve, which encloses nothing', `${blockObj}cstype bspline\ndeg 3\ncurv 0 1 1 2 3 4\nparm u 0 0 0 0 1 1 1 1\nend\n`],
    ['weights', blockObj.replaceAll(/v (.*)\n/g, 'v $1 1.0\n')],
    ['weights other than 1, which polygons do not use', blockObj.replaceAll(/v (.*)\n/g, 'v $1 0.5\n')],
    ['colours', blockObj.replaceAll(/v (.*)\n/g, 'v $1 0.1 0.2 0.3\n')],
    ['weights and colours', blockObj.replaceAll(/v (.*)\n/g, 'v $1 1 .1 .2 .3\n')],
    ['signs and exponents', blockObj.replaceAll(/v (\S+) (\S+) (\S+)\n/g, 'v +$1.0e0 $2.000E+00 $3e-0\n')],
    ['faces as an older version wrote them', blockObj.replaceAll('f ', 'fo ')],
    ['a material whose name has a number sign', `usemtl #12\n${blockObj}`],
  ])('with %s', (_name, text) => {
    expect(measureMesh(encode(text))).toEqual({ ...expected, format: 'obj' });
  });

  it.each([
    ['big-endian', true],
    ['little-endian', false],
  ])('in UTF-16, %s, and an STL mesh too', (_name, bigEndian) => {
    const widen = (text: string): Uint8Array => {
      const bytes = new Uint8Array(2 * text.length);
      const view = new DataView(bytes.buffer);
      Array.from(text).forEach((character, k) => view.setUint16(2 * k, character.charCodeAt(0), !bigEndian));
      return bytes;
    };
    expect(measureMesh(widen(`\ufeff# \u7acb\u65b9\u4f53\n${blockObj}`))).toEqual({ ...expected, format: 'obj' });
    expect(measureMesh(widen(`\ufeff${String.fromCharCode(...writeAsciiStl(makeBlock([0, 0, 0], [2, 3, 4])))}`))).toEqual(expected);
    expect(refusal(widen(`\ufeff${blockObj}`).subarray(0, 101))).toMatchObject({ code: 'file-truncated', at: { byte: 101 } });
    expect(refusal(widen(`\ufeff${blockObj.replace('f 1 3', 'f 1 \u0663')}`))).toMatchObject({ code: 'syntax-invalid', at: { line: 9 } });
  });

  it('of polygons is cut into triangles from the first corner of each', () => {
    const found = measureMesh(encode('v 0 0 0\nv 2 0 0\nv 3 1 0\nv 2 2 0\nv 0 2 0\nf 1 2 3 4 5\n'));
    expect(found).toMatchObject({ facets: 3, volume: null, surface: { content: 5 } });
    expect(found.soundness.findings).toMatchObject([{ kind: 'boundary-edges', count: 5, facets: [0, 1, 2] }]);
  });

  it('with a corner twice in a polygon has degenerate facets, and the same volume', () => {
    const found = measureMesh(encode(blockObj.replace('f 1 3 4 2', 'f 1 3 3 4 2 2')));
    expect(found.volume?.content).toBe(24);
    expect(found.soundness).toMatchObject({ degenerateFacets: 2, defensible: true });
  });

  it('of several objects is one mesh', () => {
    const far = blockVertices.map((vertex) => `v ${vertex.split(' ').map((number) => Number(number) + 10).join(' ')}\n`).join('');
    const found = measureMesh(encode(`o one\n${blockObj}o two\n${far}${faces((vertex) => `${vertex - 9}`)}`));
    expect(found.volume?.content).toBe(48);
    expect(found.soundness.findings).toEqual([]);
  });

  it('whose polygons are not flat says which, and by their first facets', () => {
    const bent = (height: string): string => blockObj.replace('v 2 3 4', `v 2 3 ${height}`);
    // The corner belongs to three faces, and moving it along z bends the one on top.
    expect(measureMesh(encode(bent('4.1'))).soundness.findings).toMatchObject([{ kind: 'non-planar-polygons', count: 1, facets: [2] }]);
    expect(measureMesh(encode(bent('4.01'))).soundness.findings).toHaveLength(1);
    expect(measureMesh(encode(bent('4.0001'))).soundness.findings).toEqual([]);
    // Far away, six digits leave steps that are no bend.
    const moved = blockObj.replaceAll(/v (\S+) (\S+) (\S+)\n/g, (_, x, y, z) => `v ${Number(x) + 10_000} ${Number(y) + 10_000} ${Number(z) + 10_000}\n`);
    expect(measureMesh(encode(moved.replace('v 10002 10003 10004', 'v 10002 10003 10004.04'))).soundness.findings).toEqual([]);
  });
});

describe('OBJ files that are refused', () => {
  const cases: [name: string, text: string, code: string, sentence: RegExp, at: object | null][] = [
    ['index 0', `${vertexLines}f 1 0 2\n`, 'vertex-missing', /corner "0", but vertices are counted from 1/, { line: 9 }],
    ['an index beyond the vertices', `${vertexLines}f 1 3 9 2\n`, 'vertex-missing', /corner "9", but the number of vertices before it is 8/, { line: 9 }],
    ['an index beyond the first vertex', `${vertexLines}f 1 3 -9 2\n`, 'vertex-missing', /corner "-9"/, { line: 9 }],
    ['an index of many digits', `${vertexLines}f 1 3 ${'9'.repeat(100)} 2\n`, 'vertex-missing', /corner "999999999999999999999999…"/, { line: 9 }],
    ['a vertex that comes after its face', 'v 0 0 0\nv 1 0 0\nf 1 2 3\nv 0 1 0\n', 'vertex-missing', /before it is 2/, { line: 3 }],
    ['a face with two corners', `${vertexLines}f 1 3\n`, 'syntax-invalid', /The polygon in line 9 has 2 corners; it needs three/, { line: 9 }],
    ['a face without corners', `${vertexLines}f\n`, 'syntax-invalid', /has 0 corners/, { line: 9 }],
    ['a missing coordinate', 'v 0 0 0\nv 1 2\nv 0 1 0\nf 1 2 3\n', 'syntax-invalid', /vertex in line 2 has 2 coordinates; three/, { line: 2 }],
    ['a decimal comma', 'v 0 0 0\nv 1,5 2 3\nv 0 1 0\nf 1 2 3\n', 'number-invalid', /Line 2 has "1,5" with a decimal comma; OBJ has/, { line: 2 }],
    ['a number with a slip', 'v 0 0 0\nv 1 3.1+e2 3\nv 0 1 0\nf 1 2 3\n', 'number-invalid', /Line 2 has "3\.1\+e2"/, { line: 2 }],
    ['a word for a coordinate', 'v 0 0 0\nv 1 x 3\n', 'syntax-invalid', /Line 2: "x" stands where a coordinate belongs in OBJ/, { line: 2 }],
    ['a word for a colour', 'v 0 0 0 red\n', 'syntax-invalid', /"red" stands where a weight or part of a colour/, { line: 1 }],
    ['more numbers than a vertex has', 'v 1 2 3 4 5 6 7 8 9\n', 'syntax-invalid', /"9" stands where the end of the line/, { line: 1 }],
    ['NaN', 'v 0 0 0\nv 1 nan 3\n', 'number-not-finite', /line 2 is "nan"/, { line: 2 }],
    ['a coordinate beyond all bounds', 'v 0 0 -1e39\n', 'number-not-finite', /line 1 is larger than 3\.4e38, the most that is taken from OBJ/, { line: 1 }],
    ['a corner with a point', `${vertexLines}f 1 3.0 2\n`, 'number-invalid', /"3\.0", which is not a number/, { line: 9 }],
    ['a corner that is no number', `${vertexLines}f 1 a 2\n`, 'syntax-invalid', /"a" stands where a corner/, { line: 9 }],
    ['a corner with words after the slash', `${vertexLines}f 1 3/x 2\n`, 'number-invalid', /"3\/x"/, { line: 9 }],
    ['a statement that OBJ does not have', `${vertexLines}vertex 1 2 3\n`, 'syntax-invalid', /Line 9 begins with "vertex", which is no statement/, { line: 9 }],
    ['a call for another file', `${vertexLines}call other.obj\n${faceLines}`, 'syntax-invalid', /calls for another file/, { line: 9 }],
    ['free-form surfaces alone', `${vertexLines}cstype bezier\ndeg 3 3\nsurf 0 1 0 1 1 2 3 4\nend\n`, 'facets-none', /free-form surfaces \(the first in line 11\) but no facets/, { line: 11 }],
    ['free-form surfaces beside facets', `${blockObj}cstype bezier\ndeg 3 3\nsurf 0 1 0 1 1 2 3 4\nend\n`, 'syntax-invalid', /beside its facets/, { line: 17 }],
    ['vertices alone', vertexLines, 'facets-none', /\(OBJ\) is a mesh without a single facet/, null],
    ['points and lines alone', `${vertexLines}p 1\nl 1 2\n`, 'facets-none', /without a single facet/, null],
    ['a comment alone', '# nothing\n', 'facets-none', /without a single facet/, null],
    ['a control character', `${vertexLines}#${'-'.repeat(1200)}\nf 1 3 \x01 2\n`, 'syntax-invalid', /control character \(code 1\)/, { line: 10 }],
    ['a zero byte in a comment', `${blockObj}# ${' '.repeat(1200)}\0\n`, 'syntax-invalid', /control character \(code 0\)/, { line: 15 }],
  ];

  it.each(cases)('%s', (_name, text, code, sentence, at) => {
    const error = refusal(text);
    expect(error.code).toBe(code);
    expect(error.message).toMatch(sentence);
    expect(error.at).toEqual(at);
    for (const chunkBytes of [1, 2, 7, 64]) expect(refusal(text, chunkBytes)).toMatchObject({ code, message: error.message, at });
  });
});

describe('how an OBJ file is cut into chunks', () => {
  const texts = [
    blockObj.replaceAll('\n', '\r\n'),
    `\xef\xbb\xbf${blockObj.replaceAll(/ (\S+)\n/g, ' \\\r\n$1\r\n# C:\\\r\n')}`,
    `# one \\\n${blockObj.replaceAll(/v (.*)\n/g, 'v $1 1 # w\r')}g a\\\nb`,
    writeObj(makeSphere(7, 20)),
  ];
  const wholes = texts.map((text) => JSON.stringify(measureMesh(encode(text))));

  it('changes nothing, down to one byte', () => {
    fc.assert(
      fc.property(fc.nat(texts.length - 1), fc.array(fc.oneof(fc.integer({ min: 1, max: 3 }), fc.integer({ min: 1, max: 5000 })), { minLength: 1, maxLength: 12 }), (which, sizes) => {
        expect(JSON.stringify(measureInChunks(encode(texts[which] ?? ''), sizes))).toBe(wholes[which]);
      }),
      { numRuns: 60, examples: texts.map((_, which) => [which, [1]] as [number, number[]]) },
    );
  });

  it('and damage is refused in words, or measured, never anything else', () => {
    fc.assert(
      fc.property(fc.nat(texts.length - 1), fc.array(fc.tuple(fc.nat(), fc.nat(255)), { minLength: 1, maxLength: 6 }), (which, changes) => {
        const bytes = encode(texts[which] ?? '');
        for (const [place, value] of changes) bytes[place % bytes.length] = value;
        try {
          expect(JSON.stringify(measureMesh(bytes).surface)).not.toMatch(/null/);
        } catch (error) {
          expect(error).toBeInstanceOf(MeshError);
        }
      }),
      { numRuns: 800 },
    );
  });
});
