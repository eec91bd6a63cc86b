import { describe, expect, it } from 'vitest';
import { findStretches, placeRow } from './stretches';

describe('stretches of a long list', () => {
  it('only those that are looked at are read', () => {
    expect(findStretches(0, 29, 10_000)).toEqual([0]);
    expect(findStretches(95, 125, 10_000)).toEqual([0, 1]);
    expect(findStretches(9_990, 10_020, 10_000)).toEqual([99]);
  });
  it('of a list that nothing is known of yet, and of an empty one, the first is', () => {
    expect(findStretches(500, 530, undefined)).toEqual([0]);
    expect(findStretches(0, -1, 0)).toEqual([0]);
  });
  it('a place beyond a list that has become shorter is its end', () => {
    expect(findStretches(5_000, 5_030, 120)).toEqual([1]);
  });
  it('a row has its place in one of them', () => {
    expect(placeRow(0)).toEqual({ stretch: 0, place: 0 });
    expect(placeRow(257)).toEqual({ stretch: 2, place: 57 });
  });
});
