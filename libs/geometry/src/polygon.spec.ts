import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cutPolygon } from './cut-polygon';
import { defaultLimits } from './limits';
import { measureMesh } from './measurer';
import { measurePolygonDoubt } from './polygon-doubt';
import { createPolygonMesh } from './polygon-mesh';
import { findPolygonShape } from './polygon-shape';
import { encode } from './testing/obj-files';

type Flat = readonly (readonly [number, number])[];

const shoelace = (points: Flat): number => points.reduce((sum, [x, y], k) => sum + x * (points[(k + 1) % points.length]?.[1] ?? 0) - y * (points[(k + 1) % points.length]?.[0] ?? 0), 0) / 2;

/** A prism over a polygon as OBJ: one polygon below, one on top, and a rectangle for each side. */
function writePrism(points: Flat, height: number): string {
  const n = points.length;
  const vertices = [0, height].flatMap((z) => points.map(([x, y]) => `v ${x} ${y} ${z}`));
  const ring = Array.from({ length: n }, (_, k) => k + 1);
  const sides = ring.map((k) => `f ${k} ${(k % n) + 1} ${(k % n) + 1 + n} ${k + n}`);
  return [...vertices, `f ${[...ring].reverse().join(' ')}`, `f ${ring.map((k) => k + n).join(' ')}`, ...sides, ''].join('\n');
}

function measurePerimeter(points: Flat): number {
  return points.reduce((sum, [x, y], k) => sum + Math.hypot((points[(k + 1) % points.length]?.[0] ?? 0) - x, (points[(k + 1) % points.length]?.[1] ?? 0) - y), 0);
}

const angle: Flat = [[4, 1], [1, 1], [1, 5], [0, 5], [0, 0], [4, 0]];
const comb = (teeth: number): Flat => [...Array.from({ length: teeth }, (_, k) => [[4 * k, 0], [4 * k + 2, 0], [4 * k + 2, 8], [4 * k + 4, 8]] as const).flat(), [4 * teeth, 10], [0, 10]];
/** A square with a square hole, the two outlines joined by an edge that is run along twice. */
const keyhole: Flat = [[0, 0], [6, 0], [6, 6], [0, 6], [0, 0], [2, 2], [2, 4], [4, 4], [4, 2], [2, 2]];
const star: Flat = Array.from({ length: 40 }, (_, k) => [Math.cos((k * Math.PI) / 20) * (k % 2 === 0 ? 5 : 2), Math.sin((k * Math.PI) / 20) * (k % 2 === 0 ? 5 : 2)] as const);

describe('a polygon that is not convex', () => {
  it.each([
    ['an angle', angle],
    ['a comb', comb(30)],
    ['a star', star],
    ['an arrow that begins at its notch', [[0, 1], [-2, 0], [0, 5], [2, 0]]],
  ] as [string, Flat][])('%s, drawn up to a prism, has its volume and its area, wherever its outline begins', (_name, points) => {
    const area = Math.abs(shoelace(points));
    for (let begin = 0; begin < points.length; begin += 3) {
      const turned = [...points.slice(begin), ...points.slice(0, begin)];
      const outline = shoelace(turned) > 0 ? turned : turned.reverse();
      const { volume, surface, soundness } = measureMesh(encode(writePrism(outline, 3)));
      expect(soundness).toMatchObject({ closed: true, oriented: true, outward: true });
      expect(soundness.findings.filter(({ kind }) => kind !== 'degenerate-facets')).toEqual([]);
      expect(Math.abs((volume?.content ?? NaN) / (3 * area) - 1)).toBeLessThan(1e-12);
      expect(Math.abs(surface.content / (2 * area + 3 * measurePerimeter(outline)) - 1)).toBeLessThan(1e-12);
    }
  });

  it('with a hole that is reached along an edge run twice has its area', () => {
    const { surface, soundness } = measureMesh(encode(`${keyhole.map(([x, y]) => `v ${x} ${y} 0\n`).join('')}f 1 2 3 4 5 6 7 8 9 10\n`));
    expect(surface.content).toBeCloseTo(32, 12);
    expect(soundness.findings.map(({ kind }) => kind)).toEqual(['boundary-edges']);
  });

  it('that crosses itself is measured by what its loops enclose together, and stays closed', () => {
    const bow: Flat = [[0, 0], [4, 0], [0, 2], [2, 5]];
    const { volume, soundness } = measureMesh(encode(writePrism(bow, 3)));
    expect(soundness).toMatchObject({ closed: true, oriented: true });
    expect(volume?.content).toBeCloseTo(3 * Math.abs(shoelace(bow)), 12);
  });

  it('with more inward corners than there is time for is fanned and says so, soon', () => {
    const { facets, soundness } = measureMesh(encode(writePrism(comb(2000), 1)));
    expect(facets).toBe(2 * (8002 - 2) + 2 * 8002);
    expect(soundness).toMatchObject({ closed: true, oriented: true, defensible: true });
    expect(soundness.findings).toContainEqual(expect.objectContaining({ kind: 'folded-polygons', count: 2, facets: [0, 8000] }));
  });

  it('of any star-shaped outline, in any plane, is cut into triangles that cover it once', () => {
    const radii = fc.array(fc.double({ min: 0.05, max: 1, noNaN: true }), { minLength: 4, maxLength: 60 });
    fc.assert(
      fc.property(radii, fc.nat(2), fc.boolean(), fc.nat(59), (lengths, axis, mirrored, begin) => {
        const n = lengths.length;
        const points = lengths.map((radius, k) => [radius * Math.cos((2 * Math.PI * k) / n), (mirrored ? -1 : 1) * radius * Math.sin((2 * Math.PI * k) / n)] as const);
        const vertices = points.flatMap(([x, y]) => [[x, y, 7], [7, x, y], [y, 7, x]][axis] ?? []);
        const corners = Array.from({ length: n }, (_, k) => (k + begin) % n);
        const { planar, normal } = findPolygonShape(vertices, corners, n);
        expect(planar).toBe(true);
        const triangles = cutPolygon(vertices, corners, n, normal);
        if (triangles === undefined) throw new Error('The polygon was not cut.');
        let covered = 0;
        for (let at = 0; at < triangles.length; at += 3) covered += Math.abs(shoelace(Array.from(triangles.subarray(at, at + 3), (vertex) => points[vertex] ?? [NaN, NaN])));
        expect(Math.abs(covered / Math.abs(shoelace(points)) - 1)).toBeLessThan(1e-12);
        expect(new Set(triangles).size).toBe(n);
      }),
      { numRuns: 400 },
    );
  });
});

describe('the doubt about a polygon that is not flat', () => {
  /** Volume between the origin and the fan from one corner. */
  const fan = (vertices: number[], count: number, apex: number): number => {
    const at = (k: number): number[] => vertices.slice(3 * ((apex + k) % count), 3 * ((apex + k) % count) + 3);
    return Array.from({ length: count - 2 }, (_, k) => {
      const [ax = 0, ay = 0, az = 0] = at(0), [bx = 0, by = 0, bz = 0] = at(k + 1), [cx = 0, cy = 0, cz = 0] = at(k + 2);
      return (ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx)) / 6;
    }).reduce((sum, part) => sum + part, 0);
  };

  it('is half the difference of volume between the fans of its first two corners', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: -10, max: 10, noNaN: true }), { minLength: 12, maxLength: 36 }), (numbers) => {
        const count = Math.floor(numbers.length / 3);
        const found = measurePolygonDoubt(numbers, Array.from({ length: count }, (_, k) => k), count);
        expect(Math.abs(found - Math.abs(fan(numbers, count, 0) - fan(numbers, count, 1)) / 2)).toBeLessThan(1e-9);
      }),
    );
  });

  it('of a square with one corner lifted by h is a twelfth of h, and of a triangle nothing', () => {
    expect(measurePolygonDoubt([0, 0, 0, 1, 0, 0, 1, 1, 0.3, 0, 1, 0], [0, 1, 2, 3], 4)).toBeCloseTo(0.3 / 12, 15);
    expect(measurePolygonDoubt([5, 0, 0, 1, 7, 0, 1, 1, 0.3], [0, 1, 2], 3)).toBe(0);
  });

  it('is added up over the polygons of a file that are not flat', () => {
    const mesh = createPolygonMesh('obj', defaultLimits, () => undefined, () => ({ line: 1 }));
    for (const [x, y, z] of [[0, 0, 0], [1, 0, 0], [1, 1, 0.3], [0, 1, 0], [1, 1, 0], [1, 1, 0.6]] as const) mesh.addVertex(x, y, z);
    for (const corner of [2, 4, 5]) {
      mesh.beginPolygon();
      for (const vertex of [0, 1, corner, 3]) mesh.addCorner(vertex);
      mesh.endPolygon();
    }
    const remarks = mesh.finish();
    expect(remarks.polygonVolume).toBeCloseTo(0.9 / 12, 15);
    expect(remarks.nonPlanarPolygons).toEqual({ count: 2, facets: [0, 4] });
  });
});
