import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { anyMesh } from './testing/arbitrary-meshes';
import { encode } from './testing/obj-files';
import { writeOff } from './testing/off-files';
import { measureInChunks, refuseInChunks } from './testing/push-mesh';
import { readFile } from './testing/read-corners';
import { makeSphere } from './testing/shapes';

const body = '0 0 0\n2 0 0\n2 3 0\n0 3 0\n0 0 4\n2 0 4\n2 3 4\n0 3 4\n4 3 2 1 0\n4 4 5 6 7\n4 0 1 5 4\n4 1 2 6 5\n4 2 3 7 6\n4 3 0 4 7\n';
const block = `OFF\n8 6 12\n${body}`;

describe('an OFF mesh', () => {
  it('has its facets to the last bit', () => {
    fc.assert(
      fc.property(anyMesh, (mesh) => {
        const { format, corners } = readFile(encode(writeOff(mesh)));
        expect(format).toBe('off');
        expect(corners).toEqual(mesh);
      }),
      { numRuns: 100 },
    );
  });

  it.each([
    ['polygons', block],
    ['the counts in its first line', block.replace('OFF\n', 'OFF ')],
    ['no number of edges', block.replace('8 6 12', '8 6')],
    ['comments and blank lines', `# a block\n\n${block.replace('8 6 12', '# counts\n\n8 6 12 # vertices, faces, edges').replaceAll('\n4 ', '\n# face\n 4 ')}`],
    ['colours of faces, by number and by name', block.replaceAll(/^(4 .*)$/gm, '$1 255 0 0 # red').replace('0 # red', '0 red')],
    ['colours of vertices', block.replace('OFF', 'COFF').replaceAll(/^(\d \d \d)$/gm, '$1 255 0 0 255')],
    ['normals', block.replace('OFF', 'NOFF').replaceAll(/^(\d \d \d)$/gm, '$1 0 0 1')],
    ['normals and colours and places on a texture', block.replace('OFF', 'STCNOFF').replaceAll(/^(\d \d \d)$/gm, '$1 0 0 1 .5 .5 .5 1 0 0')],
    ['colours that nothing announces', block.replaceAll(/^(\d \d \d)$/gm, '$1 255 0 0')],
    ['CRLF line ends and no last one', block.replaceAll('\n', '\r\n').trimEnd()],
    ['points and lines among its faces', block.replace('8 6 12', '8 8 12').replace('4 3 2 1 0', '1 0\n2 0 1 255 0 0\n4 3 2 1 0')],
    ['a byte-order mark', `\xef\xbb\xbf${block}`],
  ])('may have %s', (_name, text) => {
    expect(measureMesh(encode(text))).toMatchObject({ format: 'off', facets: 12, volume: { content: 24 }, soundness: { closed: true, outward: true } });
  });
});

describe('OFF files that are refused', () => {
  const cases: [name: string, text: string, code: string, sentence: RegExp, at: object | null][] = [
    ['an index beyond the vertices', block.replace('4 5 6 7', '4 5 6 8'), 'vertex-missing', /face in line 12 of this OFF mesh has the corner "8", but its vertices are numbered from 0 to 7/, { line: 12 }],
    ['a negative index', block.replace('4 5 6 7', '4 5 6 -7'), 'vertex-missing', /corner "-7"/, { line: 12 }],
    ['a corner that is no number', block.replace('4 5 6 7', '4 5 6 x'), 'syntax-invalid', /"x" stands where a corner/, { line: 12 }],
    ['a corner with a fraction', block.replace('4 5 6 7', '4 5 6 7.5'), 'number-invalid', /"7\.5", which is not a number/, { line: 12 }],
    ['a face with too few corners', block.replace('4 5 6 7', '4 5 6'), 'syntax-invalid', /says it has 4 corners and has 3/, { line: 12 }],
    ['a vertex with too few numbers', block.replace('2 0 4', '2 0'), 'syntax-invalid', /vertex in line 8 of this OFF mesh has 2 coordinates/, { line: 8 }],
    ['a vertex with too many', block.replace('2 0 4', '2 0 4 1 2 3 4 5 6 7 8 9 10'), 'syntax-invalid', /stands where the end of the line/, { line: 8 }],
    ['a word for a coordinate', block.replace('2 0 4', '2 zero 4'), 'syntax-invalid', /"zero" stands where a coordinate belongs in OFF/, { line: 8 }],
    ['NaN', block.replace('2 0 4', '2 nan 4'), 'number-not-finite', /line 8 is "nan"/, { line: 8 }],
    ['a face too many', `${block}3 0 1 2\n`, 'count-contradicts-size', /Line 17 comes after the 6 faces/, { line: 17 }],
    ['a face too few', block.slice(0, -10), 'file-truncated', /This OFF file ends after 5 of 6 faces/, { line: 16 }],
    ['vertices alone, cut off', block.slice(0, 29), 'file-truncated', /ends after 3 of 8 vertices/, { line: 6 }],
    ['a keyword alone', 'OFF\n', 'file-truncated', /before it has said how many/, { line: 2 }],
    ['no faces', block.replace('8 6 12', '8 0 0').replace(/(4 .*\n)+$/, ''), 'facets-none', /\(OFF\) is a mesh without a single facet/, null],
    ['points alone', block.replace('8 6 12', '8 1 0').replace(/(4 .*\n)+$/, '1 0\n'), 'facets-none', /without a single facet/, null],
    ['no counts', block.replace('8 6 12\n', 'eight\n'), 'syntax-invalid', /"eight" stands where a number of vertices/, { line: 2 }],
    ['one count', block.replace('8 6 12', '8'), 'syntax-invalid', /has to say how many vertices and faces/, { line: 2 }],
    ['four counts', block.replace('8 6 12', '8 6 12 1'), 'syntax-invalid', /stands where the end of the line/, { line: 2 }],
    ['more dimensions than three', block.replace('OFF', '4OFF'), 'syntax-invalid', /other than three dimensions \("4OFF"\)/, { line: 1 }],
    ['any number of dimensions', block.replace('OFF', 'nOFF'), 'syntax-invalid', /other than three dimensions/, { line: 1 }],
    ['a binary file without binary numbers', block.replace('OFF', 'OFF BINARY'), 'syntax-invalid', /binary OFF file; only the one in words/, { line: 1 }],
    ['too many vertices', block.replace('8 6 12', '20000001 6 0'), 'too-many-vertices', /\(OFF\) has more than [\d\u2009]+ vertices/, { line: 2 }],
    ['too many faces', block.replace('8 6 12', '8 999999999 0'), 'too-many-facets', /\(OFF\) has more than [\d\u2009]+ facets/, { line: 2 }],
  ];

  it.each(cases)('%s', (_name, text, code, sentence, at) => {
    const error = refuseInChunks(encode(text));
    expect(error.message).toMatch(sentence);
    expect(error).toMatchObject({ code, at });
    for (const chunkBytes of [1, 7]) expect(refuseInChunks(encode(text), chunkBytes)).toMatchObject({ code, message: error.message, at });
  });
});

describe('how an OFF file is cut into chunks', () => {
  it('changes nothing, down to one byte', () => {
    const files = [encode(block), encode(writeOff(makeSphere(7, 20)).replaceAll('\n', '\r\n'))];
    const wholes = files.map((bytes) => JSON.stringify(measureMesh(bytes)));
    fc.assert(
      fc.property(fc.nat(files.length - 1), fc.array(fc.integer({ min: 1, max: 3000 }), { minLength: 1, maxLength: 12 }), (which, sizes) => {
        expect(JSON.stringify(measureInChunks(files[which] ?? new Uint8Array(0), sizes))).toBe(wholes[which]);
      }),
      { numRuns: 40, examples: files.map((_, which) => [which, [1]] as [number, number[]]) },
    );
  });
});
