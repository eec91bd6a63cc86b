import type { Soundness } from '@masswright/contracts';
import { measurement } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { describeFinding } from './finding-words';
import { findRefusal } from './refusal-words';
import { describeEdges, describeIntersections, describeVertices, describeVerdict, describeWinding, pickVerdict, type Verdict } from './soundness-words';
import { makeMeasurement } from './testing/measurements';

const sound: Soundness = makeMeasurement().soundness;
const open: Soundness = { ...sound, closed: false, oriented: false, boundaryEdges: 4, defensible: false };
const notExamined = { boundaryEdges: null, nonManifoldEdges: null, nonManifoldVertices: null, shells: null, cavities: null, selfIntersections: null };
const verdictOf = (soundness: Soundness, examined: Verdict['examined'] = 'whole') => describeVerdict(pickVerdict({ soundness, examined }));
const overlapping: Soundness = { ...sound, shells: 2, defensible: false, findings: [{ kind: 'overlapping-shells', count: 2, facets: [], lines: [] }] };

describe('soundness in words', () => {
  it('an open mesh is called open, and is refused with why and what to do', () => {
    expect(verdictOf(open)).toMatchObject({ tone: 'wrong', word: 'Open' });
    expect(findRefusal(open)?.why).toContain('open at 4 edges');
    expect(findRefusal(open)?.remedy).toContain('Close the gap');
  });
  it('a sound mesh is not refused', () => {
    expect(verdictOf(sound)).toMatchObject({ tone: 'agreement', word: 'Closed', words: 'Closed, oriented, outward' });
    expect(findRefusal(sound)).toBeUndefined();
  });
  it('a turned mesh and one that passes through itself are doubts, not refusals', () => {
    for (const doubtful of [{ ...sound, outward: false, turned: true }, { ...sound, selfIntersections: 3 }]) {
      expect(verdictOf(doubtful).tone).toBe('doubt');
      expect(findRefusal(doubtful)).toBeUndefined();
    }
  });
  it('a mesh that is open by hairlines only is defensible with a stated gap', () => {
    const hairline = { ...open, defensible: true };
    expect(verdictOf(hairline)).toEqual({ tone: 'doubt', word: 'Hairline gaps', words: 'Open by hairlines only: defensible with a stated gap' });
    expect(findRefusal(hairline)).toBeUndefined();
  });
  it('mixed winding, overlapping shells and no volume are refused each for its own reason', () => {
    const wound = { ...sound, oriented: false, defensible: false };
    const flat = { ...sound, defensible: false };
    expect(findRefusal(wound)?.why).toContain('wound against');
    expect(findRefusal(overlapping)?.why).toContain('pass through each other');
    expect(findRefusal(flat)?.why).toContain('told from nothing');
    expect([wound, overlapping, flat].map((one) => verdictOf(one).word)).toEqual(['Mixed winding', 'Overlapping', 'No volume']);
  });
  it('edges that do not cancel are not yet a fault while the rest is examined, and are one where it was not', () => {
    const unpaired = { ...open, ...notExamined, closed: null };
    expect(verdictOf(unpaired, 'integrals')).toMatchObject({ tone: 'doubt', word: 'Edges unpaired' });
    expect(verdictOf(unpaired, 'limited').tone).toBe('wrong');
    expect(findRefusal(unpaired)?.why).toContain('do not cancel');
    expect(describeEdges(unpaired)).toContain('do not cancel');
  });
  it('says of what stands already that the rest is examined, or was not', () => {
    const standing = { ...sound, ...notExamined, boundaryEdges: 0 };
    expect(verdictOf(standing, 'integrals').words).toContain('the rest is being examined');
    expect(verdictOf(standing, 'limited').words).toContain('the rest was not examined');
    expect(describeEdges(standing)).toContain('They cancel');
    expect(describeVertices(standing, 'integrals')).toBe('Not examined yet.');
    expect(describeVertices(standing, 'whole')).toBe('Not examined.');
    expect(describeIntersections(standing, { facets: 12, examined: 'integrals' })).toBe('Not examined yet.');
    expect(describeIntersections(standing, { facets: 300_000, examined: 'whole' })).toContain('this one has 300\u2009000');
    expect(describeIntersections(standing, { facets: 7000, examined: 'whole' })).toContain('close together');
  });
  it('edges, vertices and crossings agree with their number', () => {
    expect(describeEdges(sound)).toBe('Every edge is shared by two facets.');
    expect(describeEdges({ ...open, boundaryEdges: 1 })).toContain('1 edge has');
    expect(describeEdges({ ...open, boundaryEdges: 1200 })).toContain('1\u2009200 edges have');
    expect(describeVertices({ ...sound, nonManifoldVertices: 2 }, 'whole')).toContain('2 vertices');
    expect(describeIntersections({ ...sound, selfIntersections: 1 }, { facets: 12, examined: 'whole' })).toContain('1 pair');
  });
  it('the winding of an open mesh is judged apart from its openings', () => {
    expect(describeWinding(open)).toContain('as far as the surface goes');
    expect(describeWinding({ ...open, findings: [{ kind: 'turned-facets', count: 1, facets: [3], lines: [] }] })).toContain('both ways');
    expect(describeWinding({ ...sound, turned: true, findings: [{ kind: 'turned-shells', count: 1, facets: [3], lines: [] }] })).toContain('some shells');
  });
  it('every kind of finding has a sentence', () => {
    for (const kind of measurement.shape.soundness.shape.findings.element.shape.kind.options) {
      for (const count of [1, 2]) expect(describeFinding({ kind, count })).toMatch(/^[A-Z0-9].*\.$/);
    }
  });
});
