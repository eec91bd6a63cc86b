import { createFacetSums, type FacetIntegrator, type FacetSums } from '../facet-sums';
import { integrateBlocked } from '../integrate-blocked';
import { integrateDoubleDouble } from '../integrate-double-double';
import type { Vector3 } from '../measurement';
import { createCompiledSumming } from './compiled-kernel';

/** Sums over facets that come in batches, about one origin. */
export interface Summing {
  /** Adds facets of nine coordinates each, in the mesh frame. The count is a multiple of 16 but for the last call. */
  add(corners: Float64Array, count: number): void;
  /** The sums; after that it takes no more. */
  finish(): FacetSums;
}

/** Begins to sum about an origin: a point near the mesh, in the mesh frame. */
export type Kernel = (origin: Vector3) => Summing;

const referenceOf =
  (integrate: FacetIntegrator): Kernel =>
  (origin) => {
    const sums = createFacetSums();
    return { add: (corners, count) => integrate(sums, origin, corners, count), finish: () => sums };
  };

/** The kernels in TypeScript: the reference, and what runs where there is no WebAssembly with SIMD. */
export const referenceKernel = referenceOf(integrateBlocked);
export const carefulReferenceKernel = referenceOf(integrateDoubleDouble);

/** The usual kernel: compiled where that can run, with the same bits either way. Within `blockedRoundings` (error-bound.ts). */
export const usualKernel: Kernel = (origin) => createCompiledSumming('usual', origin) ?? referenceKernel(origin);

/** The careful kernel, some ten times slower. Within `doubleDoubleRoundings`. */
export const carefulKernel: Kernel = (origin) => createCompiledSumming('careful', origin) ?? carefulReferenceKernel(origin);
