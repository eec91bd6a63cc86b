import { expect } from 'vitest';
import * as shapes from '../../testing/shapes';
import type { Corners, Point } from '../../testing/shapes';
import type { Draw } from '../../testing/draw';
import { countFindings, examineCorners } from './examine-corners';
import { countCrossings, countFacets, drawBall, drawPlace, expectNone, expectVolume, volumeOf, type FaultyMesh } from './faulty-meshes';

/** Two bodies beside each other, of which one is inside out. */
function turnedShell(draw: Draw): FaultyMesh {
  const one = drawBall(draw, draw.whole(4, 8)), two = shapes.move(shapes.stretch(drawBall(draw, draw.whole(4, 8)), [0.5, 0.5, 0.5]), [2, draw.between(-1, 1), 0]);
  const isFirst = draw.next() < 0.5;
  const corners = drawPlace(draw, shapes.join(isFirst ? shapes.turn(one) : one, isFirst ? two : shapes.turn(two)));
  const split = one.length;
  return {
    corners,
    check(found) {
      expectVolume(found, Math.abs(volumeOf(corners.slice(0, split))) + Math.abs(volumeOf(corners.slice(split))), { 'turned-shells': 1 });
      expect(found.shells.map(({ kind, turned }) => `${kind} ${turned}`)).toEqual([`solid ${isFirst}`, `detached ${!isFirst}`]);
    },
  };
}

function crossingShells(draw: Draw): FaultyMesh {
  const one = drawBall(draw, draw.whole(6, 9)), two = shapes.move(drawBall(draw, draw.whole(6, 9)), [0.8, draw.between(-0.6, 0.6), 0]);
  const corners = drawPlace(draw, shapes.join(one, two));
  return {
    corners,
    check(found) {
      const count = countCrossings(corners);
      expect(count).toBeGreaterThan(0);
      expectNone(found, { 'overlapping-shells': 2, 'self-intersections': count });
      expect(found.shells.map(({ kind }) => kind)).toEqual(['overlapping', 'overlapping']);
    },
  };
}

/** A small ball within a large one: a cavity, or a body too many; or a body loose in a cavity. */
function nestedShells(draw: Draw): FaultyMesh {
  const outer = drawBall(draw, draw.whole(6, 9));
  const away: Point = [draw.between(-0.1, 0.1), draw.between(-0.1, 0.1), 0];
  const shrink = (share: number): Corners => shapes.move(shapes.stretch(drawBall(draw, draw.whole(4, 8)), [share, share, share]), away);
  const kind = draw.pick(['cavity', 'overlapping', 'loose'] as const);
  const parts = kind === 'cavity' ? [outer, shapes.turn(shrink(0.2))] : kind === 'overlapping' ? [outer, shrink(0.2)] : [outer, shapes.turn(shrink(0.3)), shrink(0.05)];
  const isTurned = draw.next() < 0.3 && kind !== 'overlapping';
  const placed = drawPlace(draw, shapes.join(...parts));
  return {
    corners: isTurned ? shapes.turn(placed) : placed,
    check(found) {
      if (kind === 'overlapping') return expectNone(found, { 'overlapping-shells': 1 });
      expectVolume(found, volumeOf(placed), isTurned ? { 'turned-whole': 1 } : {});
      expect(found.soundness).toMatchObject({ shells: parts.length, cavities: 1 });
      expect(found.shells.map(({ kind: one, inside }) => `${one} ${inside}`)).toEqual(['solid null', 'cavity 0', 'detached 1'].slice(0, parts.length));
    },
  };
}

/** Two cones tip to tip. */
function sharedTip(draw: Draw): FaultyMesh {
  const cone = shapes.makeCone(draw.between(0.3, 1), 1, draw.whole(3, 12));
  const corners = drawPlace(draw, shapes.join(cone, shapes.transform(cone, ([x, y, z]): Point => [x, -y, 2 - z])));
  return {
    corners,
    check(found) {
      expectVolume(found, volumeOf(corners), { 'crowded-vertices': 1 });
      expect(found.soundness).toMatchObject({ shells: 2, nonManifoldVertices: 1, selfIntersections: 0 });
    },
  };
}

/** Two blocks that touch in a part of a face, of an edge or in a corner, and are as sound as two that don't. */
function touchingBlocks(draw: Draw): FaultyMesh {
  const size = (): number => draw.whole(1, 4);
  const [x, y, z] = [size(), size(), size()];
  const shift = (): number => draw.whole(-1, 1) / 2;
  const from: Point = draw.pick([[x, shift(), shift()], [x, y, shift()], [x, y, z]]);
  const corners = shapes.join(shapes.makeBlock([0, 0, 0], [x, y, z]), shapes.makeBlock(from, [from[0] + size(), from[1] + size(), from[2] + size()]));
  const placed = shapes.move(corners, [draw.whole(-5, 5), draw.whole(-5, 5), draw.whole(-5, 5)]);
  return {
    corners: placed,
    check(found) {
      expect(found.soundness).toMatchObject({ closed: true, oriented: true, defensible: true, shells: 2, selfIntersections: 0 });
      expect(countFindings(found)).not.toHaveProperty('overlapping-shells');
      expect(found.volume?.content).toBeCloseTo(volumeOf(corners), 9);
    },
  };
}


/** A body whose widest run of edges lies in the top of a plate, so that no facet passes through another though the bodies do. */
function crossingAlongEdges(draw: Draw): FaultyMesh {
  const segments = 4 * draw.whole(1, 3);
  const ball = shapes.makeStar(segments, (i) => 1 + 0.1 * i);
  // Rings of vertices stand at angles from pole to pole; that in the middle at height 0 exactly.
  const level = shapes.transform(ball, ([x, y, z]): Point => [x, y, Math.abs(z) < 1e-9 ? 0 : z]);
  const turnedOver = draw.next() < 0.5 ? 1 : -1;
  const plate = shapes.makeBlock([-9, -9, -9], [9, 9, 0]);
  const corners = shapes.join(turnedOver > 0 ? level : shapes.transform(level, ([x, y, z]): Point => [x, -y, -z]), plate);
  return {
    corners,
    check(found) {
      expect(countCrossings(corners)).toBe(0);
      expectNone(found, { 'overlapping-shells': 2 });
    },
  };
}

type Cell = readonly [number, number, number];

/** Some cells of a grid of four by four by four. */
function drawCells(draw: Draw): Cell[] {
  const share = draw.between(0.1, 0.95);
  const all = Array.from({ length: 64 }, (_, k): Cell => [k % 4, Math.floor(k / 4) % 4, Math.floor(k / 16)]);
  const cells = all.filter(() => draw.next() < share);
  return cells.length > 0 ? cells : all.slice(0, 1);
}

/** Cubes on a grid, each with a surface of its own: they touch in faces, edges and corners and nowhere overlap. */
function stackedCubes(draw: Draw): FaultyMesh {
  const cells = drawCells(draw).slice(0, 12);
  const cubes = cells.map(([x, y, z]) => shapes.makeBlock([x, y, z], [x + 1, y + 1, z + 1]));
  const areTurned = cells.map(() => draw.next() < 0.3);
  const corners = shapes.join(...cubes.map((cube, k) => (areTurned[k] ? shapes.turn(cube) : cube)));
  const turned = areTurned.filter(Boolean).length;
  return {
    corners,
    check(found) {
      expect(found.soundness).toMatchObject({ closed: true, oriented: true, selfIntersections: 0 });
      // Where several are inside out, a face that two share can belong to either: then nothing is claimed, or the same volume of other pieces.
      const isAmbiguous = turned > 1 && turned < cells.length;
      if (isAmbiguous && !found.soundness.defensible) return;
      expect(found.soundness.defensible).toBe(true);
      expect(found.volume?.content).toBeCloseTo(cells.length, 9);
      if (isAmbiguous) return;
      expect(found.soundness).toMatchObject({ shells: cells.length, cavities: 0, turned: turned > 0 });
      // Which of two facets with the same corners belongs to which cube nothing tells, so neither does the order of the shells.
      expect(found.shells.filter((shell) => shell.turned)).toHaveLength(turned);
      expect(countFindings(found)['turned-whole']).toBe(turned === cells.length ? 1 : undefined);
    },
  };
}

/** The surface of cubes on a grid as one: edges of four facets, corners of several fans, hollows that touch others and the outside. */
function cubeSurface(draw: Draw): FaultyMesh {
  const cells = drawCells(draw);
  const isFilled = new Set(cells.map(String));
  const corners = shapes.join(
    ...cells.flatMap(([x, y, z]) => {
      const cube = shapes.makeBlock([x, y, z], [x + 1, y + 1, z + 1]);
      // Two facets a side, in the order in which makeBlock has them.
      const sides: Cell[] = [[0, 0, -1], [0, 0, 1], [0, -1, 0], [0, 1, 0], [-1, 0, 0], [1, 0, 0]];
      return sides.flatMap(([dx, dy, dz], side) => (isFilled.has(String([x + dx, y + dy, z + dz])) ? [] : [cube.slice(18 * side, 18 * side + 18)]));
    }),
  );
  const isTurned = draw.next() < 0.3;
  return {
    corners: isTurned ? shapes.turn(corners) : corners,
    check(found) {
      expect(found.soundness).toMatchObject({ closed: true, oriented: true, defensible: true, turned: isTurned, selfIntersections: 0, duplicateFacets: 0 });
      expect(found.volume?.content).toBeCloseTo(cells.length, 9);
      expect(found.shells.reduce((sum, { volume }) => sum + (volume?.content ?? NaN), 0)).toBeCloseTo(cells.length, 9);
      expect(found.shells.every(({ kind, volume }) => kind === 'cavity' === (volume?.content ?? 0) < 0)).toBe(true);
    },
  };
}

/** Bodies through each other, and one within another, in a mesh that is too large to be searched for self-intersections. */
function beyondLimit(draw: Draw): FaultyMesh {
  const mesh = draw.next() < 0.5 ? crossingShells(draw) : nestedShells(draw);
  return {
    corners: mesh.corners,
    limit: countFacets(mesh.corners) - 1,
    check(found) {
      expect(found.soundness.selfIntersections).toBeNull();
      const whole = examineCorners(mesh.corners);
      expect(found.soundness.defensible).toBe(whole.soundness.defensible);
      expect(found.shells).toEqual(whole.shells);
    },
  };
}

/** What is made of several bodies, by the words that name it. */
export const plantedShells: readonly (readonly [string, (draw: Draw) => FaultyMesh])[] = [
  ['one of two bodies inside out', turnedShell],
  ['two bodies through each other', crossingShells],
  ['two bodies through each other along their edges', crossingAlongEdges],
  ['a body within another', nestedShells],
  ['bodies in a mesh beyond the limit', beyondLimit],
  ['two cones tip to tip', sharedTip],
  ['blocks that touch', touchingBlocks],
  ['cubes side by side', stackedCubes],
  ['the surface of cubes side by side', cubeSurface],
];
