import { describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { makeBlock } from './testing/shapes';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

describe('measuring a block of 2 × 3 × 4', () => {
  const block = makeBlock([0, 0, 0], [2, 3, 4]);

  it.each([
    ['binary', writeBinaryStl(block)],
    ['ASCII', writeAsciiStl(block)],
  ])('gives volume, centre, second moments and a sound verdict from %s STL', (_, bytes) => {
    const { volume, surface, soundness, boundingBox, origin, facets } = measureMesh(bytes);
    expect(volume).toMatchObject({ content: 24, centreFromOrigin: [1, 1.5, 2], second: { xx: (24 * 4) / 12, yy: (24 * 9) / 12, zz: (24 * 16) / 12, xy: 0, yz: 0, zx: 0 } });
    expect(surface.content).toBe(52);
    expect(surface.centreFromOrigin).toEqual([1, 1.5, 2]);
    expect({ boundingBox, origin, facets }).toEqual({ boundingBox: { min: [0, 0, 0], max: [2, 3, 4] }, origin: [0, 0, 0], facets: 12 });
    expect(soundness).toEqual({ closed: true, oriented: true, outward: true, turned: false, boundaryEdges: 0, nonManifoldEdges: 0, degenerateFacets: 0, duplicateFacets: 0, nonManifoldVertices: 0, shells: 1, cavities: 0, selfIntersections: 0, defensible: true, findings: [] });
  });
});
