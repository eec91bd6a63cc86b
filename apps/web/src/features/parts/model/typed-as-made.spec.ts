import { describe, expect, it } from 'vitest';
import { describeAsMade, readAsMade, writeAsMade } from './typed-as-made';

describe('a tolerance as made, typed', () => {
  it.each([
    ['± 0.3 %', { kind: 'scale', spread: 0.003 }],
    ['0.3%', { kind: 'scale', spread: 0.003 }],
    ['+- 0.1 mm', { kind: 'offset', spreadM: 0.0001 }],
    ['0.1 mm', { kind: 'offset', spreadM: 0.0001 }],
    ['± 0.01 in', { kind: 'offset', spreadM: 0.000254 }],
    ['', null],
  ])('%s is read', (text, asMade) => {
    expect(readAsMade(text)).toEqual({ value: asMade });
  });
  it.each([
    ['0.3', /% behind it/],
    ['±', /behind the ±/],
    ['± 0,3 %', /decimal point/],
    ['± 60 %', /at most 50 %/],
    ['± 2 m', /at most a metre/],
    ['± -0.1 mm', /not negative/],
    ['± 0.1 kg', /./],
  ])('%s is refused with what to do', (text, error) => {
    const read = readAsMade(text);
    expect(read.value).toBeUndefined();
    expect(read.error).toMatch(error);
  });
  it('what is written is read as the same', () => {
    for (const asMade of [{ kind: 'scale', spread: 0.003 }, { kind: 'offset', spreadM: 0.00025 }] as const) expect(readAsMade(writeAsMade(asMade))).toEqual({ value: asMade });
    expect(writeAsMade(null)).toBe('');
  });
  it('says what each kind means for the part', () => {
    expect(describeAsMade({ kind: 'scale', spread: 0.003 })).toContain('0.3 % longer or shorter');
    expect(describeAsMade({ kind: 'offset', spreadM: 0.0001 })).toContain('0.1 mm further out or in');
  });
});
