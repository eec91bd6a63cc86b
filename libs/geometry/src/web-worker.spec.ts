import { openAsBlob } from 'node:fs';
import { createRequire } from 'node:module';
import { gzipSync } from 'node:zlib';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { write3mf } from './testing/3mf-files';
import { anyMesh } from './testing/arbitrary-meshes';
import { writeGlb } from './testing/gltf-files';
import { blockObj, encode, writeObj } from './testing/obj-files';
import { writeOff } from './testing/off-files';
import { writePly } from './testing/ply-files';
import * as shapes from './testing/shapes';
import { createQuickReader, createSilhouetteReader, readMeshFile, type FileFigures, type FileOptions, type Silhouette } from './web-worker';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

const makeFile = (bytes: Uint8Array): Blob => new Blob([Uint8Array.from(bytes)]);

async function readFigures(bytes: Uint8Array, options?: FileOptions): Promise<FileFigures> {
  const found = await readMeshFile(makeFile(bytes), options);
  if ('error' in found) throw new Error(found.error.message);
  return found;
}

async function draw(corners: shapes.Corners, cells = 96): Promise<Silhouette> {
  const { silhouette } = await readFigures(writeBinaryStl(corners), { silhouetteCells: cells });
  if (silhouette === null) throw new Error('There is no outline.');
  return silhouette;
}

const toRows = ({ cells, width, height }: Silhouette): string[] => Array.from({ length: height }, (_, row) => Array.from(cells.subarray(row * width, (row + 1) * width), (cell) => (cell === 1 ? '#' : '.')).join(''));

describe('the figures of a first look', () => {
  it('are those of the measurement, for every format, packed or not', async () => {
    const corners = shapes.makeTorus(50, 10, 48);
    for (const bytes of [writeBinaryStl(corners), writeAsciiStl(corners), encode(writeObj(corners))]) {
      for (const file of [bytes, gzipSync(bytes)]) {
        const { volume, ...figures } = await readFigures(file);
        const measured = measureMesh(file);
        expect(figures).toMatchObject({ format: measured.format, compression: measured.compression, facets: measured.facets, boundingBox: measured.boundingBox });
        expect(Math.abs(volume / (measured.volume?.content ?? NaN) - 1)).toBeLessThan(1e-12);
      }
    }
  });

  it('have the volume of any closed mesh, inside out or far away too', () => {
    fc.assert(
      fc.property(anyMesh, fc.boolean(), fc.boolean(), (mesh, turned, far) => {
        const moved = far ? shapes.move(mesh, [1e4, -1e4, 1e4]) : mesh;
        const bytes = writeBinaryStl(turned ? shapes.turn(moved) : moved);
        const reader = createQuickReader({ sizeBytes: bytes.length });
        reader.push(bytes);
        const measured = measureMesh(bytes);
        // Rounding to binary32 far away may flatten a facet, never the whole.
        if (measured.volume !== null) expect(Math.abs(reader.finish().volume / measured.volume.content - 1)).toBeLessThan(1e-10);
      }),
      { numRuns: 100 },
    );
  });

  it('say the unit that the file states, and none where it states none', async () => {
    const block = shapes.makeBlock([0, 0, 0], [2, 3, 4]);
    for (const [bytes, format, declaredUnit] of [
      [write3mf(block, 'unit="inch"'), '3mf', 'inch'],
      [writeGlb(block), 'glb', 'm'],
      [gzipSync(writePly(block, 'ascii')), 'ply-ascii', null],
      [encode(writeOff(block)), 'off', null],
    ] as const) {
      expect(await readFigures(bytes)).toMatchObject({ format, declaredUnit, facets: 12, volume: 24, boundingBox: { min: [0, 0, 0], max: [2, 3, 4] } });
    }
  });

  it('can be cloned on their way out of a worker', async () => {
    const figures = await readFigures(encode(blockObj));
    expect(structuredClone(figures)).toEqual(figures);
    expect(figures).toMatchObject({ format: 'obj', compression: null, facets: 12, boundingBox: { min: [0, 0, 0], max: [2, 3, 4] }, volume: 24 });
  });

  it('take constant memory of a large file in STL', () => {
    const facet = writeBinaryStl(shapes.makeBlock([0, 0, 0], [1, 1, 1])).subarray(84, 134);
    const chunk = new Uint8Array(50 * 2000);
    for (let at = 0; at < chunk.length; at += 50) chunk.set(facet, at);
    const facets = 2000 * 500;
    const head = new Uint8Array(84);
    new DataView(head.buffer).setUint32(80, facets, true);
    const reader = createQuickReader({ sizeBytes: 84 + 50 * facets });
    reader.push(head);
    reader.push(chunk);
    const before = process.memoryUsage().arrayBuffers;
    for (let k = 1; k < 500; k++) reader.push(chunk);
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(4e6);
    expect(reader.finish().facets).toBe(facets);
  });
});

describe('the outline of a first look', () => {
  it('of a block fills the picture, and has the proportions of its two longer sides', async () => {
    for (const [size, axis, horizontal, vertical, width, height] of [
      [[40, 20, 5], 'z', 'x', 'y', 96, 48],
      [[40, 5, 20], 'y', 'x', 'z', 96, 48],
      [[5, 20, 40], 'x', 'y', 'z', 48, 96],
      [[7, 7, 7], 'z', 'x', 'y', 96, 96],
    ] as const) {
      const { cells, ...outline } = await draw(shapes.makeBlock([100, -3, 1], [100 + size[0], -3 + size[1], 1 + size[2]]));
      expect(outline).toEqual({ axis, horizontal, vertical, width, height });
      expect(cells.every((cell) => cell === 1)).toBe(true);
    }
  });

  it('of a torus has a hole as wide as it is', async () => {
    const outline = await draw(shapes.makeTorus(30, 10, 96));
    expect(outline).toMatchObject({ axis: 'z', width: 96, height: 96 });
    const middle = toRows(outline)[48] ?? '';
    // The hole is a quarter of the outer radius short of half: 40 of 80 units, 48 of 96 cells, less the cells that the rim reaches into.
    expect(middle).toMatch(/^#+\.+#+$/);
    expect(middle.split('.').length - 1).toBeGreaterThanOrEqual(46);
    expect(middle.split('.').length - 1).toBeLessThanOrEqual(48);
    const share = outline.cells.reduce((sum, cell) => sum + cell, 0) / outline.cells.length;
    expect(Math.abs(share - (Math.PI * (40 ** 2 - 20 ** 2)) / 80 ** 2)).toBeLessThan(0.04);
  });

  it('of a single facet is that triangle, the right way up and round', async () => {
    const facet = Float64Array.of(0, 0, 0, 8, 0, 0, 0, 4, 0);
    expect(toRows(await draw(facet, 8))).toEqual(['##......', '####....', '######..', '########']);
  });

  it('of facets finer than a cell has no gaps', async () => {
    const { cells, width, height } = await draw(shapes.makeSphere(1, 400), 40);
    for (let row = 0; row < height; row++) {
      for (let column = 0; column < width; column++) {
        const [x, y] = [(2 * (column + 0.5)) / width - 1, (2 * (row + 0.5)) / height - 1];
        if (x * x + y * y < 0.9) expect(cells[row * width + column]).toBe(1);
        if (x * x + y * y > 1.15) expect(cells[row * width + column]).toBe(0);
      }
    }
  });

  it('sets the cells of every corner, and none that no facet comes near', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.double({ min: 0, max: 10, noNaN: true }), fc.double({ min: 0, max: 10, noNaN: true })), { minLength: 3, maxLength: 3 }), (points) => {
        const corners = Float64Array.from(points.flatMap(([x, y]) => [Math.fround(x), Math.fround(y), 0]));
        const bytes = writeBinaryStl(corners);
        const reader = createSilhouetteReader({ sizeBytes: bytes.length, boundingBox: { min: [0, 0, 0], max: [10, 10, 1] }, cells: 20 });
        reader.push(bytes);
        const { cells, width } = reader.finish();
        const [a, b, c] = [0, 3, 6].map((at) => [corners[at] ?? NaN, corners[at + 1] ?? NaN] as const) as [Spot, Spot, Spot];
        cells.forEach((cell, k) => {
          const middle: Spot = [((k % width) + 0.5) / 2, 10 - (Math.floor(k / width) + 0.5) / 2];
          const apart = measureDistance(middle, a, b, c);
          // Half the diagonal of a cell is 0.354; a cell whose middle is within the triangle is set, one farther off than that is not.
          if (apart === 0) expect(cell).toBe(1);
          if (apart > 0.36) expect(cell).toBe(0);
        });
      }),
      { numRuns: 200 },
    );
  });

  it('of a mesh without extent is one cell', async () => {
    expect(toRows(await draw(Float64Array.of(1, 1, 1, 1, 1, 1, 1, 1, 1)))).toEqual(['#']);
    expect(toRows(await draw(Float64Array.of(1, 1, 1, 3, 1, 1, 2, 1, 1), 4))).toEqual(['####']);
  });

  it('is left out where the file is larger than was asked for', async () => {
    const bytes = writeBinaryStl(shapes.makeSphere(1, 20));
    expect((await readFigures(bytes, { silhouetteUpToBytes: bytes.length - 1 })).silhouette).toBeNull();
    expect((await readFigures(bytes, { silhouetteUpToBytes: bytes.length })).silhouette).not.toBeNull();
  });
});

describe('a file of the disk', () => {
  it('is read as a stream', async () => {
    const file = await openAsBlob(createRequire(import.meta.url).resolve('stl-models/objects/gearwheel.bin.stl'));
    const found = await readMeshFile(file);
    expect(found).toMatchObject({ facets: 2444, format: 'stl-binary' });
    expect('volume' in found && Number(found.volume.toPrecision(8))).toBe(8922.6367);
  });

  it('that cannot be measured gives what the measurer says of it', async () => {
    const broken = writeBinaryStl(shapes.makeSphere(1, 12)).subarray(0, 1000);
    const found = await readMeshFile(makeFile(broken));
    expect(found).toEqual({ error: { code: 'file-truncated', message: expect.stringMatching(/^The header says 120 facets/) as string, at: { byte: 1000 } } });
    expect(structuredClone(found)).toEqual(found);
    expect(await readMeshFile(new Blob([]))).toMatchObject({ error: { code: 'file-empty', at: null } });
    expect(await readMeshFile(makeFile(encode(blockObj)), { maximumFacets: 11 })).toMatchObject({ error: { code: 'too-many-facets', at: { line: 14 } } });
  });

  it('is given up when the signal says so', async () => {
    const reason = new Error('The page was left.');
    await expect(readMeshFile(makeFile(writeBinaryStl(shapes.makeSphere(1, 12))), { signal: AbortSignal.abort(reason) })).rejects.toBe(reason);
    // In the middle of it, too.
    const left = new AbortController();
    const reading = readMeshFile(makeFile(writeBinaryStl(shapes.makeSphere(1, 200))), { signal: left.signal });
    left.abort(reason);
    await expect(reading).rejects.toBe(reason);
  });
});

type Spot = readonly [number, number];

/** How far a spot is from a triangle; 0 within it. */
function measureDistance(spot: Spot, a: Spot, b: Spot, c: Spot): number {
  const side = (p: Spot, q: Spot): number => (q[0] - p[0]) * (spot[1] - p[1]) - (q[1] - p[1]) * (spot[0] - p[0]);
  const sides = [side(a, b), side(b, c), side(c, a)];
  if (sides.every((value) => value > 0) || sides.every((value) => value < 0)) return 0;
  const toEdge = (p: Spot, q: Spot): number => {
    const [ex, ey] = [q[0] - p[0], q[1] - p[1]];
    const length2 = ex * ex + ey * ey;
    const share = length2 === 0 ? 0 : Math.min(1, Math.max(0, ((spot[0] - p[0]) * ex + (spot[1] - p[1]) * ey) / length2));
    return Math.hypot(spot[0] - p[0] - share * ex, spot[1] - p[1] - share * ey);
  };
  return Math.min(toEdge(a, b), toEdge(b, c), toEdge(c, a));
}
