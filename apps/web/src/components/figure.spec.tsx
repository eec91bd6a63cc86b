import { cleanup, render } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { AlignedFigure, computeFigureRoom, Figure } from './figure';

describe('figures on the page', () => {
  afterEach(cleanup);

  it('carry their unit behind them', () => {
    const { container } = render(<Figure value={412.6} unit="g" digits={4} />);
    expect(container.textContent).toBe('412.6 g');
  });
  it('of one column have their points in one place', () => {
    const values = [1204.3, 318.94, 87.412, 5];
    const digits = 5;
    const { behind } = computeFigureRoom(values, digits);
    expect(behind).toBe(5);
    for (const value of values) {
      const { container } = render(<AlignedFigure value={value} digits={digits} behind={behind} />);
      const tail = container.querySelector<HTMLElement>('.figure-tail');
      expect(tail?.style.width).toBe('5ch');
      expect(tail?.textContent.startsWith('.')).toBe(true);
      cleanup();
    }
  });
  it('a figure without a fraction leaves the place of the point and of the others\' digits free', () => {
    const { container } = render(<AlignedFigure value={12345} digits={4} behind={3} />);
    expect(container.querySelector<HTMLElement>('.figure-tail')?.style.width).toBe('3ch');
    expect(container.querySelector('.figure-tail')?.textContent).toBe('');
  });
  it('of a column are written plainly up to nine digits, so that large ones stand under small ones', () => {
    const values = [25_600_000, 377_100, 96_750.4, 0.0123];
    const { before, behind } = computeFigureRoom(values, 4);
    expect([before, behind]).toEqual(['25 600 000'.length, '.01230'.length]);
    const { container } = render(<AlignedFigure value={25_600_000} digits={4} behind={behind} />);
    expect(container.textContent.replaceAll('\u2009', ' ')).toBe('25 600 000');
    expect(computeFigureRoom([], 4)).toEqual({ before: 0, behind: 0 });
  });
  it('with a power of ten are set with ordinary digits, and read as a power where they are copied', () => {
    const { container } = render(<Figure value={1.5e-12} unit="kg·m²" digits={3} />);
    expect(container.textContent).toBe('1.50×10^-12 kg·m²');
    expect(container.querySelector('sup')?.textContent).toBe('^-12');
  });
});
