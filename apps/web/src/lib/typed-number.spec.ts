import { describe, expect, it } from 'vitest';
import { readNumber, writeNumber } from './typed-number';

describe('a typed number', () => {
  it('has a decimal point and perhaps an exponent', () => {
    expect(readNumber(' -12.5 ')).toEqual({ value: -12.5 });
    expect(readNumber('−3e-2')).toEqual({ value: -0.03 });
    expect(readNumber('.5')).toEqual({ value: 0.5 });
    expect(readNumber('12 000')).toEqual({ value: 12000 });
  });
  it('with a comma, with words or without digits is refused with a sentence', () => {
    for (const text of ['1,5', 'ten', '', '-', '1e', '0x10', '1.2.3', '1e999']) expect(readNumber(text).error).toMatch(/\.$/);
  });
  it('is written without the noise of a conversion there and back', () => {
    const rpm = 1500;
    const radPerS = (rpm * Math.PI) / 30;
    expect(writeNumber((radPerS * 30) / Math.PI)).toBe('1500');
    expect(readNumber(writeNumber(-0.1))).toEqual({ value: -0.1 });
  });
});
