import { describe, expect, it } from 'vitest';
import { orderMatches, proposeParts } from './name-matches';
import type { NameMatch } from './upload-entry';

const match = (partId: string, folder: string, sameCase = true): NameMatch => ({
  fileName: 'cover.stl', partId, number: 1, name: 'cover', letter: 'A', storedFileName: sameCase ? 'cover.stl' : 'Cover.stl', folder, sizeBytes: 84, sha256: null, sameCase,
});
const left = match('left part', 'reel/left');
const right = match('right part', 'reel/right');
const entry = (key: string, folder: string, matches: readonly NameMatch[]) => ({ key, folder, matches: orderMatches(matches, folder) });

describe('parts that have a file of the same name', () => {
  it('from the same folder come first, then those of the same letter case', () => {
    const other = match('other part', '', false);
    expect(orderMatches([other, left, right], 'reel/right').map(({ partId }) => partId)).toEqual(['right part', 'left part', 'other part']);
    // The folder is compared as it is stored.
    expect(orderMatches([left, right], 'reel\\./right/')[0]).toBe(right);
  });

  it('each get the file of their own folder when all are added as next revisions', () => {
    expect(proposeParts([entry('b', 'reel/right', [left, right]), entry('a', 'reel/left', [left, right])])).toEqual(new Map([['b', 'right part'], ['a', 'left part']]));
  });

  it('are never taken for two files: the one from another folder is left to the person', () => {
    expect(proposeParts([entry('elsewhere', 'old', [left]), entry('a', 'reel/left', [left])])).toEqual(new Map([['a', 'left part']]));
    expect(proposeParts([entry('one', 'old', [left]), entry('two', 'new', [left])])).toEqual(new Map([['one', 'left part']]));
  });
});
