import { describe, expect, it } from 'vitest';
import { createMeasurer, measureMesh } from './measurer';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

/** The twelve facets of a block with one corner at the origin, wound outward. */
export function blockFacets(x: number, y: number, z: number): Float64Array {
  const corner = (n: number): number[] => [n & 1 ? x : 0, n & 2 ? y : 0, n & 4 ? z : 0];
  const quads = [[0, 2, 3, 1], [4, 5, 7, 6], [0, 1, 5, 4], [2, 6, 7, 3], [0, 4, 6, 2], [1, 3, 7, 5]] as const;
  return Float64Array.from(quads.flatMap(([a, b, c, d]) => [a, b, c, a, c, d].flatMap(corner)));
}

describe('measuring a block of 2 × 3 × 4', () => {
  const expected = { content: 24, centreFromOrigin: [1, 1.5, 2], second: { xx: 24 / 3, yy: (24 * 9) / 12, zz: (24 * 16) / 12, xy: 0, yz: 0, zx: 0 } };

  it.each([
    ['binary', writeBinaryStl(blockFacets(2, 3, 4))],
    ['ASCII', writeAsciiStl(blockFacets(2, 3, 4))],
  ])('gives its volume, centre and second moments from %s STL', (_, bytes) => {
    const { volume, surface, soundness } = measureMesh(bytes);
    expect(volume).toEqual(expected);
    expect(surface.content).toBe(52);
    expect(soundness).toEqual({ closed: true, oriented: true, outward: true, turned: false, boundaryEdges: 0, nonManifoldEdges: 0, degenerateFacets: 0, duplicateFacets: 0, defensible: true, findings: [] });
  });

  it('does not depend on how the bytes were cut', () => {
    const bytes = writeBinaryStl(blockFacets(2, 3, 4));
    const measurer = createMeasurer({ sizeBytes: bytes.length });
    for (let at = 0; at < bytes.length; at++) measurer.push(bytes.subarray(at, at + 1));
    expect(measurer.finish()).toEqual(measureMesh(bytes));
  });
});
