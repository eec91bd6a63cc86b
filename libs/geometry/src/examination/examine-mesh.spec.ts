import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FindingKind } from '../measurement';
import { anyMesh } from '../testing/arbitrary-meshes';
import * as shapes from '../testing/shapes';
import type { Examination } from './examine-mesh';
import { countFindings, examineCorners } from './testing/examine-corners';
import { facet, without } from './testing/faulty-meshes';

const { join, makeBlock, move, turn } = shapes;
const facetsOf = (found: Examination, kind: FindingKind): number[] => found.soundness.findings.find((finding) => finding.kind === kind)?.facets ?? [];
const shellsOf = ({ shells }: Examination): string[] => shells.map(({ kind, turned, inside, volume }) => `${kind}${turned ? ' turned' : ''} ${volume?.content ?? 'without volume'}${inside === null ? '' : ` in ${inside}`}`);

/** A dented sheet of 150 facets, tilted so that no coordinate is a round number. */
const sheet = shapes.rotate(shapes.makeStar(20, (i, j) => 1 + 0.3 * Math.sin(3 * i + 5 * j)), shapes.makeRotation(0.3, 0.7, 1.1)).slice(0, 9 * 150);

/** The same facets from the last to the first, beginning with another corner each: a sum over them rounds otherwise. */
function reorder(corners: shapes.Corners): shapes.Corners {
  return join(...Array.from({ length: corners.length / 9 }, (_, k) => facet(corners, corners.length / 9 - 1 - k)).map((one, k) => join(one.slice(3 * (k % 3)), one.slice(0, 3 * (k % 3)))));
}

const cube = makeBlock([0, 0, 0], [1, 1, 1]);
const block = (from: number, to: number): shapes.Corners => makeBlock([from, from, from], [to, to, to]);

/** A sound mesh and one of its facets. */
const meshAndFacet = fc.tuple(anyMesh, fc.nat()).map(([corners, pick]) => ({ corners, index: pick % (corners.length / 9) }));

describe('the verdict on a closed mesh', () => {
  it('is clean for any dented ball', () => {
    fc.assert(
      fc.property(anyMesh, (corners) => {
        const found = examineCorners(corners);
        expect(found.soundness).toEqual({
          closed: true, oriented: true, outward: true, turned: false, boundaryEdges: 0, nonManifoldEdges: 0, nonManifoldVertices: 0, degenerateFacets: 0, duplicateFacets: 0,
          shells: 1, cavities: 0, selfIntersections: 0, defensible: true, findings: [],
        });
        expect(found).toMatchObject({ openings: null, turned: null, addedFacets: null });
      }),
    );
  });

  it('is turned for any ball inside out, with the same integrals', () => {
    fc.assert(
      fc.property(anyMesh, (corners) => {
        const found = examineCorners(turn(corners));
        expect(found.soundness).toMatchObject({ closed: true, oriented: true, outward: false, turned: true, defensible: true });
        expect(countFindings(found)).toEqual({ 'turned-whole': 1 });
        expect(found.turned?.every((turned) => turned === 1)).toBe(true);
        const upright = examineCorners(corners);
        expect(Math.abs((found.volume?.content ?? 0) / (upright.volume?.content ?? 1) - 1)).toBeLessThan(1e-14);
      }),
    );
  });
});

describe('a planted fault is found, whichever facet it befalls', () => {
  it('a facet flipped: closed, three unbalanced edges, no volume, and the facet is told', () => {
    fc.assert(
      fc.property(meshAndFacet, ({ corners, index }) => {
        const found = examineCorners(join(corners.slice(0, 9 * index), turn(facet(corners, index)), corners.slice(9 * index + 9)));
        expect(found.soundness).toMatchObject({ closed: true, oriented: false, turned: false, boundaryEdges: 0, defensible: false });
        expect(countFindings(found)).toEqual({ 'unbalanced-edges': 3, 'turned-facets': 1 });
        expect(facetsOf(found, 'turned-facets')).toEqual([index]);
        expect(found.volume).toBeNull();
        expect(shellsOf(found)).toEqual(['open without volume']);
      }),
    );
  });

  it('a pair of facets back to back: crowded edges, but still a volume', () => {
    fc.assert(
      fc.property(meshAndFacet, ({ corners, index }) => {
        const found = examineCorners(join(corners, facet(corners, index), turn(facet(corners, index))));
        expect(found.soundness).toMatchObject({ closed: true, oriented: true, nonManifoldEdges: 3, duplicateFacets: 2, defensible: true });
        expect(countFindings(found)).toEqual({ 'crowded-edges': 3, 'duplicate-facets': 2 });
        expect((found.volume?.content ?? NaN) / (examineCorners(corners).volume?.content ?? NaN)).toBeCloseTo(1, 12);
      }),
    );
  });
});

describe('edges, vertices and winding', () => {
  it('a tube without caps is open though its sides agree about any origin', () => {
    const tube = shapes.makeCylinder(2, 5, 16);
    const sides = Float64Array.from(Array.from({ length: tube.length / 9 }, (_, k) => facet(tube, k)).filter((corners) => new Set([corners[2], corners[5], corners[8]]).size > 1).flatMap((corners) => Array.from(corners)));
    const found = examineCorners(sides);
    expect(found.soundness).toMatchObject({ closed: false, oriented: false, outward: true, turned: false, boundaryEdges: 32, defensible: false });
    expect(found.openings?.loops.map(({ edges, centre: [, , z] }) => [edges, z])).toEqual([[16, 0], [16, 5]]);
    // The rim of a regular figure of 16 sides on a circle of radius 2.
    expect(found.openings?.loops[0]?.length).toBeCloseTo(64 * Math.sin(Math.PI / 16), 12);
    expect(found.openings?.loops[0]?.width).toBeGreaterThan(3.5);
    expect(found.openings?.volumes.fanned).toBeCloseTo(examineCorners(tube).volume?.content ?? NaN, 12);
    expect(found.openings?.lostVolume).toBeNull();
    expect(examineCorners(turn(sides)).soundness).toMatchObject({ outward: false, turned: false });
  });

  it('a Möbius strip can be wound no way: it has unbalanced edges and no turned facets', () => {
    const points = Array.from({ length: 8 }, (_, k) => {
      const angle = (2 * Math.PI * k) / 8, half = angle / 2;
      return [-0.3, 0.3].map((width): shapes.Point => [(1 + width * Math.cos(half)) * Math.cos(angle), (1 + width * Math.cos(half)) * Math.sin(angle), width * Math.sin(half)]);
    });
    const strip = Float64Array.from(points.flatMap(([a, b], k) => {
      const [c, d] = k === 7 ? [points[0]?.[1], points[0]?.[0]] : [points[k + 1]?.[0], points[k + 1]?.[1]];
      return [a, c, b, b, c, d].flatMap((point) => [...(point ?? [])]);
    }));
    expect(countFindings(examineCorners(strip))).toEqual({ 'boundary-edges': 16, 'unbalanced-edges': 1 });
  });

  it('facets turned against their neighbours are the fewer of a piece, also where the mesh is open', () => {
    const found = examineCorners(join(turn(cube.slice(9, 27)), cube.slice(27)));
    expect(countFindings(found)).toMatchObject({ 'turned-facets': 2, 'boundary-edges': 3 });
    expect(facetsOf(found, 'turned-facets')).toEqual([0, 1]);
  });

  it('a vertex where two cones meet is crowded, one at the end of an edge of four facets is not', () => {
    const tips = examineCorners(join(shapes.makeCone(1, 1, 7), shapes.transform(shapes.makeCone(1, 1, 7), ([x, y, z]) => [x, -y, 2 - z])));
    expect(tips.soundness).toMatchObject({ nonManifoldVertices: 1, nonManifoldEdges: 0, defensible: true });
    expect(tips.soundness.findings[0]?.lines).toEqual([[0, 0, 1, 0, 0, 1]]);
    const edge = examineCorners(join(cube, move(cube, [1, 1, 0])));
    expect(edge.soundness).toMatchObject({ nonManifoldVertices: 0, nonManifoldEdges: 1, defensible: true, shells: 2 });
    expect(edge.soundness.findings[0]?.lines).toEqual([[1, 1, 1, 1, 1, 0]]);
  });

  it('facets without area are told, and the three corners of one may lie on a line', () => {
    const found = examineCorners(join(cube, Float64Array.of(0, 0, 0, 0, 0, 0, 1, 1, 1)));
    expect(found.soundness).toMatchObject({ closed: true, oriented: true, degenerateFacets: 1, nonManifoldEdges: 0, shells: 1, defensible: true });
    expect(facetsOf(found, 'degenerate-facets')).toEqual([12]);

    // A pyramid one of whose edges has a corner in its middle on one side only, closed by a facet without area.
    const [a, b, c, top, middle] = [[0, 0, 0], [2, 0, 0], [0, 2, 0], [0, 0, 2], [1, 0, 0]] as const;
    const filled = examineCorners(Float64Array.from([[a, c, b], [a, middle, top], [middle, b, top], [b, c, top], [c, a, top], [a, b, middle]].flat(2)));
    expect(filled.soundness).toMatchObject({ closed: true, oriented: true, degenerateFacets: 1, selfIntersections: 0, shells: 1, defensible: true });
    expect(filled.volume?.content).toBeCloseTo(8 / 6, 15);
  });

  it('at most twenty facets and lines are named, the first of the file among them; all for a viewer', () => {
    const open = join(...Array.from({ length: 30 }, (_, k) => Float64Array.of(k, 0, 0, k, 1, 0, k, 0, 1)));
    const found = examineCorners(open);
    expect(countFindings(found)).toEqual({ 'boundary-edges': 90 });
    expect(facetsOf(found, 'boundary-edges')).toEqual(Array.from({ length: 20 }, (_, k) => k));
    expect(found.soundness.findings[0]?.lines).toHaveLength(20);
    expect(found.places('boundary-edges').facets).toHaveLength(30);
    expect(found.places('boundary-edges').lines).toHaveLength(90);
    expect(found.openings).toMatchObject({ loopCount: 30 });
    expect(found.openings?.loops).toHaveLength(20);
    expect(facetsOf(examineCorners(join(...Array.from({ length: 30 }, () => Float64Array.of(0, 0, 0, 1, 0, 0, 0, 1, 0)))), 'duplicate-facets')).toEqual(Array.from({ length: 20 }, (_, k) => k + 1));
  });

  it('fans of thousands of facets about one corner are judged like others', () => {
    const cone = shapes.makeCone(5, 10, 20_000);
    expect(examineCorners(shapes.makeCone(5, 10, 2000)).soundness).toMatchObject({ defensible: true, duplicateFacets: 0, selfIntersections: 0 });
    const doubled = examineCorners(join(cone, facet(cone, 777), turn(facet(cone, 30_000))), 1000);
    expect(doubled.soundness).toMatchObject({ closed: false, boundaryEdges: 6, nonManifoldEdges: 6, duplicateFacets: 2 });
    expect(facetsOf(doubled, 'duplicate-facets')).toEqual([40_000, 40_001]);
  });
});

describe('shells', () => {
  it.each([
    ['a block with a cavity', join(block(0, 3), turn(block(1, 2))), 26, ['solid 27', 'cavity -1 in 0'], {}],
    ['the same inside out', turn(join(block(0, 3), turn(block(1, 2)))), 26, ['solid turned 27', 'cavity turned -1 in 0'], { 'turned-whole': 1 }],
    ['a body loose in a cavity', join(block(0, 9), turn(block(1, 8)), block(2, 3)), 387, ['solid 729', 'cavity -343 in 0', 'detached 1 in 1'], {}],
    ['two bodies, the smaller inside out', join(block(0, 3), turn(block(4, 5))), 28, ['solid 27', 'detached turned 1'], { 'turned-shells': 1 }],
    ['two bodies, the larger inside out', join(turn(block(0, 3)), block(4, 5)), 28, ['solid turned 27', 'detached 1'], { 'turned-shells': 1 }],
    ['a cavity that touches the wall', join(block(0, 3), turn(makeBlock([0, 1, 1], [1, 2, 2]))), 26, ['solid 27', 'cavity -1 in 0'], {}],
    ['a cavity filled by a plug', join(block(0, 3), turn(block(1, 2)), block(1, 2)), 27, ['solid 27', 'cavity -1 in 0', 'detached 1 in 1'], { 'crowded-edges': 18, 'duplicate-facets': 12 }],
    ['two blocks that share a face', join(cube, move(cube, [1, 0, 0])), 2, ['solid 1', 'detached 1'], { 'crowded-edges': 5, 'duplicate-facets': 2 }],
    ['two blocks that share a face, one inside out', join(cube, turn(makeBlock([1, 0, 0], [3, 1, 1]))), 3, ['detached 1', 'solid turned 2'], { 'crowded-edges': 5, 'duplicate-facets': 2, 'turned-shells': 1 }],
    ['two blocks that share an edge, one inside out', join(cube, turn(makeBlock([1, 1, 0], [3, 2, 1]))), 3, ['detached 1', 'solid turned 2'], { 'crowded-edges': 1, 'turned-shells': 1 }],
    ['two blocks that share an edge, both inside out', turn(join(cube, makeBlock([1, 1, 0], [3, 2, 1]))), 3, ['detached turned 1', 'solid turned 2'], { 'crowded-edges': 1, 'turned-whole': 1 }],
    ['the two boxes of a housing, which touch in a part of a face', shapes.makeHousing(), 39_000, ['solid 24000', 'detached 15000'], { 'crowded-vertices': 1 }],
  ])('%s', (_name, corners, volume, shells, findings) => {
    const found = examineCorners(corners);
    expect(shellsOf(found)).toEqual(shells);
    expect(countFindings(found)).toEqual(findings);
    expect(found.volume?.content).toBeCloseTo(volume, 9);
    expect(found.soundness.cavities).toBe(shells.filter((shell) => shell.startsWith('cavity')).length);
  });

  it.each([
    ['a body within a body', join(block(0, 3), block(1, 2)), ['solid 27', 'overlapping 1 in 0'], { 'overlapping-shells': 1 }],
    ['a body within a body, touching its wall', join(block(0, 3), makeBlock([0, 1, 1], [1, 2, 2])), ['overlapping 27', 'overlapping 1 in 0'], { 'overlapping-shells': 2, 'self-intersections': 2 }],
    ['a beam through a block', join(block(0, 3), makeBlock([-1, 1, 1], [4, 2, 2])), ['overlapping 27', 'overlapping 5'], { 'overlapping-shells': 2, 'self-intersections': 16 }],
    ['a body twice', join(cube, cube), ['overlapping 1', 'overlapping 1 in 0'], { 'crowded-edges': 18, 'duplicate-facets': 12, 'overlapping-shells': 2 }],
    ['a hollow within a hollow', join(block(0, 9), turn(block(1, 8)), turn(block(2, 3))), ['solid 729', 'cavity -343 in 0', 'overlapping -1 in 1'], { 'overlapping-shells': 1 }],
    ['a ball whose equator lies in the top of a plate', join(shapes.makeSphere(1, 8), makeBlock([-3, -3, -3], [3, 3, 0])), undefined, { 'overlapping-shells': 2 }],
  ])('%s is not defensible', (_name, corners, shells, findings) => {
    const found = examineCorners(corners);
    if (shells !== undefined) expect(shellsOf(found)).toEqual(shells);
    expect(countFindings(found)).toEqual(findings);
    expect(found.soundness).toMatchObject({ closed: true, oriented: true, defensible: false });
    expect(found.volume).toBeNull();
  });

  it.each([
    ['a sheet closed on its other side', join(Float64Array.of(0, 0, 0, 1, 0, 0, 0.3, 1, 0.2), turn(Float64Array.of(0, 0, 0, 1, 0, 0, 0.3, 1, 0.2)))],
    ['a crumpled sheet closed on its other side', join(shapes.makeStar(7, () => 1).slice(0, 90), turn(shapes.makeStar(7, () => 1).slice(0, 90)))],
    ['a crumpled sheet closed on its other side in another order', join(sheet, reorder(turn(sheet)))],
  ])('%s has no volume', (_name, corners) => {
    const found = examineCorners(corners);
    expect(found.soundness).toMatchObject({ closed: true, oriented: true, outward: false, turned: false, defensible: false });
    expect(countFindings(found)).toMatchObject({ 'no-volume': 1 });
    expect(found.volume).toBeNull();
  });

  it('one open shell takes the figures of all, and leaves the closed ones theirs', () => {
    const found = examineCorners(join(without(block(0, 3), 5), block(4, 5)));
    expect(shellsOf(found)).toEqual(['open without volume', 'detached 1'].map((shell) => shell.replace('detached', 'solid')));
    expect(found.shells.map(({ facets, firstFacet, area }) => [facets, firstFacet, area])).toEqual([[11, 0, 49.5], [12, 11, 6]]);
    expect(found.soundness).toMatchObject({ closed: false, defensible: false, shells: 2 });
  });

  it('shells are listed up to two hundred, the largest, in the order of the file', () => {
    const found = examineCorners(join(...Array.from({ length: 250 }, (_, k) => move(shapes.stretch(cube, [1, 1, k === 3 ? 0.5 : 1 + k / 1000]), [2 * k, 0, 0]))));
    expect(found.soundness.shells).toBe(250);
    expect(found.shells).toHaveLength(200);
    expect(found.shells.map(({ firstFacet }) => firstFacet)).toEqual(Array.from({ length: 200 }, (_, k) => 12 * (k + 50)));
  });

  it('a hundred hollows one within the other alternate', () => {
    const found = examineCorners(join(...Array.from({ length: 100 }, (_, k) => (k % 2 === 0 ? block(k, 300 - k) : turn(block(k, 300 - k))))));
    expect(found.soundness).toMatchObject({ shells: 100, cavities: 50, defensible: true });
    expect(found.shells.map(({ inside }) => inside)).toEqual([null, ...Array.from({ length: 99 }, (_, k) => k)]);
  });
});

describe('self-intersections', () => {
  it('are told with their facets and where they meet, and leave the figures of a single shell', () => {
    // A prism over a bow: its sides pass through each other along one line.
    const [a, b, c, d] = [[0, 0], [4, 2], [4, 0], [0, 1]] as const;
    const corner = ([x, y]: readonly [number, number], z: number): shapes.Point => [x, y, z];
    const ring = [a, b, c, d] as const;
    const sides = ring.flatMap((p, k) => {
      const q = ring[(k + 1) % 4] ?? a;
      return [corner(p, 0), corner(q, 0), corner(q, 1), corner(p, 0), corner(q, 1), corner(p, 1)];
    });
    const caps = [corner(a, 1), corner(b, 1), corner(c, 1), corner(a, 1), corner(c, 1), corner(d, 1), corner(a, 0), corner(c, 0), corner(b, 0), corner(a, 0), corner(d, 0), corner(c, 0)];
    const found = examineCorners(Float64Array.from([...sides, ...caps].flat()));
    const finding = found.soundness.findings.find(({ kind }) => kind === 'self-intersections');
    expect(found.soundness).toMatchObject({ closed: true, oriented: true, shells: 1, defensible: true, selfIntersections: finding?.count });
    expect(finding?.facets).toEqual(expect.arrayContaining([0, 1, 4, 5]));
    // The lines y = x/2 and y = 1 - x/4 cross at x = 4/3.
    for (const [x0, y0, , x1, y1] of finding?.lines.filter(([x, y, , u, v]) => x === u && y === v) ?? []) expect([x0, y0, x1, y1].map((value) => value.toFixed(12))).toEqual([4 / 3, 2 / 3, 4 / 3, 2 / 3].map((value) => value.toFixed(12)));
  });

  it('are not examined beyond the limit, where shells are still held against each other', () => {
    const alone = examineCorners(cube, 11);
    expect(alone.soundness).toMatchObject({ selfIntersections: null, defensible: true, shells: 1 });
    const beam = join(shapes.makeSphere(1, 40), makeBlock([-2, -0.1, -0.1], [2, 0.1, 0.1]));
    const found = examineCorners(beam, 1000);
    expect(found.soundness).toMatchObject({ selfIntersections: null, defensible: false, shells: 2 });
    expect(countFindings(found)).toEqual({ 'overlapping-shells': 2 });
  });
});

describe('hairline gaps', () => {
  /** A ball whose corner at the top is another for one of the facets there. */
  const crack = (away: number): shapes.Corners => {
    const ball = shapes.makeSphere(1, 24);
    const at = ball.findIndex((coordinate, k) => k % 3 === 2 && coordinate === 1);
    return ball.map((coordinate, k) => (k === at ? coordinate + away : coordinate));
  };

  it('leave the mesh defensible with the loops fanned, and the bound holds', () => {
    const found = examineCorners(crack(1e-6));
    const whole = examineCorners(shapes.makeSphere(1, 24));
    expect(found.soundness).toMatchObject({ closed: false, oriented: false, boundaryEdges: 4, defensible: true, shells: 1 });
    expect(countFindings(found)).toEqual({ 'boundary-edges': 4, 'hairline-gaps': 1 });
    expect(found.addedFacets).toHaveLength(36);
    expect(found.openings?.loops[0]?.width).toBeGreaterThan(1e-7);
    expect(found.openings?.loops[0]?.width).toBeLessThan(1e-6);
    expect(Math.abs((found.volume?.content ?? NaN) - (whole.volume?.content ?? NaN))).toBeLessThan(found.openings?.lostVolume ?? 0);
    expect(found.openings?.lostVolume).toBeLessThan(1e-6);
    expect(shellsOf(found)).toEqual([`solid ${found.volume?.content}`]);
  });

  it('are read the other way round with the body that they are in', () => {
    const upright = examineCorners(crack(1e-6)), found = examineCorners(turn(crack(1e-6)));
    expect(countFindings(found)).toEqual({ 'boundary-edges': 4, 'hairline-gaps': 1, 'turned-whole': 1 });
    expect(found.soundness).toMatchObject({ outward: false, turned: true, defensible: true });
    expect((found.volume?.content ?? NaN) / (upright.volume?.content ?? NaN)).toBeCloseTo(1, 13);
    expect(Array.from(found.addedFacets ?? []).slice(0, 9)).not.toEqual(Array.from(upright.addedFacets ?? []).slice(0, 9));
  });

  it('are none where a gap is wider than a hundred-thousandth of the diagonal', () => {
    const found = examineCorners(crack(2e-3));
    expect(countFindings(found)).toEqual({ 'boundary-edges': 4 });
    expect(found.soundness.defensible).toBe(false);
    expect(found.openings?.lostVolume).toBeNull();
  });

  it('are told but not enough where the body is so thin that its volume may be lost', () => {
    const thin = shapes.stretch(crack(5e-6), [1, 1, 1e-6]);
    const leaf = thin.map((coordinate, k) => (k === 0 ? coordinate + 1e-5 : coordinate));
    const found = examineCorners(leaf);
    expect(found.soundness.defensible).toBe(false);
    expect(countFindings(found)).toMatchObject({ 'hairline-gaps': 2 });
    expect(found.openings?.lostVolume).toBeGreaterThan(1e-4 * Math.abs(found.openings?.volumes.fanned ?? 0));
  });

  it('two pieces that were not joined are one shell, closed along the seam', () => {
    const tube = shapes.makeCylinder(2, 5, 16);
    const found = examineCorners(tube.map((coordinate, k) => (k < 9 * 16 && k % 3 !== 2 ? coordinate + 1e-9 : coordinate)));
    expect(countFindings(found)).toEqual({ 'boundary-edges': 32, 'hairline-gaps': 2 });
    expect(found.soundness).toMatchObject({ shells: 1, defensible: true });
    expect(found.volume?.content).toBeCloseTo(examineCorners(tube).volume?.content ?? NaN, 7);
  });
});
