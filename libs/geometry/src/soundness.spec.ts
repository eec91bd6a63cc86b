import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FindingKind, Measurement } from './measurement';
import { measureMesh } from './measurer';
import { anyMesh } from './testing/arbitrary-meshes';
import * as shapes from './testing/shapes';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

const measure = (corners: shapes.Corners): Measurement => measureMesh(writeAsciiStl(corners));
const findings = ({ soundness }: Measurement): Partial<Record<FindingKind, number>> => Object.fromEntries(soundness.findings.map(({ kind, count }) => [kind, count]));
const facetsOf = (measurement: Measurement, kind: FindingKind): number[] => measurement.soundness.findings.find((finding) => finding.kind === kind)?.facets ?? [];
const facet = (corners: shapes.Corners, index: number): shapes.Corners => corners.slice(9 * index, 9 * index + 9);
const without = (corners: shapes.Corners, index: number): shapes.Corners => shapes.join(corners.slice(0, 9 * index), corners.slice(9 * index + 9));

/** A dented sheet of 150 facets, tilted so that no coordinate is a round number. */
const sheet = shapes.rotate(shapes.makeStar(20, (i, j) => 1 + 0.3 * Math.sin(3 * i + 5 * j)), shapes.makeRotation(0.3, 0.7, 1.1)).slice(0, 9 * 150);

/** The same facets from the last to the first, beginning with another corner each: a sum over them rounds otherwise. */
function reorder(corners: shapes.Corners): shapes.Corners {
  return shapes.join(...Array.from({ length: corners.length / 9 }, (_, k) => facet(corners, corners.length / 9 - 1 - k)).map((one, k) => shapes.join(one.slice(3 * (k % 3)), one.slice(0, 3 * (k % 3)))));
}

/** A sound mesh and one of its facets. */
const meshAndFacet = fc.tuple(anyMesh, fc.nat()).map(([corners, pick]) => ({ corners, index: pick % (corners.length / 9) }));

describe('the verdict on a closed mesh', () => {
  it('is clean for any dented ball', () => {
    fc.assert(
      fc.property(anyMesh, (corners) => {
        const measurement = measure(corners);
        expect(measurement.soundness).toEqual({ closed: true, oriented: true, outward: true, turned: false, boundaryEdges: 0, nonManifoldEdges: 0, degenerateFacets: 0, duplicateFacets: 0, defensible: true, findings: [] });
      }),
    );
  });

  it('is turned for any ball inside out, with the same integrals', () => {
    fc.assert(
      fc.property(anyMesh, (corners) => {
        const measurement = measure(shapes.turn(corners));
        expect(measurement.soundness).toMatchObject({ closed: true, oriented: true, outward: false, turned: true, defensible: true });
        expect(findings(measurement)).toEqual({ 'turned-whole': 1 });
        const upright = measure(corners);
        expect(measurement.volume?.content).toBeGreaterThan(0);
        expect(Math.abs((measurement.volume?.content ?? 0) / (upright.volume?.content ?? 1) - 1)).toBeLessThan(1e-14);
      }),
    );
  });
});

describe('a planted fault is found, whichever facet it befalls', () => {
  it('a facet removed: three boundary edges, no volume', () => {
    fc.assert(
      fc.property(meshAndFacet, ({ corners, index }) => {
        const measurement = measure(without(corners, index));
        expect(measurement.soundness).toMatchObject({ closed: false, oriented: false, turned: false, boundaryEdges: 3, nonManifoldEdges: 0, defensible: false });
        expect(findings(measurement)).toEqual({ 'boundary-edges': 3 });
        expect(measurement.volume).toBeNull();
        expect(measurement.surface.content).toBeGreaterThan(0);
      }),
    );
  });

  it('a facet flipped: closed, three unbalanced edges, no volume', () => {
    fc.assert(
      fc.property(meshAndFacet, ({ corners, index }) => {
        const measurement = measure(shapes.join(corners.slice(0, 9 * index), shapes.turn(facet(corners, index)), corners.slice(9 * index + 9)));
        expect(measurement.soundness).toMatchObject({ closed: true, oriented: false, turned: false, boundaryEdges: 0, defensible: false });
        expect(findings(measurement)).toEqual({ 'unbalanced-edges': 3 });
        expect(facetsOf(measurement, 'unbalanced-edges')).toContain(index);
        expect(measurement.volume).toBeNull();
      }),
    );
  });

  it('a facet doubled: an odd number of facets at three edges', () => {
    fc.assert(
      fc.property(meshAndFacet, ({ corners, index }) => {
        const measurement = measure(shapes.join(corners, facet(corners, index)));
        expect(measurement.soundness).toMatchObject({ closed: false, boundaryEdges: 3, nonManifoldEdges: 3, duplicateFacets: 1, defensible: false });
        expect(facetsOf(measurement, 'duplicate-facets')).toEqual([corners.length / 9]);
      }),
    );
  });

  it('a pair of facets back to back: crowded edges, but still a volume', () => {
    fc.assert(
      fc.property(meshAndFacet, ({ corners, index }) => {
        const measurement = measure(shapes.join(corners, facet(corners, index), shapes.turn(facet(corners, index))));
        expect(measurement.soundness).toMatchObject({ closed: true, oriented: true, nonManifoldEdges: 3, duplicateFacets: 2, defensible: true });
        expect(findings(measurement)).toEqual({ 'crowded-edges': 3, 'duplicate-facets': 2 });
      }),
    );
  });

  it('a gap of one unit in the last place of binary32: four boundary edges', () => {
    fc.assert(
      fc.property(meshAndFacet, fc.nat(8), ({ corners, index }, place) => {
        const bytes = writeBinaryStl(corners);
        const view = new DataView(bytes.buffer);
        const at = 84 + 50 * index + 12 + 4 * place;
        // The neighbouring binary32 number; a coordinate of zero is left out, its neighbour being one of thousands of subnormal ones.
        const bits = view.getUint32(at, true);
        fc.pre((bits & 0x7fffffff) !== 0 && measureMesh(bytes).soundness.closed);
        view.setUint32(at, bits ^ 1, true);
        const { soundness } = measureMesh(bytes);
        expect(soundness).toMatchObject({ closed: false, boundaryEdges: 4, defensible: false });
      }),
    );
  });
});

describe('single cases of soundness', () => {
  it('-0 and +0 are the same place', () => {
    const corners = shapes.makeBlock([0, 0, 0], [1, 1, 1]);
    const mixed = corners.map((coordinate, k) => (coordinate === 0 && k % 2 === 0 ? -0 : coordinate));
    const measurement = measureMesh(writeBinaryStl(mixed));
    expect(measurement.soundness.findings).toEqual([]);
    expect(JSON.stringify(measurement)).toBe(JSON.stringify(measureMesh(writeBinaryStl(corners))));
    expect([...measurement.origin, ...measurement.boundingBox.min].every((coordinate) => Object.is(coordinate, 0))).toBe(true);
  });

  it('a tube without caps is open though its sides agree about any origin', () => {
    const tube = shapes.makeCylinder(2, 5, 16);
    const sides = Float64Array.from(Array.from({ length: tube.length / 9 }, (_, k) => facet(tube, k)).filter((corners) => new Set([corners[2], corners[5], corners[8]]).size > 1).flatMap((corners) => Array.from(corners)));
    const measurement = measure(sides);
    expect(measurement.soundness).toMatchObject({ closed: false, oriented: false, outward: true, turned: false, boundaryEdges: 32, defensible: false });
    expect(measurement.volume).toBeNull();
    expect(measure(shapes.turn(sides)).soundness).toMatchObject({ outward: false, turned: false });
  });

  it('two blocks that share an edge are closed and oriented; the edge is reported', () => {
    const measurement = measure(shapes.join(shapes.makeBlock([0, 0, 0], [1, 1, 1]), shapes.makeBlock([1, 1, 0], [2, 2, 1])));
    expect(measurement.soundness).toMatchObject({ closed: true, oriented: true, nonManifoldEdges: 1, defensible: true });
    expect(measurement.volume?.content).toBe(2);
  });

  it('a block with a cavity has the volume between', () => {
    const measurement = measure(shapes.join(shapes.makeBlock([0, 0, 0], [3, 3, 3]), shapes.turn(shapes.makeBlock([1, 1, 1], [2, 2, 2]))));
    expect(measurement.volume?.content).toBe(26);
    expect(measurement.soundness.findings).toEqual([]);
  });

  it.each([
    ['a sheet closed on its other side', shapes.join(Float64Array.of(0, 0, 0, 1, 0, 0, 0.3, 1, 0.2), shapes.turn(Float64Array.of(0, 0, 0, 1, 0, 0, 0.3, 1, 0.2)))],
    ['a crumpled sheet closed on its other side', shapes.join(shapes.makeStar(7, () => 1).slice(0, 90), shapes.turn(shapes.makeStar(7, () => 1).slice(0, 90)))],
    ['a crumpled sheet closed on its other side in another order', shapes.join(sheet, reorder(shapes.turn(sheet)))],
    ['a ball and the same ball inside out beside it', shapes.join(shapes.makeBlock([0, 0, 0], [1, 2, 3]), shapes.turn(shapes.makeBlock([8, 0, 0], [9, 2, 3])))],
  ])('%s has no volume', (_name, corners) => {
    const measurement = measure(corners);
    expect(measurement.soundness).toMatchObject({ closed: true, oriented: true, outward: false, turned: false, defensible: false });
    expect(findings(measurement)).toMatchObject({ 'no-volume': 1 });
    expect(measurement.volume).toBeNull();
  });

  it('a body of 1e-14 of its box is a body, where its faces are that exact', () => {
    const sliver = shapes.makeBlock([0, 0, 0], [1, 1, 2 ** -46]);
    expect(measure(sliver).volume?.content).toBe(2 ** -46);
  });

  it('facets without area are counted, and the three corners of one may lie on a line', () => {
    const block = shapes.makeBlock([0, 0, 0], [1, 1, 1]);
    const collapsed = Float64Array.of(0, 0, 0, 0, 0, 0, 1, 1, 1);
    const found = measure(shapes.join(block, collapsed));
    expect(found.soundness).toMatchObject({ closed: true, oriented: true, degenerateFacets: 1, nonManifoldEdges: 0, defensible: true });
    expect(facetsOf(found, 'degenerate-facets')).toEqual([12]);

    // A pyramid one of whose edges has a corner in its middle on one side only, closed by a facet without area.
    const [a, b, c, top, middle] = [[0, 0, 0], [2, 0, 0], [0, 2, 0], [0, 0, 2], [1, 0, 0]] as const;
    const filled = measure(Float64Array.from([[a, c, b], [a, middle, top], [middle, b, top], [b, c, top], [c, a, top], [a, b, middle]].flat(2)));
    expect(filled.soundness).toMatchObject({ closed: true, oriented: true, degenerateFacets: 1, defensible: true });
    expect(filled.volume?.content).toBeCloseTo(8 / 6, 15);
  });

  it('stored normals that point inward are reported, but do not decide', () => {
    const bytes = writeBinaryStl(shapes.makeBlock([0, 0, 0], [1, 1, 1]));
    const view = new DataView(bytes.buffer);
    for (const index of [4, 9]) for (let k = 0; k < 3; k++) view.setFloat32(84 + 50 * index + 4 * k, -view.getFloat32(84 + 50 * index + 4 * k, true), true);
    expect(measureMesh(bytes).soundness.findings).toEqual([{ kind: 'contradicting-normals', count: 2, facets: [4, 9] }]);
  });

  it('at most twenty facets are named, the first of the file among them', () => {
    const open = shapes.join(...Array.from({ length: 30 }, (_, k) => Float64Array.of(k, 0, 0, k, 1, 0, k, 0, 1)));
    const measurement = measure(open);
    expect(findings(measurement)).toEqual({ 'boundary-edges': 90 });
    expect(facetsOf(measurement, 'boundary-edges')).toEqual(Array.from({ length: 20 }, (_, k) => k));
    expect(facetsOf(measure(shapes.join(...Array.from({ length: 30 }, () => Float64Array.of(0, 0, 0, 1, 0, 0, 0, 1, 0)))), 'duplicate-facets')).toEqual(Array.from({ length: 20 }, (_, k) => k + 1));
  });

  it('fans of thousands of facets about one corner are judged like others', () => {
    const cone = shapes.makeCone(5, 10, 20_000);
    expect(measureMesh(writeBinaryStl(cone)).soundness).toMatchObject({ defensible: true, duplicateFacets: 0 });
    const doubled = measureMesh(writeBinaryStl(shapes.join(cone, facet(cone, 777), shapes.turn(facet(cone, 30_000)))));
    expect(doubled.soundness).toMatchObject({ closed: false, boundaryEdges: 6, nonManifoldEdges: 6, duplicateFacets: 2 });
    expect(facetsOf(doubled, 'duplicate-facets')).toEqual([40_000, 40_001]);
  });
});
