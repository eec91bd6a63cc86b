import { emptyBox, extendBox, type BoundingBox } from './bounding-box';
import { createSketch, drawSecrets } from './closedness-sketch';
import type { FacetBatch } from './facet-batch';
import type { FacetSums } from './facet-sums';
import { beginSums, borrowKernel, putCorners, readSums, returnKernel, type KernelInstance } from './kernel/compiled-kernel';
import { kernelFacets, kernelLayout } from './kernel/kernel-memory';
import { referenceKernel, type Summing } from './kernel/summing';
import type { Vector3 } from './measurement';
import type { NotFinite, PackedFacetSink } from './packed-facets';

/** What one reading of a mesh gives in constant memory. */
export interface PassFindings {
  sums: FacetSums;
  origin: Vector3;
  boundingBox: BoundingBox;
  /** Every edge is run along as often one way as the other: the mesh is closed and oriented, but for a probability near 2^-128. */
  edgesCancel: boolean;
}

/** One reading of a mesh for its integrals, its box and whether its edges cancel. */
export interface FacetPass {
  takeBatch(batch: FacetBatch): void;
  /** Where the compiled kernel runs, it takes the facets of a binary STL file as they are. */
  readonly packed: PackedFacetSink | undefined;
  finish(): PassFindings;
}

export function createFacetPass(): FacetPass {
  const kernel = borrowKernel();
  return kernel === undefined ? createReferencePass() : createCompiledPass(kernel);
}

/** Adding 0 makes +0 of -0, which JSON could not keep. */
const readOrigin = ({ corners: [x = 0, y = 0, z = 0] }: FacetBatch): Vector3 => [x + 0, y + 0, z + 0];

/** The same in TypeScript: slow, and with the same bits. */
export function createReferencePass(): FacetPass {
  const boundingBox = emptyBox();
  const sketch = createSketch(drawSecrets());
  let origin: Vector3 = [0, 0, 0];
  let summing: Summing | undefined;
  return {
    takeBatch(batch) {
      if (batch.first === 0) origin = readOrigin(batch);
      summing ??= referenceKernel(origin);
      summing.add(batch.corners, batch.count);
      sketch.add(batch.corners, batch.count);
      extendBox(boundingBox, batch);
    },
    packed: undefined,
    finish() {
      const [one, two] = sketch.sums;
      return { sums: (summing ?? referenceKernel(origin)).finish(), origin, boundingBox, edgesCancel: one === 0n && two === 0n };
    },
  };
}

const facetBytes = 50;
const coordinatesAt = 12;

function createCompiledPass(kernel: KernelInstance): FacetPass {
  const boundingBox = emptyBox();
  const sketchAt = kernelLayout.SKETCH >> 3;
  let origin: Vector3 = [0, 0, 0];
  kernel.words.fill(0n, sketchAt, sketchAt + 2);
  kernel.words.set(drawSecrets(), kernelLayout.SECRETS >> 3);
  const packed = createPackedSink(kernel, (first) => {
    origin = first;
    beginSums(kernel, first);
  });
  return {
    takeBatch(batch) {
      if (batch.first === 0) {
        origin = readOrigin(batch);
        beginSums(kernel, origin);
      }
      kernel.integrateCorners(putCorners(kernel, batch.corners, 0, batch.count, origin));
      kernel.sketchCorners(batch.count);
      extendBox(boundingBox, batch);
    },
    packed,
    finish() {
      packed.extendBox(boundingBox);
      const edgesCancel = kernel.words[sketchAt] === 0n && kernel.words[sketchAt + 1] === 0n;
      const sums = readSums(kernel);
      returnKernel(kernel);
      return { sums, origin, boundingBox, edgesCancel };
    },
  };
}

/** Gathers packed facets in the kernel's memory and integrates them whenever it is full. */
function createPackedSink(kernel: KernelInstance, begin: (origin: Vector3) => void): PackedFacetSink & { extendBox: (box: BoundingBox) => void } {
  const { bytes, box } = kernel;
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const readCoordinate = (facet: number, place: number): number => view.getFloat32(facetBytes * facet + coordinatesAt + 4 * place, true);
  let filled = 0;
  let done = 0;
  box.fill(Infinity, 0, 12);
  box.fill(-Infinity, 12, 24);

  function run(): NotFinite | undefined {
    if (filled === 0) return undefined;
    if (done === 0) begin([readCoordinate(0, 0) + 0, readCoordinate(0, 1) + 0, readCoordinate(0, 2) + 0]);
    kernel.sketchStl(filled);
    if (!box.every((edge) => Number.isFinite(edge))) return findNotFinite();
    kernel.integrateStl(padFacets());
    done += filled;
    filled = 0;
    return undefined;
  }

  /** The lanes take two facets at a time: after an odd number follows one of no size at the origin, which adds nothing but zeros. */
  function padFacets(): number {
    if (filled % 2 === 0) return filled;
    const origin = kernel.numbers.subarray(kernelLayout.ORIGIN >> 3, (kernelLayout.ORIGIN >> 3) + 3);
    for (let place = 0; place < 9; place++) view.setFloat32(facetBytes * filled + coordinatesAt + 4 * place, origin[place % 3] ?? 0, true);
    return filled + 1;
  }

  function findNotFinite(): NotFinite | undefined {
    for (let index = 0; index < 9 * filled; index++) {
      const [facet, place] = [Math.floor(index / 9), index % 9];
      const coordinate = readCoordinate(facet, place);
      if (!Number.isFinite(coordinate)) return { facet: done + facet, place, coordinate };
    }
    return undefined;
  }

  return {
    add(source, at, count) {
      for (let taken = 0; taken < count; ) {
        const some = Math.min(kernelFacets - filled, count - taken);
        bytes.set(source.subarray(at + facetBytes * taken, at + facetBytes * (taken + some)), facetBytes * filled);
        filled += some;
        taken += some;
        const notFinite = filled === kernelFacets ? run() : undefined;
        if (notFinite !== undefined) return notFinite;
      }
      return undefined;
    },
    finish: run,
    extendBox({ min, max }) {
      if (done === 0) return;
      // Twelve numbers of a facet stand in three rows of four: corner after corner, and the last coordinate in all of the third row.
      for (let place = 0; place < 9; place++) {
        const k = place % 3;
        min[k] = Math.min(min[k] ?? 0, box[place] ?? 0) + 0;
        max[k] = Math.max(max[k] ?? 0, box[12 + place] ?? 0) + 0;
      }
    },
  };
}
