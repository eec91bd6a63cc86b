/* For benchmarks: the compiled kernels alone, without the reading and the sketch around them. */
export { blockedRoundings, computeErrorBound } from '../error-bound';
export { beginSums, borrowKernel, readSums, returnKernel } from './compiled-kernel';
export { kernelFacets } from './kernel-memory';
