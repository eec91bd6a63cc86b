import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createMeasurer, measureMesh } from './measurer';
import { MeshError } from './mesh-error';
import { makeBlock, makeSphere } from './testing/shapes';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

const block = makeBlock([0, 0, 0], [2, 3, 4]);
const encode = (text: string): Uint8Array<ArrayBuffer> => Uint8Array.from(text, (character) => character.charCodeAt(0));
const decode = (bytes: Uint8Array): string => String.fromCharCode(...bytes);

function refusal(bytes: Uint8Array, options: { sizeBytes?: number; maximumFacets?: number } = {}): MeshError {
  try {
    const measurer = createMeasurer({ sizeBytes: bytes.length, ...options });
    measurer.push(bytes);
    measurer.finish();
  } catch (error) {
    if (error instanceof MeshError) return error;
    throw error;
  }
  throw new Error('The file was not refused.');
}

/** A binary file with a changed header or other bytes. */
function patched(change: (view: DataView, bytes: Uint8Array) => void, extra = 0): Uint8Array {
  const bytes = new Uint8Array([...writeBinaryStl(block), ...new Uint8Array(extra)]);
  change(new DataView(bytes.buffer), bytes);
  return bytes;
}

describe('files that are refused', () => {
  const binary = writeBinaryStl(block);
  const ascii = decode(writeAsciiStl(block));
  const cases: [name: string, bytes: Uint8Array, code: string, sentence: RegExp, at: object | null][] = [
    ['an empty file', new Uint8Array(0), 'file-empty', /^The file is empty/, null],
    ['text that is no mesh', encode('Dear all,\nplease find the part attached.\n'), 'format-unknown', /^This is text, but no mesh/, { line: 1 }],
    ['a long text', encode('lorem ipsum '.repeat(500)), 'format-unknown', /^This is text, but no mesh/, { line: 1 }],
    ['a solid model', encode('ISO-10303-21;\nHEADER;\n'.repeat(9)), 'format-unknown', /looks like a STEP model, not like a mesh\. Give the mesh itself, saved as STL, OBJ, PLY/, { byte: 0 }],
    ['a binary OFF mesh', Uint8Array.from([...encode('OFF BINARY\n'), ...new Uint8Array(200)]), 'format-unknown', /looks like a binary OFF mesh, of which only the one in words is read/, { byte: 0 }],
    ['a document in JSON', encode('{"name":"block","scenes":[]}'), 'format-unknown', /JSON document, but no glTF model/, { byte: 0 }],
    ['a PNG renamed', Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10, ...new Uint8Array(500)]), 'format-unknown', /looks like a PNG picture/, { byte: 0 }],
    ['a JPEG renamed', Uint8Array.from([0xff, 0xd8, 0xff, 0xe0, ...new Uint8Array(500)]), 'format-unknown', /looks like a JPEG picture/, { byte: 0 }],
    ['a ZIP archive renamed', Uint8Array.from([0x50, 0x4b, 3, 4, ...new Uint8Array(30)]), 'file-truncated', /ZIP archive that this 3MF file is ends before its directory/, { byte: 34 }],
    ['forty zero bytes', new Uint8Array(40), 'format-unknown', /40 bytes; the shortest STL file/, { byte: 0 }],
    ['a header without facets', new Uint8Array(84), 'facets-none', /without a single facet/, null],
    ['ASCII without facets', encode('solid empty\nendsolid empty\n'), 'facets-none', /without a single facet/, null],
    ['a binary file cut off in a facet', binary.subarray(0, 84 + 50 * 7 + 13), 'file-truncated', /says 12 facets but the file has room for 7: it was cut off/, { byte: 84 + 50 * 7 + 13 }],
    ['a binary file cut off after a facet', binary.subarray(0, 84 + 50 * 7), 'count-contradicts-size', /says 12 facets but the file holds exactly 7/, { byte: 80 }],
    ['a count that is too small', patched((view) => view.setUint32(80, 10, true)), 'count-contradicts-size', /says 10 facets but the file holds 12/, { byte: 80 }],
    ['a count that is too large', patched((view) => view.setUint32(80, 1200, true)), 'count-contradicts-size', /says 1\u2009200 facets but the file holds exactly 12/, { byte: 80 }],
    ['a declared 2³² - 1 facets', patched((view) => view.setUint32(80, 0xffffffff, true)), 'count-contradicts-size', /says 4\u2009294\u2009967\u2009295 facets/, { byte: 80 }],
    ['a declared 2³² - 1 facets and a few spare bytes', patched((view) => view.setUint32(80, 0xffffffff, true), 7), 'file-truncated', /room for 12/, { byte: 691 }],
    ['fifty bytes too many', patched(() => undefined, 50), 'count-contradicts-size', /says 12 facets but the file holds 13/, { byte: 80 }],
    ['a coordinate that is NaN', patched((view) => view.setFloat32(84 + 50 * 3 + 12 + 4 * 4, NaN, true)), 'number-not-finite', /Corner 2 of facet 4 \(of 12\) has a coordinate that is not a number/, { byte: 84 + 150 + 28 }],
    ['a coordinate that is infinite', patched((view) => view.setFloat32(84 + 12, -Infinity, true)), 'number-not-finite', /Corner 1 of facet 1 \(of 12\) has an infinite coordinate/, { byte: 96 }],
    ['ASCII cut off', encode(ascii.slice(0, 700)), 'file-truncated', /"endsolid" is missing/, { line: ascii.slice(0, 700).split('\n').length }],
    ['ASCII cut off after a facet', encode(ascii.slice(0, ascii.indexOf('endfacet') + 9)), 'file-truncated', /ends in the middle of a solid, after 1 whole/, { line: 9 }],
    ['a facet with four corners', encode(ascii.replace('endloop', 'vertex 9 9 9\nendloop')), 'syntax-invalid', /Line 7: This facet has more than three corners/, { line: 7 }],
    ['a facet with two corners', encode(ascii.replace(/ *vertex.*\n/, '')), 'syntax-invalid', /^Line 6: "endloop" stands where another "vertex"/, { line: 6 }],
    ['a word that does not belong there', encode(ascii.replace('outer', 'inner')), 'syntax-invalid', /Line 3: "inner" stands where "outer loop" belongs/, { line: 3 }],
    ['a decimal comma', encode(ascii.replace('vertex 0 0 0', 'vertex 0,5 0 0')), 'number-invalid', /Line 4 has "0,5" with a decimal comma/, { line: 4 }],
    ['a number with a slip', encode(ascii.replace('vertex 0 0 0', 'vertex 0.5.1 0 0')), 'number-invalid', /Line 4 has "0\.5\.1", which is not a number/, { line: 4 }],
    ['a missing coordinate', encode(ascii.replace('vertex 0 0 0', 'vertex 0 0')), 'syntax-invalid', /Line 5: "vertex" stands where a coordinate/, { line: 5 }],
    ['NaN in ASCII', encode(ascii.replace('vertex 0 0 0', 'vertex nan 0 0')), 'number-not-finite', /line 4 is "nan", not a finite number/, { line: 4 }],
    ['a coordinate beyond all bounds', encode(ascii.replace('vertex 0 0 0', 'vertex 1e39 0 0')), 'number-not-finite', /line 4 is larger than 3\.4e38/, { line: 4 }],
    ['a zero byte in ASCII', encode('solid x\n'.padEnd(2000, ' ') + '\0'), 'syntax-invalid', /control character \(code 0\)/, { line: 2 }],
    ['a word without end', encode(`solid ${'x'.repeat(4000)}`), 'syntax-invalid', /word of more than 512 characters/, { line: 1 }],
  ];

  it.each(cases)('%s', (_name, bytes, code, sentence, at) => {
    const error = refusal(bytes);
    expect(error.code).toBe(code);
    expect(error.message).toMatch(sentence);
    expect(error.at).toEqual(at);
  });

  it('a file that is shorter or longer than was said', () => {
    expect(refusal(binary, { sizeBytes: binary.length + 50 }).code).toBe('size-differs');
    const measurer = createMeasurer({ sizeBytes: binary.length });
    measurer.push(binary.subarray(0, 300));
    expect(() => measurer.finish()).toThrow(/only 300 bytes of 684 bytes arrived/);
    expect(refusal(binary, { sizeBytes: 600 }).code).toBe('size-differs');
    expect(refusal(new Uint8Array(3), { sizeBytes: 0 }).code).toBe('size-differs');
  });

  it('a mesh of more facets than the caller allows, before memory is taken for it', () => {
    expect(refusal(binary, { maximumFacets: 11 })).toMatchObject({ code: 'too-many-facets', at: { byte: 84 + 550 } });
    expect(refusal(writeAsciiStl(block), { maximumFacets: 11 }).code).toBe('too-many-facets');
    expect(measureMesh(binary, { maximumFacets: 12 }).facets).toBe(12);
  });

  it('4 GB that were announced are not reserved', () => {
    const before = process.memoryUsage().arrayBuffers;
    const measurer = createMeasurer({ sizeBytes: 84 + 50 * 80_000_000, maximumFacets: 100_000_000 });
    const head = writeBinaryStl(makeSphere(1, 12));
    new DataView(head.buffer).setUint32(80, 80_000_000, true);
    measurer.push(head);
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(8e6);
    expect(measurer.facetsRead).toBe(120);
    expect(() => measurer.finish()).toThrow(/arrived/);
  });
});

describe('files that are accepted', () => {
  const expected = measureMesh(writeBinaryStl(block));
  const ascii = decode(writeAsciiStl(block, 'block'));

  it.each([
    ['CRLF line ends', ascii.replaceAll('\n', '\r\n')],
    ['CR line ends', ascii.replaceAll('\n', '\r')],
    ['capitals', ascii.toUpperCase()],
    ['tabs, form feeds and blank lines', ascii.replaceAll(' ', '\t\v').replaceAll('\n', '\n\f\n')],
    ['no final newline', ascii.trimEnd()],
    ['all on one line', ascii.replaceAll('\n', ' ')],
    ['no indentation and no name', ascii.replace(/^ +/gm, '').replaceAll(' block', '')],
    ['a name of several words', ascii.replaceAll('block', 'the solid block, seen with facet eyes')],
    ['a name in Latin-1', ascii.replaceAll('block', 'Kl\xf6tzchen \xb5')],
    ['a name of one word, "solid"', ascii.replaceAll('block', 'solid')],
    ['a name that ends with facet', ascii.replaceAll('block', 'my facet')],
    ['no name at the end', ascii.replace('endsolid block', 'endsolid')],
    ['a byte-order mark', `\xef\xbb\xbf${ascii}`],
    ['blanks before the first word', `\n  ${ascii}`],
    ['normals that are no numbers', ascii.replace(/normal .*/g, 'normal nan -nan(ind) 1.#QNAN')],
    ['numbers with signs and exponents', ascii.replace(/vertex (\S+) (\S+) (\S+)/g, 'vertex +$1.0e0 $2.000E+00 $3e-0')],
  ])('ASCII with %s', (_name, text) => {
    const found = measureMesh(encode(text));
    expect(found).toEqual({ ...expected, format: 'stl-ascii' });
  });

  it('ASCII with several solids is one mesh, and says so', () => {
    const other = decode(writeAsciiStl(makeBlock([5, 0, 0], [6, 1, 1]), 'other'));
    for (const text of [ascii + other, (ascii + other).replaceAll('\n', ' ')]) {
      const found = measureMesh(encode(text));
      expect(found.facets).toBe(24);
      expect(found.volume?.content).toBe(25);
      expect(found.soundness.findings).toMatchObject([{ kind: 'several-solids', count: 2, facets: [] }]);
    }
  });

  it('binary that begins with "solid" is told by its size', () => {
    expect(measureMesh(writeBinaryStl(block, 'solid block made of facets'))).toEqual(expected);
  });

  it('binary with a title that looks like another format is told by its size', () => {
    for (const title of ['BM', '{"by":"someone"}', 'PK\x03\x04', '<xml>', 'ply\n']) expect(measureMesh(writeBinaryStl(block, title))).toEqual(expected);
  });

  it('binary with fewer than fifty bytes after the last facet, and says so', () => {
    for (const extra of [1, 2, 49]) {
      for (const title of ['', 'solid']) {
        const found = measureMesh(patched((_, bytes) => bytes.set(encode(title)), extra));
        expect(found.volume).toEqual(expected.volume);
        expect(found.soundness.findings).toMatchObject([{ kind: 'trailing-bytes', count: extra, facets: [] }]);
      }
    }
  });

  it('binary with attributes and with normals that are no numbers', () => {
    const found = measureMesh(
      patched((view) => {
        for (const facet of [2, 7]) view.setUint16(84 + 50 * facet + 48, 0x8000, true);
        for (let facet = 0; facet < 12; facet++) view.setFloat32(84 + 50 * facet, NaN, true);
      }),
    );
    expect(found.soundness.findings).toMatchObject([{ kind: 'nonzero-attributes', count: 2, facets: [2, 7] }]);
    expect(found.soundness.defensible).toBe(true);
  });

  it('the same bits come out whatever the sizes of the chunks, down to one byte', () => {
    const corners = makeSphere(7, 44);
    const files = [writeBinaryStl(corners), writeAsciiStl(corners), writeAsciiStl(block), encode(decode(writeAsciiStl(block)).replaceAll('\n', '\r\n'))];
    const wholes = files.map((bytes) => JSON.stringify(measureMesh(bytes)));
    fc.assert(
      fc.property(fc.nat(files.length - 1), fc.array(fc.oneof(fc.integer({ min: 1, max: 3 }), fc.integer({ min: 1, max: 200 }), fc.integer({ min: 1, max: 100_000 })), { minLength: 1, maxLength: 12 }), (which, sizes) => {
        const bytes = files[which] ?? new Uint8Array(0);
        const measurer = createMeasurer({ sizeBytes: bytes.length });
        for (let at = 0, k = 0; at < bytes.length; k++) {
          const end = Math.min(bytes.length, at + (sizes[k % sizes.length] ?? 1));
          measurer.push(bytes.subarray(at, end));
          at = end;
        }
        expect(JSON.stringify(measurer.finish())).toBe(wholes[which]);
      }),
      { numRuns: 40, examples: files.map((_, which) => [which, [1]] as [number, number[]]) },
    );
  });

  it('the same refusal comes out whatever the sizes of the chunks', () => {
    const broken = [
      patched((view) => view.setFloat32(84 + 50 * 9 + 16, NaN, true)),
      encode(ascii.replace('vertex 2 3 4', 'vertex 2 3x 4')),
      encode(ascii.slice(0, 900)),
      encode(ascii.replace('endloop', 'end\x01loop')),
      encode(`${ascii.slice(0, 300)}${'y'.repeat(700)} ${ascii.slice(300)}`),
    ];
    for (const bytes of broken) {
      const whole = refusal(bytes);
      for (const size of [1, 2, 7, 64, 400]) {
        const measurer = createMeasurer({ sizeBytes: bytes.length });
        const run = (): void => {
          for (let at = 0; at < bytes.length; at += size) measurer.push(bytes.subarray(at, at + size));
          measurer.finish();
        };
        expect(run).toThrow(expect.objectContaining({ code: whole.code, message: whole.message, at: whole.at }));
      }
    }
  });

  it('damaged files are measured or refused in words, never anything else', () => {
    const files = [writeBinaryStl(makeSphere(3, 12)), writeAsciiStl(block)];
    fc.assert(
      fc.property(fc.nat(1), fc.array(fc.tuple(fc.nat(), fc.nat(255)), { minLength: 1, maxLength: 8 }), fc.nat(), (which, changes, cut) => {
        const bytes = Uint8Array.from(files[which] ?? []);
        for (const [place, value] of changes) bytes[place % bytes.length] = value;
        const kept = cut % 3 === 0 ? bytes.subarray(0, cut % bytes.length) : bytes;
        try {
          const found = measureMesh(kept);
          expect(JSON.stringify(found)).not.toMatch(/null,"surface":null|NaN/);
          expect(Object.values(found.surface.second).every(Number.isFinite)).toBe(true);
        } catch (error) {
          expect(error).toBeInstanceOf(MeshError);
        }
      }),
      { numRuns: 1500 },
    );
  });
});
