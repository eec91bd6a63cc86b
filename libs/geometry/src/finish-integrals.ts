import { add, createRegisters, divide, divideBy, multiply, put, round, subtract } from './double-double';
import { places, sumsOfBody, sumsOfSurface, type FacetSums } from './facet-sums';
import type { Integrals, Vector3 } from './measurement';

/** How often the sums of one kind hold ∫1, ∫x and ∫x². */
const divisors = { body: [6, 24, 120], surface: [2, 6, 24] } as const;

/**
 * Turns sums about the local origin into integrals about their own centroid, in double-double, each result rounded once.
 * Where the content is zero the centroid is put at the origin.
 *
 * @param errorBound of the sums, by `computeErrorBound`
 * @param sign -1 where every facet is to be read the other way round
 */
export function finishIntegrals(sums: FacetSums, of: 'body' | 'surface', errorBound: number, sign: 1 | -1 = 1): Integrals {
  const first = of === 'body' ? sumsOfBody : sumsOfSurface;
  const [contentDivisor, firstDivisor, secondDivisor] = divisors[of];
  // 0 content, 1–3 ∫x…, 4–6 centroid, 7 one second moment, 8 the shift, 9 and 10 spare.
  const r = createRegisters(11);
  const read = (t: number, place: number, divisor: number): void => {
    put(r, t, sign * (sums.high[first + place] ?? 0));
    put(r, 10, sign * (sums.low[first + place] ?? 0));
    add(r, t, t, 10);
    divideBy(r, t, t, divisor, 9);
  };
  read(0, 0, contentDivisor);
  const empty = round(r, 0) === 0;
  for (let k = 0; k < 3; k++) {
    read(1 + k, 1 + k, firstDivisor);
    if (empty) put(r, 4 + k, 0);
    else divide(r, 4 + k, 1 + k, 0, 9);
  }
  const second = (place: number, i: number, j: number): number => {
    read(7, place, secondDivisor);
    multiply(r, 8, 1 + i, 4 + j);
    subtract(r, 7, 7, 8);
    return round(r, 7);
  };
  return {
    content: round(r, 0),
    centreFromOrigin: [round(r, 4), round(r, 5), round(r, 6)] satisfies Vector3,
    second: {
      xx: second(places.xx, 0, 0),
      yy: second(places.yy, 1, 1),
      zz: second(places.zz, 2, 2),
      xy: second(places.xy, 0, 1),
      yz: second(places.yz, 1, 2),
      zx: second(places.zx, 2, 0),
    },
    errorBound,
  };
}
