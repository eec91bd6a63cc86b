import { readdirSync, readFileSync, statSync } from 'node:fs';
import { createRequire } from 'node:module';
import path from 'node:path';
import { OBJLoader, PLYLoader } from 'three-stdlib';
import { describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { MeshError } from './mesh-error';
import { createMeshReader } from './mesh-reader';
import { compareExactly } from './testing/compare-exactly';
import { oddities, soundAndBroken } from './testing/public-models';
import { scenes } from './testing/public-scenes';
import type { Corners } from './testing/shapes';

/** What a file gives: facets, volume (null where not defensible) and findings, or the code of its refusal. */
function measureFile(file: string): string {
  try {
    const { format, facets, volume, soundness } = measureMesh(readFileSync(file));
    const remarks = soundness.findings.map(({ kind, count }) => `${kind} ${count}`);
    return [format, `${facets} facet${facets === 1 ? '' : 's'}`, volume === null ? 'not defensible' : `volume ${Number(volume.content.toPrecision(11))}`, ...remarks].join(', ');
  } catch (error) {
    if (!(error instanceof MeshError)) throw error;
    return `${error.code} at ${JSON.stringify(error.at)}`;
  }
}

function readCorners(file: string): Corners {
  const bytes = readFileSync(file);
  const corners: number[] = [];
  const reader = createMeshReader({ sizeBytes: bytes.length, onFacets: (batch) => corners.push(...batch.corners.subarray(0, 9 * batch.count)) });
  reader.push(bytes);
  reader.finish();
  return Float64Array.from(corners);
}

/** Names of the files below a folder that a table has to have. */
const listFiles = (folder: string, isWanted: (name: string) => boolean): string[] => readdirSync(folder, { recursive: true, encoding: 'utf8' }).filter((name) => isWanted(name) && statSync(path.join(folder, name)).isFile());

describe('the files of a public collection of sound and broken models', () => {
  const folder = path.dirname(createRequire(import.meta.url).resolve('stl-models/package.json'));

  it('stand in the table, every one', () => {
    expect(listFiles(folder, (name) => name.endsWith('.stl')).sort()).toEqual(soundAndBroken.map(([file]) => file).sort());
  });

  it.each(soundAndBroken)('%s: %s', (file, outcome) => {
    expect(measureFile(path.join(folder, file))).toBe(outcome);
  });
});

describe('the files of a public collection of oddities', () => {
  const folder = '/usr/share/assimp/models';

  it('stand in the table, every one', () => {
    const found = listFiles(folder, (name) => /^(STL|OBJ|PLY|OFF|3MF|glTF2?|invalid)\//.test(name) || /\.(stl|obj)$/i.test(name));
    expect(found.sort()).toEqual([...oddities, ...scenes].map(([file]) => file).sort());
  });

  it.each([...oddities, ...scenes])('%s: %s', (file, outcome) => {
    expect(measureFile(path.join(folder, file))).toBe(outcome);
  });

  it.each([...oddities, ...scenes].filter(([, outcome]) => outcome.includes('volume')))('%s: the figures are those of exact arithmetic', (file) => {
    const name = path.join(folder, file);
    const errors = compareExactly(measureMesh(readFileSync(name)), readCorners(name));
    expect(Math.max(errors.volume, errors.centre, errors.second)).toBeLessThan(1e-13);
  });

  // Of testmixed.obj, where faces stand beside lines, the other reader makes lines only; in the other two it fans a polygon that is not convex.
  const differing = ['OBJ/testmixed.obj', 'OBJ/concave_polygon.obj', 'OBJ/space_in_material_name.obj'];
  it.each(oddities.filter(([file, outcome]) => outcome.startsWith('obj') && !differing.includes(file)))('%s: its facets are those of another reader (three-stdlib), in the same order', (file) => {
    const name = path.join(folder, file);
    const text = new TextDecoder(file.includes('UTF16BE') ? 'utf-16be' : 'utf-8').decode(readFileSync(name));
    const scene: unknown = new OBJLoader().parse(text);
    // It keeps binary32, and no sign of zero.
    expect(Float32Array.from(readCorners(name), (coordinate) => coordinate + 0)).toEqual(Float32Array.from(findPositions(scene as Branch), (coordinate) => coordinate + 0));
  });

  // Quadrilaterals are cut along their other diagonal there.
  const quadrilateral = ['PLY/cube.ply', 'PLY/cube_uv.ply'];
  it.each(scenes.filter(([file, outcome]) => outcome.startsWith('ply') && !quadrilateral.includes(file)))('%s: its facets are those of another reader (three-stdlib), in the same order', (file) => {
    const name = path.join(folder, file);
    const bytes = Uint8Array.from(readFileSync(name));
    const geometry: unknown = new PLYLoader().parse(bytes.buffer);
    const { attributes, index } = geometry as { attributes: { position: { array: ArrayLike<number> } }; index: { array: ArrayLike<number> } };
    const positions = attributes.position.array;
    const expected = Array.from(index.array).flatMap((vertex) => [0, 1, 2].map((k) => (positions[3 * vertex + k] ?? NaN) + 0));
    expect(Float32Array.from(readCorners(name), (coordinate) => coordinate + 0)).toEqual(Float32Array.from(expected));
  });

  it.each(differing.slice(1))('%s: its one polygon is cut into triangles that cover it once', (file) => {
    const corners = readCorners(path.join(folder, file));
    // Twice the vector area of each triangle, as the exact oracle would have it to all the digits that are compared.
    const areas = Array.from({ length: corners.length / 9 }, (_, facet) => {
      const [ax = 0, ay = 0, az = 0, bx = 0, by = 0, bz = 0, cx = 0, cy = 0, cz = 0] = corners.subarray(9 * facet, 9 * facet + 9);
      return [(by - ay) * (cz - az) - (bz - az) * (cy - ay), (bz - az) * (cx - ax) - (bx - ax) * (cz - az), (bx - ax) * (cy - ay) - (by - ay) * (cx - ax)] as const;
    });
    const whole = [0, 1, 2].map((k) => areas.reduce((sum, area) => sum + (area[k] ?? NaN), 0)) as [number, number, number];
    expect(areas.reduce((sum, area) => sum + Math.hypot(...area), 0) / Math.hypot(...whole)).toBeCloseTo(1, 9);
  });

  it.each([
    ['OBJ/spider.obj', 'STL/Spider_ascii.stl', 'STL/Spider_binary.stl'],
    ['OBJ/WusonOBJ.obj', 'STL/Wuson.stl'],
  ])('%s and the same model in STL have the same area and holes, the size of the model left aside', (obj, ...others) => {
    const figures = (file: string): { area: number; holes: number | null; facets: number } => {
      const { surface, boundingBox, soundness, facets } = measureMesh(readFileSync(path.join(folder, file)));
      const longest = Math.max(...boundingBox.max.map((most, k) => most - (boundingBox.min[k] ?? NaN)));
      return { area: surface.content / longest ** 2, holes: soundness.boundaryEdges, facets };
    };
    const { area, ...counts } = figures(obj);
    for (const other of others) {
      const { area: same, ...sameCounts } = figures(other);
      expect(sameCounts).toEqual(counts);
      expect(Math.abs(same / area - 1)).toBeLessThan(1e-6);
    }
  });
});

/** What the other reader gives: objects in the order of the file, each with its corners one after another. */
interface Branch {
  children: Branch[];
  geometry?: { attributes: { position?: { array: ArrayLike<number> } } };
}

function findPositions({ children, geometry }: Branch): number[] {
  return [...Array.from(geometry?.attributes.position?.array ?? []), ...children.flatMap(findPositions)];
}
