import { beginSums, blockedRoundings, borrowKernel, computeErrorBound, kernelFacets, readSums, returnKernel } from '@masswright/geometry/kernels';

const headerBytes = 84;
const facetBytes = 50;

/** The compiled kernel alone, without the sketch of the edges: twenty integrals of a binary STL file in memory, and their bound. */
export function integratePacked(bytes: Uint8Array): number {
  const kernel = borrowKernel();
  if (kernel === undefined) throw new Error('The compiled kernel does not run here.');
  const view = new DataView(bytes.buffer, bytes.byteOffset);
  beginSums(kernel, [view.getFloat32(96, true), view.getFloat32(100, true), view.getFloat32(104, true)]);
  for (let at = headerBytes; at < bytes.length; at += kernelFacets * facetBytes) {
    const piece = bytes.subarray(at, at + kernelFacets * facetBytes);
    kernel.bytes.set(piece);
    // All pieces but the last are of an even number; the last facet of an odd one is left out here.
    kernel.integrateStl(Math.floor(piece.length / facetBytes / 2) * 2);
  }
  const sums = readSums(kernel);
  returnKernel(kernel);
  return computeErrorBound(sums, 'body', 1, blockedRoundings);
}
