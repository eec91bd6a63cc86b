import { cleanup, render } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { AlignedFigure, computeFractionDigits, Figure } from './figure';

const roomOf = (element: HTMLElement): number => Number.parseFloat(element.querySelector<HTMLElement>('.figure-room')?.style.width ?? '0');

describe('figures on the page', () => {
  afterEach(cleanup);

  it('carry their unit behind them', () => {
    const { container } = render(<Figure value={412.6} unit="g" digits={4} />);
    expect(container.textContent).toBe('412.6 g');
  });
  it('of one column have their points in one place', () => {
    const values = [1204.3, 318.94, 87.412, 5];
    const digits = 5;
    const fractionDigits = computeFractionDigits(values, digits);
    expect(fractionDigits).toBe(4);
    for (const value of values) {
      const { container } = render(<AlignedFigure value={value} digits={digits} fractionDigits={fractionDigits} />);
      const fraction = container.textContent.split('.')[1] ?? '';
      expect(fraction.length + roomOf(container)).toBe(fractionDigits);
      cleanup();
    }
  });
  it('a figure without a fraction leaves the place of the point free too', () => {
    const { container } = render(<AlignedFigure value={12345} digits={4} fractionDigits={2} />);
    expect(roomOf(container)).toBe(3);
  });
  it('of a column have no more digits than the others when they are large', () => {
    const { container } = render(<AlignedFigure value={1234567} digits={4} fractionDigits={2} />);
    expect(container.textContent).toBe('1.235×10^6');
  });
  it('with a power of ten are set with ordinary digits, and read as a power where they are copied', () => {
    const { container } = render(<Figure value={1.5e-12} unit="kg·m²" digits={3} />);
    expect(container.textContent).toBe('1.50×10^-12 kg·m²');
    expect(container.querySelector('sup')?.textContent).toBe('^-12');
  });
});
