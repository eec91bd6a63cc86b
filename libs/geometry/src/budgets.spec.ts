import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { defaultLimits, type ReadingLimits } from './limits';
import { createMeasurer } from './measurer';
import { MeshError } from './mesh-error';
import { encode } from './testing/obj-files';
import { makeBlock } from './testing/shapes';
import { writeBinaryStl } from './write-stl';

const chunkBytes = 1 << 16;
const megabyte = 1 << 20;

/** Pieces in turn, each as often as is said, without ever holding more than a chunk of them. */
function* repeat(...pieces: [text: string | Uint8Array, times: number][]): Generator<Uint8Array> {
  for (const [piece, times] of pieces) {
    const bytes = typeof piece === 'string' ? encode(piece) : piece;
    const perChunk = Math.max(1, Math.min(times, Math.floor(chunkBytes / bytes.length)));
    const chunk = new Uint8Array(perChunk * bytes.length);
    for (let k = 0; k < perChunk; k++) chunk.set(bytes, k * bytes.length);
    for (let left = times; left > 0; left -= perChunk) yield chunk.subarray(0, Math.min(left, perChunk) * bytes.length);
  }
}

const plyHead = 'ply\nformat ascii 1.0\nelement vertex 3\nproperty float x\nproperty float y\nproperty float z\nelement face 1\nproperty list uchar int vertex_indices\nend_header\n';

interface Refusal {
  error: MeshError;
  /** How much had been handed over when the file was refused. */
  pushedBytes: number;
  /** By how much the memory outside the heap of objects, where all large arrays are, had grown at most. */
  memoryBytes: number;
}

function refuse(chunks: Iterable<Uint8Array>, { sizeBytes = Number.MAX_SAFE_INTEGER, ...limits }: Partial<ReadingLimits> & { sizeBytes?: number } = {}): Refusal {
  const before = process.memoryUsage().arrayBuffers;
  const measurer = createMeasurer({ sizeBytes, ...limits });
  let pushedBytes = 0;
  let memoryBytes = 0;
  try {
    for (const chunk of chunks) {
      pushedBytes += chunk.length;
      measurer.push(chunk);
      memoryBytes = Math.max(memoryBytes, process.memoryUsage().arrayBuffers - before);
    }
    measurer.finish();
  } catch (error) {
    if (error instanceof MeshError) return { error, pushedBytes, memoryBytes: Math.max(memoryBytes, process.memoryUsage().arrayBuffers - before) };
    throw error;
  }
  throw new Error('The file was not refused.');
}

describe('a file that claims more facets than anything can hold', () => {
  const head = writeBinaryStl(makeBlock([0, 0, 0], [1, 1, 1]));
  new DataView(head.buffer).setUint32(80, 0xffffffff, true);
  const facet = head.subarray(84, 134);

  it('and announces a size to match is refused by its header', () => {
    const { error, pushedBytes, memoryBytes } = refuse(repeat([head.subarray(0, 84), 1], [facet, 1e6]), { sizeBytes: 84 + 50 * 0xffffffff });
    expect(error).toMatchObject({ code: 'too-many-facets', at: { byte: 84 + 50 * defaultLimits.maximumFacets } });
    expect(error.message).toMatch(/\(binary STL\) has more than [\d\u2009]+ facets/);
    expect(pushedBytes).toBeLessThanOrEqual(2 * chunkBytes);
    expect(memoryBytes).toBeLessThan(4 * megabyte);
  });

  it('and is packed is refused once too many have come, with memory for those that did', () => {
    const packed = [gzipSync(head.subarray(0, 84)), ...Array.from({ length: 20 }, () => gzipSync(Buffer.concat([...repeat([facet, 10_000])]), { level: 0 }))];
    const { error, memoryBytes } = refuse(packed, { maximumFacets: 150_000 });
    expect(error).toMatchObject({ code: 'too-many-facets', at: { byte: 84 + 50 * 150_000 } });
    expect(memoryBytes).toBeLessThan(32 * megabyte);
  });
});

describe('lines, words and polygons without end', () => {
  const endless: [name: string, pieces: [string, number][], sentence: RegExp, line: number][] = [
    ['a name of 100 MB in ASCII STL', [['solid', 1], [' and so on', 1e7]], /Line 1 goes on for more than 4\u2009194\u2009304 bytes without a facet, the most that is read of one line of STL/, 1],
    ['100 MB of blanks in ASCII STL', [['solid a\nfacet normal', 1], [' ', 1e8]], /Line 2 goes on/, 2],
    ['100 MB of blanks after a facet in ASCII STL', [['solid a\n', 1], ['facet normal 0 0 1 outer loop vertex 0 0 0 vertex 1 0 0 vertex 0 1 0 endloop endfacet ', 3], ['\t', 1e8]], /Line 2 goes on/, 2],
    ['a comment of 100 MB in OBJ', [['v 0 0 0\n#', 1], ['-', 1e8]], /Line 2 is longer than 4\u2009194\u2009304 bytes, the most that is read of one line of OBJ/, 2],
    ['a name of 100 MB in OBJ', [['v 0 0 0\no', 1], [' word', 2e7]], /Line 2 is longer/, 2],
    ['100 MB of blanks in OBJ', [['v 0 0 0\nv', 1], [' ', 1e8]], /Line 2 is longer/, 2],
    ['a comment of 100 MB in OFF', [['OFF\n#', 1], ['-', 1e8]], /Line 2 is longer than 4\u2009194\u2009304 bytes, the most that is read of one line of OFF/, 2],
    ['100 MB of blanks in PLY', [[plyHead, 1], [' ', 1e8]], /Line 10 goes on for more than 4\u2009194\u2009304 bytes/, 10],
  ];
  it.each(endless)('%s', (_name, pieces, sentence, line) => {
    const { error, pushedBytes, memoryBytes } = refuse(repeat(...pieces));
    expect(error).toMatchObject({ code: 'syntax-invalid', at: { line } });
    expect(error.message).toMatch(sentence);
    expect(pushedBytes).toBeLessThan(defaultLimits.maximumLineBytes + 4 * chunkBytes);
    expect(memoryBytes).toBeLessThan(8 * megabyte);
  });

  const words: [name: string, pieces: [string, number][], format: RegExp, line: number][] = [
    ['a number of a million digits in ASCII STL', [['solid a\nfacet normal 0 0 1\nouter loop\nvertex 0.', 1], ['3', 1e6]], /not an STL mesh/, 4],
    ['a number of a million digits in OBJ', [['v 0 0 0\nv 0.', 1], ['3', 1e6]], /not an OBJ mesh/, 2],
    ['the number of a vertex with a million digits in OBJ', [['v 0 0 0\nf ', 1], ['3', 1e6]], /not an OBJ mesh/, 2],
    ['a number of a million digits in OFF', [['OFF\n3 1 0\n0.', 1], ['3', 1e6]], /not an OFF mesh/, 3],
    ['a number of a million digits in PLY', [[`${plyHead}0.`, 1], ['3', 1e6]], /not a PLY mesh/, 10],
    ['a keyword of a million letters in OBJ', [['v 0 0 0\n', 1], ['v', 1e6]], /not an OBJ mesh/, 2],
  ];
  it.each(words)('%s', (_name, pieces, format, line) => {
    const { error, pushedBytes, memoryBytes } = refuse(repeat(...pieces));
    expect(error).toMatchObject({ code: 'syntax-invalid', at: { line } });
    expect(error.message).toMatch(/has a word of more than 512 characters/);
    expect(error.message).toMatch(format);
    expect(pushedBytes).toBeLessThan(4 * chunkBytes);
    expect(memoryBytes).toBeLessThan(8 * megabyte);
  });

  it.each([
    ['on one line', ' 1 2 3', 3],
    ['on lines that are continued', ' 1 2 3 \\\n', 3 + 65_536 / 3],
  ])('a polygon of a million corners %s', (_name, corners, line) => {
    const { error, pushedBytes, memoryBytes } = refuse(repeat(['v 0 0 0\nv 1 0 0\nf', 1], [corners.replaceAll('3', '2'), 333_334]));
    expect(error).toMatchObject({ code: 'polygon-too-large', at: { line: Math.floor(line) } });
    expect(error.message).toMatch(/of this OBJ mesh has more than 65\u2009536 corners/);
    expect(pushedBytes).toBeLessThan(megabyte);
    expect(memoryBytes).toBeLessThan(8 * megabyte);
  });

  it('a polygon of as many corners as are allowed is read', () => {
    const measurer = createMeasurer({ sizeBytes: Number.MAX_SAFE_INTEGER });
    for (const chunk of repeat(['v 0 0 0\nv 1 0 0\nv 0 1 0\nf 1 2', 1], [' 3', 65_534], ['\n', 1])) measurer.push(chunk);
    expect(measurer.facetsRead).toBe(65_534);
  });
});

describe('an OBJ file of vertices without end', () => {
  it('is refused when they are too many', () => {
    const { error, memoryBytes } = refuse(repeat(['v 0 0 0\n', 2e6]), { maximumVertices: 1e6 });
    expect(error).toMatchObject({ code: 'too-many-vertices', at: { line: 1_000_001 } });
    expect(error.message).toMatch(/The mesh \(OBJ\) has more than 1\u2009000\u2009000 vertices/);
    expect(memoryBytes).toBeLessThan(8 * 8e6);
  });

  it('takes memory in proportion to what came, however large a size was announced', () => {
    const { error, memoryBytes } = refuse(repeat(['v 0 0 0\n', 2e5]), { sizeBytes: 5e9 });
    expect(error.code).toBe('size-differs');
    expect(memoryBytes).toBeLessThan(10 * 8 * 2e5);
  });

  it('that come back as facets with the same corners is refused when those are too many', () => {
    const { error } = refuse(repeat(['v 0 0 0\nv 1 0 0\nv 0 1 0\n', 1], ['f 1 2 3\n', 3e5]), { maximumFacets: 1e5 });
    expect(error).toMatchObject({ code: 'too-many-facets', at: { line: 100_004 } });
    expect(error.message).toMatch(/\(OBJ\)/);
  });
});

describe('a file that has to be there as a whole', () => {
  it.each([
    ['binary glTF', 'glTF\x02\0\0\0\xff\xff\xff\xff'],
    ['3MF', 'PK\x03\x04\x14\0\0\0\x08\0'],
  ])('of %s is refused once it is too large, with memory for what came', (_name, head) => {
    const { error, pushedBytes, memoryBytes } = refuse(repeat([head, 1], ['\0', 1e9]), { maximumKeptBytes: 20 * megabyte });
    expect(error).toMatchObject({ code: 'too-large-expanded', at: { byte: 20 * megabyte } });
    expect(pushedBytes).toBeLessThan(21 * megabyte);
    expect(memoryBytes).toBeLessThan(3 * 20 * megabyte);
  });

  it('of JSON has a limit of its own', () => {
    const { error, memoryBytes } = refuse(repeat(['{"asset":{"version":"2.0"},"nodes":[', 1], ['{},', 1e7]), { maximumJsonBytes: megabyte });
    expect(error).toMatchObject({ code: 'too-large-expanded', format: 'gltf' });
    expect(memoryBytes).toBeLessThan(4 * megabyte);
  });
});

describe('a file that declares what it does not have', () => {
  it.each([
    ['vertices in PLY', `${plyHead.replace('vertex 3', 'vertex 19999999').replace('ascii', 'binary_little_endian')}\0\0`, 'file-truncated'],
    ['faces in PLY', `${plyHead.replace('face 1', 'face 19999999')}0 0 0\n1 0 0\n0 1 0\n`, 'file-truncated'],
    ['corners in PLY', `${plyHead}0 0 0\n1 0 0\n0 1 0\n4294967295 0 1 2\n`, 'syntax-invalid'],
    ['vertices in OFF', 'OFF\n19999999 1 0\n0 0 0\n', 'file-truncated'],
    ['corners in OFF', 'OFF\n3 1 0\n0 0 0\n1 0 0\n0 1 0\n4294967295 0 1 2\n', 'syntax-invalid'],
  ])('%s is refused without memory for them', (_name, text, code) => {
    const bytes = encode(text);
    const { error, memoryBytes } = refuse([bytes], { sizeBytes: bytes.length });
    expect(error.code).toBe(code);
    expect(memoryBytes).toBeLessThan(4 * megabyte);
  });
});

describe('one facet over and over', () => {
  it('is counted without an object for each', () => {
    const measurer = createMeasurer({ sizeBytes: 24 + 8 * 1e6 });
    for (const chunk of repeat(['v 0 0 0\nv 1 0 0\nv 0 1 0\n', 1], ['f 1 2 3\n', 1e6])) measurer.push(chunk);
    const before = process.memoryUsage().heapUsed;
    const { soundness } = measurer.finish();
    expect(process.memoryUsage().heapUsed - before).toBeLessThan(40 * megabyte);
    expect(soundness.duplicateFacets).toBe(999_999);
    expect(soundness.findings.at(-1)).toMatchObject({ kind: 'duplicate-facets', count: 999_999, facets: Array.from({ length: 20 }, (_, k) => k + 1) });
  });
});

describe('an archive that grows beyond all bounds', () => {
  /** A gigabyte in 64 members of 16 MiB each: about a megabyte when packed. */
  function* bomb(head: string, unit: string | Uint8Array): Generator<Uint8Array> {
    const content = Buffer.concat([...repeat([unit, Math.ceil((16 * megabyte) / unit.length)])]);
    const member = gzipSync(content);
    yield gzipSync(head);
    for (let k = 0; k < 64; k++) yield member;
  }
  const triangle = 'facet normal 0 0 1\nouter loop\nvertex 0 0 0\nvertex 1 0 0\nvertex 0 1 0\nendloop\nendfacet\n';
  const binary = writeBinaryStl(makeBlock([0, 0, 0], [1, 1, 1]));
  new DataView(binary.buffer).setUint32(80, 19_999_999, true);

  it.each([
    ['zeros', '', '\0'],
    ['vertices', '', 'v 0 0 0\n'],
    ['facets of one vertex', 'v 0 0 0\n', 'f 1 1 1\n'],
    ['comments', '', '#\n'],
    ['the same facet in ASCII STL', 'solid\n', triangle],
    ['solids without facets', '', 'solid\nendsolid\n'],
    ['the same facet in binary STL', String.fromCharCode(...binary.subarray(0, 84)), binary.subarray(84, 134)],
  ])('a gigabyte of %s', (_name, head, unit) => {
    const { error, pushedBytes, memoryBytes } = refuse(bomb(head, unit));
    expect(error.code).toBe('too-large-expanded');
    expect(error.message).toMatch(/^The gzip archive holds more than can be examined here/);
    expect(error.at?.byte).toBeLessThan(megabyte);
    // Refused within the first of the members.
    expect(pushedBytes).toBeLessThan(megabyte);
    expect(memoryBytes).toBeLessThan(64 * megabyte);
  });

  it('a gigabyte of blanks, which is no mesh', () => {
    const { error, pushedBytes } = refuse(bomb('', ' '));
    expect(error).toMatchObject({ code: 'format-unknown' });
    expect(pushedBytes).toBeLessThan(megabyte);
  });

  it('more than the largest mesh, packed however little', () => {
    const content = Buffer.concat([...repeat(['v 0.123 4.567 8.901\n', 50_000])]);
    const { error } = refuse([gzipSync(content, { level: 0 })], { maximumExpandedBytes: 300_000 });
    expect(error.code).toBe('too-large-expanded');
    expect(error.at?.byte).toBeLessThan(400_000);
  });
});
