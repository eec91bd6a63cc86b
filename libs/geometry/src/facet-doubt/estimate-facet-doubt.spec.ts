import { describe, expect, it } from 'vitest';
import * as shapes from '../testing/shapes';
import { comparePrediction, estimate, weld } from './testing/compare-prediction';
import { estimateFacetDoubt } from './estimate-facet-doubt';
import { ballCorners, icosahedralCorners, makeEllipsoid } from './testing/smooth-balls';
import { arc, line } from './testing/smooth-curves';
import { drawUpConvex, makePlate, turnProfile } from './testing/smooth-grids';
import { createDraw } from '../testing/draw';
import type { SmoothBody } from './testing/smooth-truth';

const turn = 2 * Math.PI, quarter = Math.PI / 2;
const tilt = shapes.makeRotation(0.4, 1.2, 2.3);

const slot = (half: number, n: number): SmoothBody =>
  drawUpConvex([arc([half, 0], [1, 1], -quarter, quarter, n / 2), line([half, 1], [-half, 1]), arc([-half, 0], [1, 1], quarter, 3 * quarter, n / 2), line([-half, -1], [half, -1])], 0.7, 1);

const bodies: Record<string, (segments: number) => SmoothBody> = {
  sphere: (n) => makeEllipsoid([1, 1, 1], ballCorners(n, n / 2)),
  torus: (n) => turnProfile([arc([5, 0], [1, 1], 0, turn, n)], n),
  'fat torus': (n) => turnProfile([arc([1, 0], [0.6, 0.6], 0, turn, n)], n),
  cylinder: (n) => turnProfile([line([0, 0], [1, 0]), line([1, 0], [1, 2]), line([1, 2], [0, 2])], n),
  'holed bracket': (n) => makePlate([0.5, 0.3], 0.4, n),
  cone: (n) => turnProfile([line([0, 0], [1, 0]), line([1, 0], [0, 2])], n),
  'flat cone': (n) => turnProfile([line([0, 0], [1, 0]), line([1, 0], [0, 0.3])], n),
  'ellipsoid 1:2:5': (n) => makeEllipsoid([1, 2, 5], ballCorners(n, n / 2)),
  'slot with flats tangent to arcs': (n) => slot(2, n),
  'long slot': (n) => slot(10, n),
};

describe('the predicted change from a mesh to the smooth body behind it', () => {
  it.each(Object.keys(bodies).flatMap((name) => [24, 32, 48, 96, 160, 256].map((n): [string, number] => [name, n])))('%s of %d segments: between .9 and 1.15 of the true one wherever that exceeds 1e-6 of the natural scale', (name, segments) => {
    const judged = comparePrediction(bodies[name]?.(segments) ?? slot(1, 24)).filter((figure) => Math.abs(figure.actual) > 1e-6 * figure.naturalScale);
    expect(judged.length).toBeGreaterThanOrEqual(2);
    for (const { name: figure, predicted, actual } of judged) expect(predicted / actual, figure).toSatisfy((ratio: number) => ratio >= 0.9 && ratio <= 1.15);
  });

  it('of blocks it is exactly 0, wherever they stand and whatever digits they have', () => {
    const nothing = { content: 0, first: [0, 0, 0], second: { xx: 0, yy: 0, zz: 0, xy: 0, yz: 0, zx: 0 } };
    const block = shapes.makeBlock([1, 2, 3], [40, 5, 3.7]);
    const plates = [block, shapes.rotate(block, tilt), shapes.roundToBinary32(shapes.rotate(block, tilt)), shapes.roundToBinary32(shapes.move(shapes.rotate(block, tilt), [900, -70, 8])), shapes.makeHousing(), shapes.makePyramid(3, 4, 5)];
    for (const corners of plates) {
      const { doubt } = estimate(corners);
      expect(doubt.body.correction).toEqual(nothing);
      expect(doubt.area).toEqual({ correction: 0, spread: [0, 0, 0, 0] });
      for (const change of doubt.body.spread) expect(change).toEqual(nothing);
    }
  });

  it('corners of more than 35° are corners, and turns of less are curves', () => {
    const prism = (sides: number): shapes.Corners => shapes.makePrism(Array.from({ length: sides }, (_, k) => [Math.cos((turn * k) / sides), Math.sin((turn * k) / sides)] as const), 0, 1);
    expect(estimate(prism(10)).doubt.body.correction.content).toBe(0);
    const missing = Math.PI - 0.5 * 12 * Math.sin(turn / 12);
    expect(estimate(prism(12)).doubt.body.correction.content / missing).toBeCloseTo(1, 1);
  });

  it('a mesh read the other way round, as a whole or facet by facet, gets the same', () => {
    const corners = shapes.makeTorus(3, 1, 32);
    const { doubt } = estimate(corners);
    const turned = weld(shapes.turn(corners));
    const options = { origin: [corners[0] ?? 0, corners[1] ?? 0, corners[2] ?? 0] as [number, number, number], centreFromOrigin: [-(corners[0] ?? 0), 0, 0] as [number, number, number] };
    const all = new Uint8Array(turned.facetCount).fill(1);
    for (const given of [{ sign: -1 as const }, { sign: 1 as const, turned: all }]) {
      const other = estimateFacetDoubt(turned, { ...options, ...given });
      expect(other.body.correction.content / doubt.body.correction.content).toBeCloseTo(1, 12);
      expect(other.area.correction / doubt.area.correction).toBeCloseTo(1, 12);
      expect(other.body.correction.second.zz / doubt.body.correction.second.zz).toBeCloseTo(1, 12);
    }
    const cavity = estimate(shapes.join(shapes.makeSphere(3, 48), shapes.turn(shapes.makeSphere(1, 48)))).doubt.body.correction.content;
    const [outer, inner] = [estimate(shapes.makeSphere(3, 48)), estimate(shapes.makeSphere(1, 48))].map(({ doubt: { body } }) => body.correction.content);
    expect(cavity).toBeCloseTo((outer ?? NaN) - (inner ?? NaN), 10);
  });

  it('does not depend on the place, and grows with the cube and the fifth power of the size', () => {
    const corners = (): shapes.Corners => shapes.rotate(shapes.makeHemisphere(2, 32), tilt);
    const near = estimate(corners()).doubt.body.correction;
    const far = estimate(shapes.move(corners(), [16, -8, 4])).doubt.body.correction;
    expect(far.content / near.content).toBeCloseTo(1, 6);
    const large = estimate(shapes.stretch(corners(), [8, 8, 8])).doubt.body.correction;
    expect(large.content / near.content).toBeCloseTo(512, 8);
    expect(large.second.zz / near.second.zz).toBeCloseTo(32768, 6);
  });

  it('a sphere without order in its facets is predicted as well as one of meridians', () => {
    for (const corners of [icosahedralCorners(8), ballCorners(64, 32, 0.2, createDraw(7).next)]) {
      const [volume, area] = comparePrediction(makeEllipsoid([1, 1, 1], corners));
      for (const figure of [volume, area]) expect((figure?.predicted ?? NaN) / (figure?.actual ?? NaN)).toSatisfy((ratio: number) => ratio >= 0.9 && ratio <= 1.15);
    }
  });

  it('facets without area, an edge of four facets and a vertex of two fans are borne', () => {
    const sphere = shapes.makeSphere(1, 24);
    const sliver = Float64Array.of(5, 5, 5, 6, 6, 6, 5, 5, 5);
    expect(estimate(shapes.join(sphere, sliver)).doubt.body.correction.content).toBeCloseTo(estimate(sphere).doubt.body.correction.content, 14);
    const blocks = shapes.join(shapes.makeBlock([0, 0, 0], [1, 1, 1]), shapes.makeBlock([1, 1, 0], [2, 2, 1]), shapes.makeBlock([-1, -1, -1], [0, 0, 0]));
    expect(estimate(blocks).doubt.body.correction.content).toBe(0);
  });

  it('facets without width between others change nothing: a corner stays a corner, and a plane a plane', () => {
    // Every facet is cut in two at the middle of its first edge, whatever its neighbour does; a facet without width closes the gap.
    const split = (corners: shapes.Corners): shapes.Corners => {
      const points: number[] = [];
      for (let at = 0; at < corners.length; at += 9) {
        const [a, b, c] = [0, 3, 6].map((k) => Array.from(corners.subarray(at + k, at + k + 3)));
        if (a === undefined || b === undefined || c === undefined) continue;
        const middle = a.map((coordinate, k) => Math.fround((coordinate + (b[k] ?? NaN)) / 2));
        points.push(...a, ...middle, ...c, ...middle, ...b, ...c, ...a, ...b, ...middle);
      }
      return Float64Array.from(points);
    };
    const block = shapes.roundToBinary32(shapes.rotate(shapes.makeBlock([0, 0, 0], [3, 4, 5]), tilt));
    expect(estimate(split(block)).doubt.body.correction.content).toBe(0);
  });

  it('a large fan in one vertex takes no longer than its facets', () => {
    const rim = Array.from({ length: 20_000 }, (_, k) => [Math.cos((turn * k) / 20_000), Math.sin((turn * k) / 20_000)] as const);
    const missing = Math.PI - 0.5 * 20_000 * Math.sin(turn / 20_000);
    // 5e-8: less than binary32 can hold, so that the chords may as well be taken for one plane; but never for more than there is.
    expect(Math.abs(estimate(shapes.makePrism(rim, 0, 1)).doubt.body.correction.content)).toBeLessThan(1.1 * missing);
  });
});
