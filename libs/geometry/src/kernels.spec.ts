import { readFileSync } from 'node:fs';
import path from 'node:path';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sizes, type FacetSums } from './facet-sums';
import { kernelLayout } from './kernel/kernel-memory';
import { createCompiledSumming } from './kernel/compiled-kernel';
import { carefulKernel, carefulReferenceKernel, referenceKernel, usualKernel, type Kernel, type Summing } from './kernel/summing';
import type { Vector3 } from './measurement';
import { anyMesh } from './testing/arbitrary-meshes';
import * as shapes from './testing/shapes';

function sum(kernel: Kernel, corners: shapes.Corners): FacetSums {
  const [x = 0, y = 0, z = 0] = corners;
  const summing: Summing = kernel([x, y, z] satisfies Vector3);
  summing.add(corners, corners.length / 9);
  return summing.finish();
}

const bits = (values: Float64Array): string[] => Array.from(new BigUint64Array(Float64Array.from(values).buffer), (word) => word.toString(16));
const bitsOf = ({ high, low, sizes: kept }: FacetSums): string[] => [...bits(high), ...bits(low), ...bits(kept)];

describe('the usual and the careful kernel', () => {
  it('agree to the last digits on 100 000 facets: sums of blocks lose nothing as they grow', () => {
    const corners = shapes.rotate(shapes.makeSphere(7, 320), shapes.makeRotation(0.3, 0.7, 1.1));
    const [blocked, careful] = [sum(referenceKernel, corners), sum(carefulReferenceKernel, corners)];
    const errors = Array.from({ length: 20 }, (_, place) => {
      // In parts, so that the comparison itself does not round at the size of the sum.
      const difference = (blocked.high[place] ?? NaN) - (careful.high[place] ?? NaN) + ((blocked.low[place] ?? NaN) - (careful.low[place] ?? NaN));
      const order = place % 10 === 0 ? 0 : place % 10 < 4 ? 1 : 2;
      return Math.abs(difference) / ((careful.sizes[place < 10 ? sizes.determinant : sizes.cross] ?? NaN) * 14 ** order);
    });
    expect(Math.max(...errors)).toBeLessThan(1e-16);
  });

  it('measure the sizes that bound their rounding alike', () => {
    const corners = shapes.rotate(shapes.makeTorus(5, 1, 24), shapes.makeRotation(1, 2, 3));
    const [blocked, careful] = [sum(referenceKernel, corners), sum(carefulReferenceKernel, corners)];
    for (let place = 0; place < 4; place++) expect((blocked.sizes[place] ?? NaN) / (careful.sizes[place] ?? NaN)).toBeCloseTo(1, 12);
  });
});

describe('the compiled kernels', () => {
  it('run here: none of these tests compares a reference with itself', () => {
    expect(createCompiledSumming('usual', [0, 0, 0])?.finish().high).toHaveLength(20);
  });

  it('give the bits of the references, for any mesh, near and far, of any number of facets', () => {
    fc.assert(
      fc.property(anyMesh, fc.integer({ min: -30, max: 30 }), fc.nat(5), (mesh, far, dropped) => {
        const whole = shapes.move(mesh, [2 ** far, -(2 ** far), 0]);
        const corners = whole.subarray(0, whole.length - 9 * dropped);
        expect(bitsOf(sum(usualKernel, corners))).toEqual(bitsOf(sum(referenceKernel, corners)));
        expect(bitsOf(sum(carefulKernel, corners))).toEqual(bitsOf(sum(carefulReferenceKernel, corners)));
      }),
      { numRuns: 200 },
    );
  });

  it('give the bits of the references on more facets than their memory holds', () => {
    const corners = shapes.rotate(shapes.makeSphere(7, 160), shapes.makeRotation(0.3, 0.7, 1.1)).slice(9);
    expect(corners.length / 9).toBeGreaterThan(2 * 4096);
    expect(bitsOf(sum(usualKernel, corners))).toEqual(bitsOf(sum(referenceKernel, corners)));
    expect(bitsOf(sum(carefulKernel, corners))).toEqual(bitsOf(sum(carefulReferenceKernel, corners)));
  });

  it('keep their state where the library looks for it', () => {
    const layout = readFileSync(path.join(import.meta.dirname, '../assembly/layout.ts'), 'utf8');
    const stated = Object.fromEntries([...layout.matchAll(/export const (\w+): usize = (\d+);/g)].map(([, name = '', at]): [string, number] => [name, Number(at)]));
    expect(stated).toEqual(kernelLayout);
  });
});
