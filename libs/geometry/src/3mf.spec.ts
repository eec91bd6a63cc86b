import { to3dmodel } from '@jscadui/3mf-export';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { coreNamespace, packModel, relationships, write3mf, writeMeshXml, writeModel, zipFiles } from './testing/3mf-files';
import { anyMesh, anyRotation } from './testing/arbitrary-meshes';
import { indexMesh } from './testing/indexed-mesh';
import { measureInChunks, refuseInChunks } from './testing/push-mesh';
import { measureVolume, readFile } from './testing/read-corners';
import { join, makeBlock, makeSphere, makeThickShell, move, rotate, stretch, turn } from './testing/shapes';
import { writeBinaryStl } from './write-stl';

const block = makeBlock([0, 0, 0], [2, 3, 4]);
const blockObject = (id: number, attributes = ''): string => `<object id="${id}" ${attributes}>${writeMeshXml(block)}</object>`;
const close = (found: number, expected: number, digits = 1e-12): void => expect(Math.abs(found / expected - 1)).toBeLessThan(digits);

describe('a 3MF file', () => {
  it('has the facets of its mesh to the last bit, and says its unit', () => {
    fc.assert(
      fc.property(anyMesh, (mesh) => {
        expect(readFile(write3mf(mesh))).toMatchObject({ format: '3mf', corners: mesh, declaredUnit: 'mm' });
      }),
      { numRuns: 60 },
    );
  });

  it.each([
    ['micron', 'micron'],
    ['millimeter', 'mm'],
    ['centimeter', 'cm'],
    ['inch', 'inch'],
    ['foot', 'foot'],
    ['meter', 'm'],
  ])('in the unit %s says so, and its numbers stay as they are', (unit, declaredUnit) => {
    expect(readFile(write3mf(block, `unit="${unit}"`))).toMatchObject({ declaredUnit, corners: block });
  });

  it('without a unit is in millimetres', () => {
    expect(readFile(write3mf(block, '')).declaredUnit).toBe('mm');
  });

  it('as another program writes it has the volume of the same body in STL, placed by items and components', () => {
    fc.assert(
      fc.property(anyMesh, anyRotation, (mesh, rotation) => {
        const { vertices, triangles } = indexMesh(mesh);
        const turned = [0, 1, 2].flatMap((column) => [...rotation.map((row) => row[column] ?? 0), 0]);
        const meshes = [{ id: '1', vertices: Float64Array.from(vertices), indices: Uint32Array.from(triangles) }];
        const moved = [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 300, 0, 0, 1];
        const model = to3dmodel({
          meshes,
          components: [{ id: '2', name: 'pair', children: [{ objectID: '1', transform: [...turned, 0, 0, 0, 1] }, { objectID: '1', transform: moved }] }],
          items: [{ objectID: '1' }, { objectID: '2', transform: [2, 0, 0, 0, 0, 2, 0, 0, 0, 0, 2, 0, -500, 0, 7, 1] }],
        });
        const { corners, solids } = readFile(packModel(model));
        expect(solids).toBe(3);
        const size = mesh.length;
        expect(corners.subarray(0, size)).toEqual(mesh);
        const expected = move(stretch(join(rotate(mesh, rotation), move(mesh, [300, 0, 0])), [2, 2, 2]), [-500, 0, 7]);
        corners.subarray(size).forEach((coordinate, k) => expect(Math.abs(coordinate - (expected[k] ?? NaN))).toBeLessThan(1e-9));
        close(measureVolume(corners), 17 * measureVolume(mesh), 1e-8);
      }),
      { numRuns: 40 },
    );
    expect(measureMesh(packModel(to3dmodel({ meshes: [{ id: '1', vertices: Float64Array.from(indexMesh(block).vertices), indices: Uint32Array.from(indexMesh(block).triangles) }], items: [{ objectID: '1' }] }))).volume).toEqual(measureMesh(writeBinaryStl(block)).volume);
  });

  it('with transforms that mirror keeps volumes positive, mirrored twice too', () => {
    const sphere = makeSphere(3, 16);
    const resources = `<object id="1">${writeMeshXml(sphere)}</object><object id="2"><components><component objectid="1" transform="1 0 0 0 -1 0 0 0 1 0 0 0"/><component objectid="1" transform="1 0 0 0 1 0 0 0 1 20 0 0"/></components></object>`;
    const mirrored = readFile(packModel(writeModel(resources, '<item objectid="2" transform="-1 0 0 0 1 0 0 0 1 100 0 0"/><item objectid="1" transform="0 1 0 1 0 0 0 0 1 0 50 0"/>')));
    const volume = measureVolume(sphere);
    for (let k = 0; k < 3; k++) close(measureVolume(mirrored.corners.subarray(k * sphere.length, (k + 1) * sphere.length)), volume);
    expect(mirrored.corners.length).toBe(3 * sphere.length);
    expect(measureMesh(packModel(writeModel(resources, '<item objectid="2" transform="-1 0 0 0 1 0 0 0 1 0 0 0"/>'))).soundness).toMatchObject({ closed: true, oriented: true, outward: true, turned: false });
  });

  it('with a hollow in its mesh has the volume between', () => {
    close(measureMesh(write3mf(makeThickShell(5, 3, 24))).volume?.content ?? NaN, measureVolume(makeSphere(5, 24)) - measureVolume(makeSphere(3, 24)));
  });

  it('counts objects of type "model" alone, and says what it left out', () => {
    const resources = ['model', 'support', 'solidsupport', 'surface', 'other'].map((type, k) => blockObject(k + 1, `type="${type}"`)).join('');
    const group = '<object id="9"><components><component objectid="1"/><component objectid="2"/></components></object>';
    const { facets, leftOut } = readFile(packModel(writeModel(resources + group, '<item objectid="3"/><item objectid="4"/><item objectid="9"/>')));
    expect(facets).toBe(12);
    expect(leftOut).toEqual(['objects of type “solidsupport”', 'objects of type “surface”', 'objects of type “support”']);
  });

  it('says the names of the materials of what is built, and of nothing else', () => {
    const materials = '<basematerials id="7"><base name="Steel 1.4301" displaycolor="#888888"/><base name="PA 12"/><base name="Brass"/><base name="Lead"/></basematerials>';
    const byTriangle = blockObject(2, 'pid="7" pindex="0"').replace('v3="3"/>', 'v3="3" pid="7" p1="2"/>');
    const file = packModel(writeModel(`${materials}${blockObject(1, 'pid="7" pindex="1"')}${byTriangle}${blockObject(3, 'pid="7" pindex="3"')}`, '<item objectid="1"/><item objectid="2" transform="1 0 0 0 1 0 0 0 1 9 0 0"/>'));
    expect(readFile(file).declaredMaterials.sort()).toEqual(['Brass', 'PA 12', 'Steel 1.4301']);
  });

  it('may have prefixes, comments, metadata, elements of extensions and entities of XML', () => {
    const odd = writeModel(`<!-- <vertex/> -->${blockObject(1)}`, '<item objectid="1"/>', `unit="milli&#109;eter" xmlns:x="urn:x"`)
      .replace('<resources>', '<metadata name="Title">A &lt;block&gt; &amp; more<![CDATA[<vertex x="1"/>]]></metadata><x:resources><object id="4"/></x:resources><vendor xmlns="urn:x"><object id="4"/></vendor><resources><colorgroup id="5"><color color="#FFF"/></colorgroup>')
      .replace('<mesh>', '<metadatagroup><metadata name="a">b</metadata></metadatagroup><mesh>');
    expect(readFile(packModel(odd))).toMatchObject({ corners: block, declaredUnit: 'mm' });
    const prefixed = writeModel(blockObject(1), '<item objectid="1"/>').replace(`xmlns="`, 'xmlns:c="').replace(/<(\/?)([a-z])/g, '<$1c:$2');
    expect(readFile(packModel(prefixed)).corners).toEqual(block);
    const wide = Uint8Array.from(Buffer.from(`\ufeff${writeModel(blockObject(1), '<item objectid="1"/>').replace('UTF-8', 'UTF-16')}`, 'utf16le'));
    expect(readFile(zipFiles({ '_rels/.rels': relationships(), '3D/3dmodel.model': wide })).corners).toEqual(block);
  });

  it('may be stored or deflated, have its model anywhere, and names in other letters', () => {
    const model = writeModel(blockObject(1), '<item objectid="1"/>');
    for (const level of [0, 1, 9] as const) {
      expect(readFile(zipFiles({ 'Metadata/x.png': Uint8Array.of(1, 2, 3), 'models/Part A.model': model, '_RELS/.rels': relationships('/Models/part a.model') }, { level })).corners).toEqual(block);
    }
  });

  it('may have objects in other parts of the archive', () => {
    const other = writeModel(blockObject(5), '', 'unit="inch"');
    const root = writeModel('<object id="1"><components><component objectid="5" p:path="/3D/Objects/a.model" transform="1 0 0 0 1 0 0 0 1 9 0 0"/></components></object>', '<item objectid="1"/><item objectid="5" p:path="/3D/Objects/a.model"/>', 'unit="inch" requiredextensions="p"');
    const { corners, declaredUnit } = readFile(packModel(root, { '3D/Objects/a.model': other }));
    expect(declaredUnit).toBe('inch');
    expect(corners).toEqual(join(move(block, [9, 0, 0]), block));
    expect(refuseInChunks(packModel(root, { '3D/Objects/a.model': other.replace('inch', 'foot') }))).toMatchObject({ code: 'syntax-invalid', message: expect.stringMatching(/another unit/) as string });
  });
});

describe('3MF files that are refused', () => {
  const whole = writeModel(blockObject(1), '<item objectid="1"/>');
  const valid = packModel(whole);
  const damage = (change: (bytes: Uint8Array, view: DataView) => void): Uint8Array<ArrayBuffer> => {
    const bytes = Uint8Array.from(valid);
    change(bytes, new DataView(bytes.buffer));
    return bytes;
  };
  const findSignature = (bytes: Uint8Array, signature: string): number => String.fromCharCode(...bytes).indexOf(signature);
  const nest = (depth: number): string => Array.from({ length: depth }, (_, k) => `<object id="${k + 2}"><components><component objectid="${k + 1}"/></components></object>`).join('');
  const double = (levels: number): string => Array.from({ length: levels }, (_, k) => `<object id="${k + 2}"><components>${`<component objectid="${k + 1}"/>`.repeat(10)}</components></object>`).join('');

  const cases: [name: string, file: string | Uint8Array<ArrayBuffer>, code: string, sentence: RegExp, at: object | null][] = [
    ['an object that is missing', whole.replace('<item objectid="1"', '<item objectid="2"'), 'syntax-invalid', /Line \d+ of 3D\/3dmodel\.model in this 3MF file refers to the object 2, which is not there/, { line: 20 }],
    ['an index beyond the vertices', whole.replace('v2="', 'v2="9'), 'vertex-missing', /has the corner “9\d”, but the vertices of its object are numbered from 0 to 7/, { line: 9 }],
    ['a negative index', whole.replace('v2="', 'v2="-'), 'vertex-missing', /has the corner “-/, { line: 9 }],
    ['a coordinate that is no number', whole.replace('x="2"', 'x="2,5"'), 'number-invalid', /coordinate “2,5”/, { line: 4 }],
    ['a coordinate that is not finite', whole.replace('x="2"', 'x="NaN"'), 'number-not-finite', /coordinate “NaN”/, { line: 4 }],
    ['a coordinate beyond all bounds', whole.replace('x="2"', 'x="1e39"'), 'number-not-finite', /not below 3\.4e38/, { line: 4 }],
    ['a vertex without x', whole.replace('x="2"', ''), 'syntax-invalid', /vertex without x, y or z/, { line: 4 }],
    ['a unit that 3MF does not have', whole.replace('millimeter', 'yard'), 'syntax-invalid', /unit that 3MF does not have/, { line: 2 }],
    ['a transform of nine numbers', whole.replace('<item ', '<item transform="1 0 0 0 1 0 0 0 1" '), 'syntax-invalid', /transform that is not twelve numbers/, { line: 20 }],
    ['a placing beyond all bounds', whole.replace('<item ', '<item transform="1e38 0 0 0 1e38 0 0 0 1e38 0 0 0" '), 'number-not-finite', /placed beyond 3\.4e38/, { line: 2 }],
    ['an object twice', whole.replace('</resources>', `${blockObject(1)}</resources>`), 'syntax-invalid', /has the object 1 for a second time/, { line: 20 }],
    ['an object that looks inwards', writeModel(`<object id="1">${writeMeshXml(turn(block))}</object>`, '<item objectid="1"/>'), 'syntax-invalid', /object 1, whose triangles look inwards: by the rule of 3MF nothing of it is filled/, { line: 2 }],
    ['an extension that it requires', whole.replace('unit=', 'xmlns:b="urn:beams" requiredextensions="b" unit='), 'syntax-invalid', /requires “urn:beams”, which is not read/, { line: 2 }],
    ['beams', whole.replace('</triangles>', '</triangles><b:beamlattice/>'), 'syntax-invalid', /not made of triangles/, { line: 20 }],
    ['another kind of model', whole.replace(coreNamespace, 'urn:other'), 'syntax-invalid', /no model of the 3MF core specification/, { line: 2 }],
    ['XML that is not well formed', whole.replace('</mesh>', ''), 'syntax-invalid', /not well-formed XML/, { line: 20 }],
    ['XML that was cut off', whole.slice(0, 600), 'syntax-invalid', /not well-formed XML/, { line: 11 }],
    ['entities of its own', whole.replace('<model', '<!DOCTYPE model [<!ENTITY a "b">]><model'), 'syntax-invalid', /declares a document type/, { line: 2 }],
    ['bytes that are no characters', whole.replace('Title', '').replace('<build>', '<metadata name="\xff"/><build>'), 'syntax-invalid', /bytes that are no characters/, { line: 1 }],
    ['elements deep in one another', whole.replace('<resources>', `${'<a>'.repeat(200)}${'</a>'.repeat(200)}<resources>`), 'syntax-invalid', /more than 100 deep/, { line: 2 }],
    ['a text without end', whole.replace('<resources>', `<metadata name="x">${'-'.repeat(5 << 20)}</metadata><resources>`), 'syntax-invalid', /without an element/, { line: 2 }],
    ['an object in itself', writeModel('<object id="1"><components><component objectid="2"/></components></object><object id="2"><components><component objectid="1"/></components></object>', '<item objectid="1"/>'), 'syntax-invalid', /which stands in itself/, { line: 2 }],
    ['objects deep in one another', writeModel(blockObject(1) + nest(150), '<item objectid="151"/>'), 'syntax-invalid', /objects more than 100 deep/, { line: 20 }],
    ['copies of copies', writeModel(blockObject(1) + double(6), '<item objectid="7"/>'), 'too-large-expanded', /places its pieces so often/, { byte: 0 }],
    ['copies of copies of copies', writeModel(blockObject(1) + double(90), '<item objectid="91"/>'), 'too-many-facets', /\(3MF\) has more than [\d\u2009]+ facets/, { byte: 0 }],
    ['nothing that is built', writeModel(blockObject(1), ''), 'facets-none', /\(3MF\) is a mesh without a single facet/, null],
    ['a part that is missing', zipFiles({ '_rels/.rels': relationships('/3D/other.model'), '3D/3dmodel.model': whole }), 'syntax-invalid', /refers to “3D\/other\.model”, which is not in it/, { byte: 0 }],
    ['a model outside', zipFiles({ '_rels/.rels': relationships('/../other.model') }), 'syntax-invalid', /leads out of it/, { line: 1 }],
    ['a ZIP archive of other things', zipFiles({ 'part.stl': writeBinaryStl(block) }), 'format-unknown', /ZIP archive, but no 3MF file/, { byte: 0 }],
    ['a ZIP archive without a model', zipFiles({ '_rels/.rels': relationships().replace('3dmodel"/>', 'thumbnail"/>') }), 'format-unknown', /ZIP archive, but no 3MF file/, { byte: 0 }],
    ['a name that leads out', zipFiles({ '_rels/.rels': relationships(), '3D/3dmodel.model': whole, '../../etc/x': 'x' }), 'archive-damaged', /name leads out of it/, null],
    ['the same name twice', zipFiles({ '_rels/.rels': relationships(), '3D/3dmodel.model': whole, '3d/3DMODEL.model': whole }), 'archive-damaged', /two files of the name/, null],
    ['an archive that was cut off', valid.subarray(0, -30), 'file-truncated', /ends before its directory/, { byte: valid.length - 30 }],
    ['an archive that was cut off early', valid.subarray(0, 200), 'file-truncated', /ends before its directory/, { byte: 200 }],
    ['an encrypted file', damage((bytes, view) => view.setUint16(findSignature(bytes, 'PK\x01\x02') + 8, 1, true)), 'archive-damaged', /“_rels\/\.rels” is encrypted/, { byte: 0 }],
    ['a method that is not read', damage((bytes, view) => view.setUint16(findSignature(bytes, 'PK\x01\x02') + 10, 14, true)), 'archive-damaged', /method that is not read/, { byte: 0 }],
    ['a wrong checksum', damage((bytes, view) => view.setUint32(findSignature(bytes, 'PK\x01\x02') + 16, 1, true)), 'archive-damaged', /does not agree with its own checks/, { byte: 0 }],
    ['a wrong length', damage((bytes, view) => view.setUint32(findSignature(bytes, 'PK\x01\x02') + 24, 1, true)), 'archive-damaged', /does not agree/, { byte: 0 }],
    ['content beyond the end', damage((bytes, view) => view.setUint32(findSignature(bytes, 'PK\x01\x02') + 20, 1e9, true)), 'archive-damaged', /goes on beyond the end/, { byte: 0 }],
    ['a header that is elsewhere', damage((bytes, view) => view.setUint32(findSignature(bytes, 'PK\x01\x02') + 42, 5, true)), 'archive-damaged', /not where the directory says/, { byte: 5 }],
    ['a directory that is elsewhere', damage((bytes, view) => view.setUint32(bytes.length - 6, 0xfffff, true)), 'archive-damaged', /no directory where it says/, null],
    ['a directory of more files', damage((bytes, view) => view.setUint16(bytes.length - 12, 500, true)), 'archive-damaged', /names 500 files and tells of fewer/, null],
    ['content that makes no sense', damage((bytes) => bytes.fill(0xff, 60, 100)), 'archive-damaged', /damaged/, null],
  ];

  it.each(cases)('%s', (_name, file, code, sentence, at) => {
    const bytes = typeof file === 'string' ? packModel(file) : file;
    const error = refuseInChunks(bytes);
    expect(error.message).toMatch(sentence);
    expect(error).toMatchObject({ code, format: '3mf' });
    if (at !== null) expect(error.at).toEqual(at);
    if (code !== 'facets-none') expect(error.at).not.toBeNull();
    expect(refuseInChunks(bytes, 100)).toMatchObject({ code, message: error.message, at: error.at });
  });

  it('an archive that grows beyond all bounds, soon', () => {
    const bomb = packModel(whole.replace('<build>', `${'<metadata name="x"/>'.repeat(3e5)}<build>`));
    const before = process.memoryUsage().arrayBuffers;
    expect(refuseInChunks(bomb, Infinity, { freeExpansionBytes: 1 << 20 })).toMatchObject({ code: 'too-large-expanded' });
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(8 << 20);
    expect(refuseInChunks(bomb, Infinity, { maximumExpandedBytes: 2e6 })).toMatchObject({ code: 'too-large-expanded' });
    expect(refuseInChunks(valid, Infinity, { maximumKeptBytes: 500 })).toMatchObject({ code: 'too-large-expanded', at: { byte: 500 } });
  });
});

describe('how a 3MF file is cut into chunks', () => {
  it('changes nothing, down to one byte', () => {
    const root = writeModel(`<object id="1"><components><component objectid="5" p:path="/a.model"/></components></object>`, '<item objectid="1"/>');
    const files = [write3mf(makeSphere(7, 20)), packModel(root, { 'a.model': writeModel(blockObject(5), '') })];
    const wholes = files.map((bytes) => JSON.stringify(measureMesh(bytes)));
    fc.assert(
      fc.property(fc.nat(files.length - 1), fc.array(fc.integer({ min: 1, max: 3000 }), { minLength: 1, maxLength: 12 }), (which, sizes) => {
        expect(JSON.stringify(measureInChunks(files[which] ?? new Uint8Array(0), sizes))).toBe(wholes[which]);
      }),
      { numRuns: 30, examples: files.map((_, which) => [which, [1]] as [number, number[]]) },
    );
  });
});
