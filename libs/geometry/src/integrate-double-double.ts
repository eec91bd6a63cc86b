import { add, copy, createRegisters, differ, multiply, put, squareRoot, subtract, type Registers } from './double-double';
import { sizes, sumsOfBody, sumsOfSurface, type FacetIntegrator, type FacetSums } from './facet-sums';

/**
 * The careful kernel, for meshes whose volume is small against what cancels in it (thin plates, needles, narrow gaps): exact differences and
 * double-double arithmetic throughout, facet by facet in the order of the file. Some fifty times slower than the usual one.
 */
export const integrateDoubleDouble: FacetIntegrator = (sums, origin, corners, count) => {
  const r = createRegisters(registerCount);
  for (let facet = 0; facet < count; facet++) addFacet(r, sums, origin, corners, 9 * facet);
};

// Registers: corners less origin A, B, C; edges E, F; normal N; weights D and L; their sum S; six products P; some spare.
const A = 0, B = 3, C = 6, E = 9, F = 12, N = 15, D = 18, L = 19, S = 20, P = 23, T = 29, U = 30, SUM = 31;
const registerCount = 32;

function addFacet(r: Registers, sums: FacetSums, origin: ArrayLike<number>, corners: Float64Array, at: number): void {
  for (let k = 0; k < 3; k++) {
    const o = origin[k] ?? 0;
    const a = corners[at + k] ?? 0, b = corners[at + 3 + k] ?? 0, c = corners[at + 6 + k] ?? 0;
    differ(r, A + k, a, o);
    differ(r, B + k, b, o);
    differ(r, C + k, c, o);
    differ(r, E + k, b, a);
    differ(r, F + k, c, a);
    add(r, S + k, A + k, B + k);
    add(r, S + k, S + k, C + k);
  }
  put(r, D, 0);
  put(r, L, 0);
  let dSize = 0;
  let lSize = 0;
  for (let k = 0; k < 3; k++) {
    const i = (k + 1) % 3, j = (k + 2) % 3;
    multiply(r, T, E + i, F + j);
    multiply(r, U, E + j, F + i);
    const size = Math.abs(r[2 * T] ?? 0) + Math.abs(r[2 * U] ?? 0);
    lSize += size;
    dSize += Math.abs(r[2 * (A + k)] ?? 0) * size;
    subtract(r, N + k, T, U);
    multiply(r, T, A + k, N + k);
    add(r, D, D, T);
    multiply(r, T, N + k, N + k);
    add(r, L, L, T);
  }
  squareRoot(r, L, L, T);
  computeProducts(r);
  addWeighted(r, sums, sumsOfBody, D);
  addWeighted(r, sums, sumsOfSurface, L);
  addSizes(sums, dSize, lSize, (r[2 * P] ?? 0) + (r[2 * P + 2] ?? 0) + (r[2 * P + 4] ?? 0));
}

function addSizes({ sizes: kept }: FacetSums, dSize: number, lSize: number, trace: number): void {
  kept[sizes.determinant] = (kept[sizes.determinant] ?? 0) + dSize;
  kept[sizes.determinantSecond] = (kept[sizes.determinantSecond] ?? 0) + dSize * trace;
  kept[sizes.cross] = (kept[sizes.cross] ?? 0) + lSize;
  kept[sizes.crossSecond] = (kept[sizes.crossSecond] ?? 0) + lSize * trace;
}

/** P = s_i s_j + a_i a_j + b_i b_j + c_i c_j for xx, yy, zz, xy, yz, zx. */
function computeProducts(r: Registers): void {
  for (let p = 0; p < 6; p++) {
    const i = p % 3;
    const j = p < 3 ? i : (i + 1) % 3;
    multiply(r, P + p, S + i, S + j);
    for (const corner of [A, B, C]) {
      multiply(r, T, corner + i, corner + j);
      add(r, P + p, P + p, T);
    }
  }
}

function addWeighted(r: Registers, sums: FacetSums, first: number, weight: number): void {
  for (let place = 0; place < 10; place++) {
    if (place === 0) copy(r, T, weight);
    else multiply(r, T, weight, place < 4 ? S + place - 1 : P + place - 4);
    r[2 * SUM] = sums.high[first + place] ?? 0;
    r[2 * SUM + 1] = sums.low[first + place] ?? 0;
    add(r, SUM, SUM, T);
    sums.high[first + place] = r[2 * SUM] ?? 0;
    sums.low[first + place] = r[2 * SUM + 1] ?? 0;
  }
}
