import { describe, expect, it } from 'vitest';
import { makeFileName } from './attachment';

describe('the name of a file that is made', () => {
  it.each([
    ['Reel, mark 2', 'Reel- mark 2.csv'],
    ['../../etc/passwd', 'etc-passwd.csv'],
    ['a/b\\c:d', 'a-b-c-d.csv'],
    ['käse été 部品', 'käse été 部品.csv'],
    ['gnp.\u202Eslx', 'gnp.-slx.csv'],
    ['tab\tand\nline', 'tab-and-line.csv'],
    ['...', 'masswright.csv'],
    ['', 'masswright.csv'],
    ['="x"', 'x.csv'],
  ])('%j is %j', (name, expected) => {
    expect(makeFileName(name, 'csv')).toBe(expected);
  });

  it('has at most a hundred characters and its extension', () => {
    expect(makeFileName('x'.repeat(300), 'json')).toBe(`${'x'.repeat(100)}.json`);
  });
});
