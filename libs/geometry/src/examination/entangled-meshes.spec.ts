import { describe, expect, it } from 'vitest';
import { join, makeBlock, turn } from '../testing/shapes';
import { checkDuplicates } from './duplicates';
import { createEdgeTable } from './edge-table';
import { createNotes } from './notes';
import { countFindings, examineCorners, weldFacets } from './testing/examine-corners';

const hollow = join(makeBlock([0, 0, 0], [3, 3, 3]), turn(makeBlock([1, 1, 1], [2, 2, 2])));

describe('meshes that are too entangled to be examined to the end', () => {
  it('with shells that lie in too many others keep their figures as stored, and nothing is said of cavities', () => {
    const found = examineCorners(hollow, undefined, 0);
    expect(found.soundness).toMatchObject({ closed: true, oriented: true, turned: false, shells: 2, cavities: null, defensible: true, findings: [] });
    expect(found.shells.map(({ inside }) => inside)).toEqual([null, null]);
    expect(found.volume?.content).toBe(26);
    expect(examineCorners(hollow).soundness).toMatchObject({ shells: 2, cavities: 1 });
  });

  it('with a whole that is inside out are turned as a whole all the same', () => {
    const found = examineCorners(turn(hollow), undefined, 0);
    expect(found.soundness).toMatchObject({ outward: false, turned: true, cavities: null });
    expect(countFindings(found)).toEqual({ 'turned-whole': 1 });
    expect(found.volume?.content).toBe(26);
  });

  it('with a hundred and thirty thousand pairs of facets about one edge are told pair by pair', () => {
    const pairs = 130_000;
    const corners = new Float64Array(18 * pairs);
    for (let pair = 0; pair < pairs; pair++) {
      const far = [1 + pair, (7919 * pair) % 100_003, 0];
      corners.set([0, 0, 0, 0, 0, 1, ...far, 0, 0, 1, 0, 0, 0, ...far], 18 * pair);
    }
    const mesh = weldFacets(corners);
    const notes = createNotes(mesh);
    expect(checkDuplicates(notes, createEdgeTable(mesh))).toHaveLength(pairs);
    expect(notes.count('duplicate-facets')).toBe(pairs);
  });

  it('with one body many times over count it as overlapping', () => {
    const copies = 15;
    const cube = makeBlock([0, 0, 0], [1, 1, 1]);
    const found = examineCorners(join(...Array.from({ length: copies }, () => cube)));
    expect(found.soundness).toMatchObject({ closed: true, oriented: true, duplicateFacets: 12 * (copies - 1), shells: copies, defensible: false });
    expect(countFindings(found)['overlapping-shells']).toBe(copies);
  });
});
