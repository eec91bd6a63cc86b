import { expect, it } from 'vitest';
import { integrateBody } from './integrate-body';
import { weldFacets } from './examination/testing/examine-corners';
import { makeTorus, rotate, makeRotation, type Corners } from './testing/shapes';
import type { Vector3 } from './measurement';

const torus = rotate(makeTorus(0.6, 0.2, 12), makeRotation(0.3, 0.7, 1.1));

function integrate(corners: Corners, scale: number) {
  const scaled = corners.map((coordinate) => coordinate * scale);
  const [x = 0, y = 0, z = 0] = scaled;
  return integrateBody(weldFacets(scaled), [x, y, z] satisfies Vector3, 2 * scale);
}

it('the bound of a body is the same to the bit at every size that is taken, from 2^-148 to 2^128', () => {
  const { volume, surface } = integrate(torus, 1);
  for (const scale of [2 ** -148, 2 ** -120, 2 ** 100, 2 ** 128]) {
    const found = integrate(torus, scale);
    expect(found.volumeSign).toBe(1);
    expect(found.volume.errorBound).toBe(volume.errorBound);
    expect(found.surface.errorBound).toBe(surface.errorBound);
  }
});
