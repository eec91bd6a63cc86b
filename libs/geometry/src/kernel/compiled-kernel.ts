import { createFacetSums, sizeCount, sumCount, type FacetSums } from '../facet-sums';
import type { Vector3 } from '../measurement';
import { compiledKernel } from './kernel.generated';
import { kernelFacets, kernelLayout } from './kernel-memory';
import type { Summing } from './summing';
import { compileModule } from './web-assembly';

interface KernelExports {
  memory: { buffer: ArrayBuffer };
  integrateStl: (count: number) => void;
  integrateCorners: (count: number) => void;
  integrateCornersCarefully: (count: number) => void;
  sketchStl: (count: number) => void;
  sketchCorners: (count: number) => void;
}

/** One instance of the compiled kernels, with the views of its memory, which never grows. */
export interface KernelInstance extends Omit<KernelExports, 'memory'> {
  readonly numbers: Float64Array;
  readonly words: BigUint64Array;
  readonly box: Float32Array;
  readonly corners: Float64Array;
  readonly bytes: Uint8Array;
}

/** Compiled once; null where WebAssembly or its SIMD is missing. */
let makeInstance: (() => unknown) | null | undefined;
/** Instances that nobody uses: a mesh of many shells asks for one a shell. */
const idle: KernelInstance[] = [];
const mostIdle = 4;

/** An instance of the compiled kernels; undefined where they can't run. Give it back when it is done with. */
export function borrowKernel(): KernelInstance | undefined {
  if (makeInstance === undefined) makeInstance = compileModule(compiledKernel);
  return makeInstance === null ? undefined : (idle.pop() ?? instantiate(makeInstance));
}

export function returnKernel(kernel: KernelInstance): void {
  if (idle.length < mostIdle) idle.push(kernel);
}

function instantiate(make: () => unknown): KernelInstance {
  // It exports what assembly/index.ts does.
  const { memory, ...functions } = make() as KernelExports;
  const { buffer } = memory;
  return {
    ...functions,
    numbers: new Float64Array(buffer, 0, kernelLayout.REGISTERS / 8),
    words: new BigUint64Array(buffer, 0, kernelLayout.REGISTERS / 8),
    box: new Float32Array(buffer, kernelLayout.BOX, 24),
    corners: new Float64Array(buffer, kernelLayout.FACETS, 9 * kernelFacets),
    bytes: new Uint8Array(buffer, kernelLayout.FACETS),
  };
}

/** Empties the sums and says about which origin they are. */
export function beginSums({ numbers }: KernelInstance, origin: Vector3): void {
  numbers.fill(0, 0, (kernelLayout.SIZES >> 3) + sizeCount);
  numbers.set(origin, kernelLayout.ORIGIN >> 3);
}

export function readSums({ numbers }: KernelInstance): FacetSums {
  const sums = createFacetSums();
  sums.high.set(numbers.subarray(kernelLayout.HIGH >> 3, (kernelLayout.HIGH >> 3) + sumCount));
  sums.low.set(numbers.subarray(kernelLayout.LOW >> 3, (kernelLayout.LOW >> 3) + sumCount));
  sums.sizes.set(numbers.subarray(kernelLayout.SIZES >> 3, (kernelLayout.SIZES >> 3) + sizeCount));
  return sums;
}

/** Puts facets into the kernel's memory. The lanes take two at a time: after an odd number follows one of no size, which adds nothing but zeros. */
export function putCorners({ corners: target }: KernelInstance, corners: Float64Array, from: number, count: number, [x, y, z]: Vector3): number {
  target.set(corners.subarray(9 * from, 9 * (from + count)));
  if (count % 2 === 0) return count;
  for (let at = 9 * count; at < 9 * count + 9; at += 3) {
    target[at] = x;
    target[at + 1] = y;
    target[at + 2] = z;
  }
  return count + 1;
}

/** Sums by the compiled kernel; undefined where it can't run. */
export function createCompiledSumming(kind: 'usual' | 'careful', origin: Vector3): Summing | undefined {
  const kernel = borrowKernel();
  if (kernel === undefined) return undefined;
  beginSums(kernel, origin);
  return {
    add(corners, count) {
      for (let from = 0; from < count; from += kernelFacets) {
        const some = Math.min(kernelFacets, count - from);
        const even = putCorners(kernel, corners, from, some, origin);
        if (kind === 'usual') kernel.integrateCorners(even);
        else kernel.integrateCornersCarefully(some);
      }
    },
    finish() {
      const sums = readSums(kernel);
      returnKernel(kernel);
      return sums;
    },
  };
}
