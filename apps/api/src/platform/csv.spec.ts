import { parse } from 'csv-parse/sync';
import { describe, expect, it } from 'vitest';
import { guardText, unguardText, writeCsv } from './csv';

describe('text in a table for spreadsheets', () => {
  it.each(['=1+1', '+49 30', '-bracket', '@home', '\tx', '\rx', '\n=x', "'=x", "''-x", '＝1'])('%j gets an apostrophe in front and loses it again', (text) => {
    expect(guardText(text)).toBe(`'${text}`);
    expect(unguardText(guardText(text))).toBe(text);
  });

  it.each(['bracket', "'quoted'", '', '1=1', 'a-b', "rock 'n' roll"])('%j stays as it is', (text) => {
    expect(guardText(text)).toBe(text);
    expect(unguardText(text)).toBe(text);
  });

  it('stands beside numbers that stay numbers to the last bit', () => {
    const numbers = [-1.5, 0.1 + 0.2, 1e-7, -2.926396534e-4, 1 / 3, 5e-324, 1.7976931348623157e308];
    const text = writeCsv([['name', 'value'], ...numbers.map((number) => ['-x', number] as const)]);
    const rows = parse(text, { from_line: 2 });
    expect(rows.map(([, value]) => Number(value))).toEqual(numbers);
    expect(text).toContain("'-x,-1.5\r\n");
  });

  it('with commas, quotes and line breaks comes back as it went', () => {
    const names = ['a,b', 'say "no"', 'two\nlines', 'ünder µ', ''];
    expect(parse(writeCsv([names]))).toEqual([names]);
  });

  it('that is not known is empty, and a verdict is true or false', () => {
    expect(writeCsv([[null, true, false]])).toBe(',true,false\r\n');
  });
});
