import { describe, expect, it } from 'vitest';
import { findNextPath, parseSignInState } from './where-next';

describe('the page after signing in', () => {
  it('is the one that was wanted', () => {
    expect(findNextPath('/projects/1/parts/2')).toBe('/projects/1/parts/2');
  });
  it('is never on another host', () => {
    for (const wanted of ['https://elsewhere.example/', '//elsewhere.example', '/\\elsewhere.example', 'javascript:alert(1)', undefined, 7]) {
      expect(findNextPath(wanted)).toBe('/');
    }
  });
  it('is not the sign-in page itself', () => {
    expect(findNextPath('/sign-in')).toBe('/');
  });
  it('a state of the history that is not ours is ignored', () => {
    expect(parseSignInState('text')).toEqual({});
    expect(parseSignInState({ next: 3, sentence: 'Signed out.' })).toEqual({ next: undefined, sentence: 'Signed out.' });
  });
});
