import { describe, expect, it } from 'vitest';
import { createFacetSums, type FacetIntegrator, type FacetSums } from './facet-sums';
import { integrateBlocked } from './integrate-blocked';
import { integrateDoubleDouble } from './integrate-double-double';
import * as shapes from './testing/shapes';

function sum(integrate: FacetIntegrator, corners: shapes.Corners): FacetSums {
  const sums = createFacetSums();
  integrate(sums, corners, corners, corners.length / 9);
  return sums;
}

describe('the two kernels', () => {
  it('agree to the last digits on 100 000 facets: sums of blocks lose nothing as they grow', () => {
    const corners = shapes.rotate(shapes.makeSphere(7, 320), shapes.makeRotation(0.3, 0.7, 1.1));
    const [blocked, careful] = [sum(integrateBlocked, corners), sum(integrateDoubleDouble, corners)];
    const errors = Array.from({ length: 20 }, (_, place) => {
      // In parts, so that the comparison itself does not round at the size of the sum.
      const difference = (blocked.high[place] ?? NaN) - (careful.high[place] ?? NaN) + ((blocked.low[place] ?? NaN) - (careful.low[place] ?? NaN));
      const order = place % 10 === 0 ? 0 : place % 10 < 4 ? 1 : 2;
      return Math.abs(difference) / ((place < 10 ? careful.determinantSize : careful.crossSize) * 14 ** order);
    });
    expect(Math.max(...errors)).toBeLessThan(1e-16);
  });

  it('measure the sizes that bound their rounding alike', () => {
    const corners = shapes.rotate(shapes.makeTorus(5, 1, 24), shapes.makeRotation(1, 2, 3));
    const [blocked, careful] = [sum(integrateBlocked, corners), sum(integrateDoubleDouble, corners)];
    expect(blocked.determinantSize / careful.determinantSize).toBeCloseTo(1, 12);
    expect(blocked.crossSize / careful.crossSize).toBeCloseTo(1, 12);
  });
});
