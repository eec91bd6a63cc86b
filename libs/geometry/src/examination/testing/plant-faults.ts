import { expect } from 'vitest';
import * as shapes from '../../testing/shapes';
import type { Corners, Point } from '../../testing/shapes';
import type { Draw } from '../../testing/draw';
import { countFindings } from './examine-corners';
import { countCrossings, countFacets, drawBall, drawBody, drawPlace, expectNone, expectVolume, facet, findDiagonal, without, volumeOf, type FaultyMesh } from './faulty-meshes';

const sound: (draw: Draw) => FaultyMesh = (draw) => {
  const corners = drawBody(draw);
  return {
    corners,
    check(found) {
      expectVolume(found, volumeOf(corners), {});
      expect(found.soundness).toMatchObject({ closed: true, oriented: true, outward: true, turned: false, shells: 1, cavities: 0, selfIntersections: 0 });
    },
  };
};

function missingFacet(draw: Draw): FaultyMesh {
  const body = drawBody(draw);
  const corners = without(body, draw.whole(0, countFacets(body) - 1));
  return {
    corners,
    check(found) {
      expectNone(found, { 'boundary-edges': 3 });
      expect(found.soundness).toMatchObject({ closed: false, oriented: false });
      expect(found.openings?.loops.map(({ edges }) => edges)).toEqual([3]);
      expect(Math.abs((found.openings?.volumes.fanned ?? NaN) / volumeOf(body) - 1)).toBeLessThan(1e-9);
    },
  };
}

function turnedFacet(draw: Draw): FaultyMesh {
  const body = drawBody(draw);
  const index = draw.whole(0, countFacets(body) - 1);
  return {
    corners: shapes.join(body.slice(0, 9 * index), shapes.turn(facet(body, index)), body.slice(9 * index + 9)),
    check(found) {
      expectNone(found, { 'unbalanced-edges': 3, 'turned-facets': 1 });
      expect(found.soundness).toMatchObject({ closed: true, oriented: false, turned: false });
      expect(found.places('turned-facets').facets).toEqual([index]);
    },
  };
}

function turnedWhole(draw: Draw): FaultyMesh {
  const body = drawBody(draw);
  return {
    corners: shapes.turn(body),
    check(found) {
      expectVolume(found, volumeOf(body), { 'turned-whole': 1 });
      expect(found.soundness).toMatchObject({ outward: false, turned: true });
    },
  };
}

function doubledFacet(draw: Draw): FaultyMesh {
  const body = drawBody(draw);
  const index = draw.whole(0, countFacets(body) - 1);
  return {
    corners: shapes.join(body, facet(body, index)),
    check(found) {
      expectNone(found, { 'boundary-edges': 3, 'crowded-edges': 3, 'duplicate-facets': 1 });
      expect(found.places('duplicate-facets').facets).toEqual([countFacets(body)]);
    },
  };
}

/** One corner of one facet is the neighbouring number of what it was. */
function oneUlpGap(draw: Draw): FaultyMesh {
  const body = drawBody(draw);
  const corners = body.slice();
  const at = draw.whole(0, corners.length - 1);
  const bits = new BigUint64Array(corners.buffer);
  // A coordinate of zero would move by far less than a rounding: it is left, and the mesh is sound.
  if (Math.abs(corners[at] ?? 0) > 1e-12 * findDiagonal(corners)) bits[at] = (bits[at] ?? 0n) ^ 1n;
  const moved = corners[at] !== body[at];
  return {
    corners,
    check(found) {
      const { 'self-intersections': crossings = 0, ...others } = countFindings(found);
      expect(others).toEqual(moved ? { 'boundary-edges': 4, 'hairline-gaps': 1 } : {});
      expect(crossings).toBe(countCrossings(corners));
      expect(found.soundness).toMatchObject({ closed: !moved, defensible: true });
      expect(Math.abs((found.volume?.content ?? NaN) - volumeOf(body))).toBeLessThan((found.openings?.lostVolume ?? 0) + 1e-12 * volumeOf(body));
    },
  };
}

/** Some facets at a corner share another corner, a little farther out. */
function crack(draw: Draw): FaultyMesh {
  const body = drawPlace(draw, drawBall(draw, draw.whole(5, 9)));
  const isHairline = draw.next() < 0.6;
  const corners = body.slice();
  const index = draw.whole(0, countFacets(body) - 1);
  const middle = findMiddle(body);
  const corner = body.slice(9 * index, 9 * index + 3);
  const share = isHairline ? draw.between(1e-9, 4e-6) : draw.between(2e-3, 2e-2);
  for (let k = 0; k < 3; k++) corners[9 * index + k] = (corner[k] ?? 0) + share * ((corner[k] ?? 0) - (middle[k] ?? 0));
  return {
    corners,
    check(found) {
      const { 'self-intersections': crossings = 0, ...others } = countFindings(found);
      expect(others).toEqual(isHairline ? { 'boundary-edges': 4, 'hairline-gaps': 1 } : { 'boundary-edges': 4 });
      expect(crossings).toBe(countCrossings(corners));
      expect(found.soundness).toMatchObject({ closed: false, defensible: isHairline });
      if (isHairline) expect(Math.abs((found.volume?.content ?? NaN) - volumeOf(body))).toBeLessThan(found.openings?.lostVolume ?? 0);
    },
  };
}

/** A body in two pieces that were not joined: a gap all around, which no piece closes by itself. */
function seam(draw: Draw): FaultyMesh {
  const segments = draw.whole(4, 9);
  const body = drawBall(draw, segments);
  const isHairline = draw.next() < 0.6;
  const split = 9 * segments * (2 * Math.max(1, Math.floor(segments / 4)) - 1);
  const away = isHairline ? draw.between(1e-9, 5e-6) : draw.between(1e-3, 1e-1);
  const corners = shapes.join(body.slice(0, split), shapes.move(body.slice(split), [0, 0, away]));
  return {
    corners,
    check(found) {
      if (!isHairline) return expectNone(found, { 'boundary-edges': 2 * segments });
      expectVolume(found, volumeOf(body), { 'boundary-edges': 2 * segments, 'hairline-gaps': 2 }, 1e-4);
      expect(found.shells.map(({ kind }) => kind)).toEqual(['solid']);
      expect(Math.abs((found.volume?.content ?? NaN) - volumeOf(body))).toBeLessThan(found.openings?.lostVolume ?? 0);
    },
  };
}

/** A corner in the middle of an edge, on one side only. */
function cornerOnEdge(draw: Draw): FaultyMesh {
  const body = drawPlace(draw, drawBall(draw, draw.whole(4, 9)));
  const index = draw.whole(0, countFacets(body) - 1);
  const [a, b, c] = [0, 3, 6].map((k) => Array.from(body.subarray(9 * index + k, 9 * index + k + 3))) as [number[], number[], number[]];
  const share = draw.between(0.1, 0.9);
  const middle = a.map((coordinate, k) => coordinate + share * ((b[k] ?? 0) - coordinate));
  const corners = shapes.join(without(body, index), Float64Array.from([a, middle, c, middle, b, c].flat()));
  return {
    corners,
    check(found) {
      const { 'self-intersections': crossings = 0, ...others } = countFindings(found);
      expect(others).toEqual({ 'boundary-edges': 3, 'hairline-gaps': 1 });
      expect(crossings).toBe(countCrossings(corners));
      expect(Math.abs((found.volume?.content ?? NaN) / volumeOf(body) - 1)).toBeLessThan(1e-9);
    },
  };
}

/** A corner is drawn through the body and out at its other side. */
function selfCrossing(draw: Draw): FaultyMesh {
  const body = drawBall(draw, draw.whole(8, 10));
  const at = 9 * draw.whole(0, countFacets(body) - 1);
  const corner: Point = [body[at] ?? 0, body[at + 1] ?? 0, body[at + 2] ?? 0];
  const corners = drawPlace(draw, shapes.transform(body, (point) => (point.every((coordinate, k) => coordinate === corner[k]) ? [-2 * corner[0], -2 * corner[1], -2 * corner[2]] : point)));
  return {
    corners,
    check(found) {
      const count = countCrossings(corners);
      expect(count).toBeGreaterThan(0);
      expect(countFindings(found)).toMatchObject({ 'self-intersections': count });
      expect(found.soundness).toMatchObject({ closed: true, oriented: true, shells: 1, selfIntersections: count });
    },
  };
}

function findMiddle(corners: Corners): number[] {
  return [0, 1, 2].map((axis) => corners.filter((_, k) => k % 3 === axis).reduce((sum, coordinate) => sum + coordinate, 0) / (corners.length / 3));
}

/** What is made of one body, by the words that name it; sound ones come as often as five faulty ones. */
export const plantedFaults: readonly (readonly [string, (draw: Draw) => FaultyMesh])[] = [
  ...Array.from({ length: 5 }, () => ['a sound body', sound] as const),
  ['a facet missing', missingFacet],
  ['a facet turned', turnedFacet],
  ['a body inside out', turnedWhole],
  ['a facet twice', doubledFacet],
  ['a gap of one unit in the last place', oneUlpGap],
  ['a crack', crack],
  ['a seam', seam],
  ['a corner on an edge', cornerOnEdge],
  ['a body through itself', selfCrossing],
];
