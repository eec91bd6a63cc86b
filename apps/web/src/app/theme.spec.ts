import { afterEach, describe, expect, it } from 'vitest';
import { chooseTheme, computeTheme, startTheme } from './theme';

describe('theme', () => {
  afterEach(() => localStorage.clear());

  it('follows the system until a person chooses', () => {
    expect(computeTheme('system', true)).toBe('night');
    expect(computeTheme('system', false)).toBe('day');
    expect(computeTheme('day', true)).toBe('day');
    expect(computeTheme('night', false)).toBe('night');
  });
  it('paints the choice and keeps it for the next visit', () => {
    startTheme();
    chooseTheme('night');
    expect(document.documentElement.dataset['theme']).toBe('night');
    expect(localStorage.getItem('masswright.theme')).toBe('night');
    chooseTheme('day');
    expect(document.documentElement.dataset['theme']).toBe('day');
  });
});
