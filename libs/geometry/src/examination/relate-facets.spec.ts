import { describe, expect, it } from 'vitest';
import { createFacetTree } from './facet-tree';
import { relateFacets } from './relate-facets';
import { haveSameCorners, visitMeetings } from './self-intersections';
import { weldFacets } from './testing/examine-corners';
import { createDraw } from '../testing/draw';
import { relateExactly } from './testing/relate-exactly';

const facet = (corners: Float64Array, k: number): Float64Array => corners.subarray(9 * k, 9 * k + 9);

/** Soups of facets whose corners lie on a coarse grid, so that half of all pairs share corners, planes or lines. */
const soups: [string, (coordinate: number, axis: number) => number, isTurned?: boolean][] = [
  ['on a grid of whole numbers', (coordinate) => coordinate],
  ['on a grid of tenths, far from the origin', (coordinate, axis) => 1000 * (axis + 1) + 0.1 * coordinate],
  ['on a grid of thirds, where planes meet to the last bit only', (coordinate, axis) => coordinate / 3 + axis],
  ['on a grid that was turned, where nothing is flat', (coordinate, axis) => 0.3 * coordinate + 0.7 * axis, true],
];

describe('how two facets lie to each other', () => {
  it.each(soups)('agrees with exact fractions for soups %s', (_name, place, isTurned) => {
    const draw = createDraw();
    const met = { crossing: 0, upon: 0, against: 0 };
    for (let soup = 0; soup < 60; soup++) {
      const corners = Float64Array.from({ length: 9 * 14 }, (_, k) => place(draw.whole(-2, 2), k % 3));
      if (isTurned) for (let at = 0; at < corners.length; at += 3) turnPoint(corners, at);
      const mesh = weldFacets(corners);
      const found = new Set<string>();
      visitMeetings(mesh, createFacetTree(mesh, Uint32Array.from({ length: 14 }, (_, k) => k)), undefined, () => true, ({ one, two, relation }) => {
        if (relation !== 'touching') found.add(`${one} ${two} ${relation}`);
      });
      const expected = new Set<string>();
      for (let one = 0; one < 14; one++) {
        for (let two = one + 1; two < 14; two++) {
          const exact = relateExactly(facet(corners, one), facet(corners, two));
          if (exact !== undefined) {
            expected.add(`${one} ${two} ${exact}`);
            met[exact] += 1;
          }
          expect(relateFacets(mesh, two, one) === 'crossing', `seed ${draw.seed}, soup ${soup}: ${one} and ${two}, the other way about`).toBe(exact === 'crossing');
        }
      }
      expect([...found].sort(), `seed ${draw.seed}, soup ${soup}`).toEqual([...expected].sort());
    }
    expect(met.crossing).toBeGreaterThan(100);
  });

  it('finds facets that lie upon each other, by the side that they face', () => {
    const lower = [0, 0, 0, 2, 0, 0, 0, 2, 0], same = [0.5, 0.5, 0, 3, 0.5, 0, 0.5, 3, 0], opposite = [0.5, 0.5, 0, 0.5, 3, 0, 3, 0.5, 0], beside = [2, 0, 0, 2, 2, 0, 0, 2, 0];
    const mesh = weldFacets([...lower, ...same, ...opposite, ...beside]);
    expect([relateFacets(mesh, 0, 1), relateFacets(mesh, 0, 2), relateFacets(mesh, 0, 3)]).toEqual(['upon', 'against', 'touching']);
  });

  it('tells a point of contact from a passage: a corner on a face, an edge on a face, an edge across an edge', () => {
    const floor = [-2, -2, 0, 2, -2, 0, 0, 2, 0];
    const standing = [0, 0, 0, 1, 0, 1, -1, 0, 1], leaning = [-0.5, 0, 0, 0.5, 0, 0, 0, 0, 1], pierced = [0, 0, -1, 1, 0, 1, -1, 0, 1], atEdge = [0, -3, -1, 0, -3, 1, 0, -2, 0];
    const mesh = weldFacets([...floor, ...standing, ...leaning, ...pierced, ...atEdge]);
    expect([1, 2, 3, 4].map((other) => relateFacets(mesh, 0, other))).toEqual(['touching', 'touching', 'crossing', 'touching']);
  });

  it('leaves facets without area apart from all others', () => {
    const mesh = weldFacets([-2, -2, 0, 2, -2, 0, 0, 2, 0, 0, 0, -1, 0, 0, 0, 0, 0, 1, -1, 0, 0, 0, 0, 0, 1, 0, 0]);
    expect([relateFacets(mesh, 0, 1), relateFacets(mesh, 1, 0), relateFacets(mesh, 0, 2), relateFacets(mesh, 1, 2)]).toEqual(['apart', 'apart', 'apart', 'apart']);
    expect(haveSameCorners(mesh, 1, 2)).toBe(false);
  });
});

/** A turn by angles that no number has exactly, rounded to 2⁻⁴⁰ so that the judge can take it. */
function turnPoint(corners: Float64Array, at: number): void {
  const x = corners[at] ?? 0, y = corners[at + 1] ?? 0, z = corners[at + 2] ?? 0;
  const turned = [0.8 * x - 0.6 * y, 0.48 * x + 0.64 * y - 0.6 * z, 0.36 * x + 0.48 * y + 0.8 * z];
  corners.set(turned.map((coordinate) => Math.round(coordinate * 2 ** 40) / 2 ** 40), at);
}
