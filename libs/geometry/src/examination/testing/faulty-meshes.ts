import { expect } from 'vitest';
import * as shapes from '../../testing/shapes';
import type { Corners, Point } from '../../testing/shapes';
import { integrateBody } from '../../integrate-body';
import type { Examination } from '../examine-mesh';
import { relateFacets } from '../relate-facets';
import type { Draw } from '../../testing/draw';
import { countFindings, weldFacets } from './examine-corners';

/** A mesh with a fault, or with something that looks like one, and what must be said of it. */
export interface FaultyMesh {
  corners: Corners;
  /** Facets up to which all are held against all, where that isn't the usual number. */
  limit?: number;
  check(found: Examination): void;
}

export const facet = (corners: Corners, index: number): Corners => corners.slice(9 * index, 9 * index + 9);
export const without = (corners: Corners, index: number): Corners => shapes.join(corners.slice(0, 9 * index), corners.slice(9 * index + 9));
export const countFacets = (corners: Corners): number => corners.length / 9;

/** A closed body of one shell, without any fault, about as large as the unit ball. */
export function drawBody(draw: Draw): Corners {
  const makers: (() => Corners)[] = [
    () => drawBall(draw, draw.whole(4, 10)),
    () => shapes.makeBlock([-draw.between(0.2, 1), -draw.between(0.2, 1), -draw.between(0.2, 1)], [draw.between(0.2, 1), draw.between(0.2, 1), draw.between(0.2, 1)]),
    () => shapes.makeTorus(draw.between(0.6, 0.8), draw.between(0.1, 0.3), draw.whole(4, 9)),
    () => shapes.makeTetrahedron([-1, -1, draw.between(-1, 0)], [1, -1, 0], [0, 1, 0], [0, 0, -draw.between(1.1, 2)]),
    () => shapes.makeTube(draw.between(0.6, 1), draw.between(0.1, 0.5), draw.between(0.1, 2), draw.whole(3, 12)),
  ];
  return drawPlace(draw, draw.pick(makers)());
}

/** A dented ball: each corner at a distance of .8 to 1.2 from the middle. */
export function drawBall(draw: Draw, segments: number): Corners {
  const radii = Array.from({ length: 200 }, () => draw.between(0.8, 1.2));
  return shapes.makeStar(segments, (i, j) => radii[(13 * i + j) % radii.length] ?? 1);
}

/** Turned, scaled and moved: half of them as a file of binary32 would have it. */
export function drawPlace(draw: Draw, corners: Corners): Corners {
  const scale = 10 ** draw.whole(-3, 3);
  const turned = draw.next() < 0.3 ? corners : shapes.rotate(corners, shapes.makeRotation(draw.between(0, 6), draw.between(0, 6), draw.between(0, 6)));
  const away: Point = [draw.between(-30, 30) * scale, draw.between(-30, 30) * scale, draw.between(-30, 30) * scale];
  const placed = shapes.move(shapes.stretch(turned, [scale, scale, scale]), draw.next() < 0.5 ? [0, 0, 0] : away);
  return draw.next() < 0.5 ? shapes.roundToBinary32(placed) : placed;
}

export const volumeOf = (corners: Corners): number => integrateBody(weldFacets(corners), [corners[0] ?? 0, corners[1] ?? 0, corners[2] ?? 0], 1).volume.content;

/** What is said of a mesh that has a volume. */
export function expectVolume(found: Examination, volume: number, findings: Partial<Record<string, number>>, tolerance = 1e-9): void {
  expect(countFindings(found)).toEqual(findings);
  expect(found.soundness.defensible).toBe(true);
  expect(Math.abs((found.volume?.content ?? NaN) / volume - 1)).toBeLessThan(tolerance);
}

export function expectNone(found: Examination, findings: Partial<Record<string, number>>): void {
  expect(countFindings(found)).toEqual(findings);
  expect(found.soundness.defensible).toBe(false);
  expect(found.volume).toBeNull();
}

/** How many facets pass through each other, each held against each. */
export function countCrossings(corners: Corners): number {
  const mesh = weldFacets(corners);
  let count = 0;
  for (let one = 0; one < mesh.facetCount; one++) {
    for (let two = one + 1; two < mesh.facetCount; two++) {
      const relation = relateFacets(mesh, one, two);
      if (relation === 'crossing' || relation === 'upon') count += 1;
    }
  }
  return count;
}

/** The size of the box, along its diagonal. */
export function findDiagonal(corners: Corners): number {
  const extent = (axis: number): number => {
    const all = corners.filter((_, k) => k % 3 === axis);
    return Math.max(...all) - Math.min(...all);
  };
  return Math.hypot(extent(0), extent(1), extent(2));
}
