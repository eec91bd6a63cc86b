import { describe, expect, it } from 'vitest';
import { askUnit, describeRatio } from './doubt-words';

const said = (volumeRatio: number): string => describeRatio({ volumeRatio }).replaceAll('\u2009', ' ');

describe('a unit in doubt', () => {
  it('is told by the volume before with two digits at most', () => {
    expect(said(16387.064)).toBe('about 16 000 times');
    expect(said(1 / 16387.064)).toBe('about 1/16 000 of');
    expect(said(1728)).toBe('about 1 700 times');
    expect(said(28_316_846)).toBe('about 28 million times');
  });
  it('near a power of a thousand its name is said', () => {
    expect(said(1 / 987_654_321)).toBe('about a thousand-millionth of');
    expect(said(1.02e9)).toBe('about a thousand million times');
    expect(said(1000)).toBe('about a thousand times');
    expect(said(1e-6)).toBe('about a millionth of');
  });
  it('is asked about by name where the volumes speak for one, and openly where they speak for none', () => {
    expect(askUnit({ lengthUnit: 'm', volumeRatio: 1e-9 })).toBe('About a thousand-millionth of the volume before: metres?');
    expect(askUnit({ lengthUnit: null, volumeRatio: 1000 })).toBe('About a thousand times the volume before: in which unit is it?');
  });
});
