import type { Soundness } from '@masswright/contracts';
import { measurement } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { describeEdges, describeFinding, describeVerdict, findRefusal } from './soundness-words';

const sound: Soundness = {
  closed: true,
  oriented: true,
  outward: true,
  turned: false,
  boundaryEdges: 0,
  nonManifoldEdges: 0,
  degenerateFacets: 0,
  duplicateFacets: 0,
  defensible: true,
  findings: [],
};
const open: Soundness = { ...sound, closed: false, oriented: false, boundaryEdges: 4, defensible: false };

describe('soundness in words', () => {
  it('an open mesh is called open, and is refused with why and what to do', () => {
    expect(describeVerdict(open)).toMatchObject({ tone: 'wrong', word: 'Open' });
    expect(findRefusal(open)?.why).toContain('open at 4 edges');
    expect(findRefusal(open)?.remedy).toContain('Close the gap');
  });
  it('a sound mesh is not refused', () => {
    expect(describeVerdict(sound)).toMatchObject({ tone: 'agreement', word: 'Closed' });
    expect(findRefusal(sound)).toBeUndefined();
  });
  it('a turned mesh is a doubt, not a refusal', () => {
    const turned = { ...sound, outward: false, turned: true };
    expect(describeVerdict(turned).tone).toBe('doubt');
    expect(findRefusal(turned)).toBeUndefined();
  });
  it('inconsistent winding and no volume are refused each for its own reason', () => {
    const wound = findRefusal({ ...sound, oriented: false, defensible: false });
    const flat = findRefusal({ ...sound, defensible: false });
    expect(wound?.why).toContain('wound against');
    expect(flat?.why).toContain('told from nothing');
  });
  it('edges agree with their number', () => {
    expect(describeEdges(sound)).toBe('Every edge is shared by two facets.');
    expect(describeEdges({ ...open, boundaryEdges: 1 })).toContain('1 edge has');
    expect(describeEdges({ ...open, boundaryEdges: 1200 })).toContain('1\u2009200 edges have');
  });
  it('every kind of finding has a sentence', () => {
    for (const kind of measurement.shape.soundness.shape.findings.element.shape.kind.options) {
      for (const count of [1, 2]) expect(describeFinding({ kind, count, facets: [] })).toMatch(/^[A-Z0-9].*\.$/);
    }
  });
});
