import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FindingKind, Measurement } from './measurement';
import { measureMesh } from './measurer';
import { anyMesh } from './testing/arbitrary-meshes';
import * as shapes from './testing/shapes';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

/* What a whole file is judged to be; the examination of meshes has its own tests beside it. */

const measure = (corners: shapes.Corners): Measurement => measureMesh(writeAsciiStl(corners));
const findings = ({ soundness }: Measurement): Partial<Record<FindingKind, number>> => Object.fromEntries(soundness.findings.map(({ kind, count }) => [kind, count]));

/** A sound mesh and one of its facets. */
const meshAndFacet = fc.tuple(anyMesh, fc.nat()).map(([corners, pick]) => ({ corners, index: pick % (corners.length / 9) }));

describe('the soundness of a file', () => {
  it('a gap of one unit in the last place of binary32: four boundary edges', () => {
    fc.assert(
      fc.property(meshAndFacet, fc.nat(8), ({ corners, index }, place) => {
        const bytes = writeBinaryStl(corners);
        const view = new DataView(bytes.buffer);
        const at = 84 + 50 * index + 12 + 4 * place;
        // The neighbouring binary32 number; a coordinate of zero is left out, its neighbour being one of thousands of subnormal ones.
        const bits = view.getUint32(at, true);
        fc.pre((bits & 0x7fffffff) !== 0 && measureMesh(bytes).soundness.closed === true);
        view.setUint32(at, bits ^ 1, true);
        const { soundness } = measureMesh(bytes);
        expect(soundness).toMatchObject({ closed: false, oriented: false, boundaryEdges: 4 });
        expect(soundness.findings.map(({ kind }) => kind)).toContain('hairline-gaps');
      }),
    );
  });

  it('-0 and +0 are the same place', () => {
    const corners = shapes.makeBlock([0, 0, 0], [1, 1, 1]);
    const mixed = corners.map((coordinate, k) => (coordinate === 0 && k % 2 === 0 ? -0 : coordinate));
    const measurement = measureMesh(writeBinaryStl(mixed));
    expect(measurement.soundness.findings).toEqual([]);
    expect(JSON.stringify(measurement)).toBe(JSON.stringify(measureMesh(writeBinaryStl(corners))));
    expect([...measurement.origin, ...measurement.boundingBox.min].every((coordinate) => Object.is(coordinate, 0))).toBe(true);
  });

  it('a body of 1e-14 of its box is a body, where its faces are that exact', () => {
    const sliver = shapes.makeBlock([0, 0, 0], [1, 1, 2 ** -46]);
    expect(measure(sliver).volume?.content).toBe(2 ** -46);
  });

  it('stored normals that point inward are reported, but do not decide', () => {
    const bytes = writeBinaryStl(shapes.makeBlock([0, 0, 0], [1, 1, 1]));
    const view = new DataView(bytes.buffer);
    for (const index of [4, 9]) for (let k = 0; k < 3; k++) view.setFloat32(84 + 50 * index + 4 * k, -view.getFloat32(84 + 50 * index + 4 * k, true), true);
    const { findings } = measureMesh(bytes).soundness;
    expect(findings).toMatchObject([{ kind: 'contradicting-normals', count: 2, facets: [4, 9] }]);
    // The sides of those two facets.
    expect(findings[0]?.lines).toHaveLength(6);
  });

  it('a mesh with a cavity, one inside out and one open: closed and oriented by its edges, its volume read as it should be', () => {
    const hollow = shapes.join(shapes.makeBlock([0, 0, 0], [3, 3, 3]), shapes.turn(shapes.makeBlock([1, 1, 1], [2, 2, 2])));
    const upright = measure(hollow), turned = measure(shapes.turn(hollow)), open = measure(hollow.slice(9));
    expect([upright, turned].map(({ volume, soundness }) => [volume?.content, soundness.turned, soundness.cavities])).toEqual([[26, false, 1], [26, true, 1]]);
    expect(findings(turned)).toEqual({ 'turned-whole': 1 });
    expect(open).toMatchObject({ volume: null, soundness: { closed: false, boundaryEdges: 3, defensible: false } });
    expect(open.openings?.volumes.fanned).toBeCloseTo(26, 12);
  });
});
