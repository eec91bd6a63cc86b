import { emptyBox, extendBox, type BoundingBox } from './bounding-box';
import type { FacetBatch } from './facet-batch';
import type { DeclaredUnit, MeshCompression, MeshFormat, Vector3 } from './measurement';
import { createMeshReader, type MeshReaderOptions } from './mesh-reader';

/** What can be said of a mesh without examining it, in its own unit. */
export interface QuickFigures {
  format: MeshFormat;
  compression: MeshCompression | null;
  /** Null where the file states none. */
  declaredUnit: DeclaredUnit | null;
  facets: number;
  boundingBox: BoundingBox;
  /**
   * Size of the sum of the signed tetrahedra over all facets, about the first corner. The volume of a mesh that is closed and oriented, which is
   * not examined; of any other a number that says nothing.
   */
  volume: number;
}

export interface QuickReader {
  push(chunk: Uint8Array): void;
  finish(): QuickFigures;
}

/**
 * Reads a mesh file for a first look: the same readers as for a measurement, but nothing is kept of the facets, so that memory is constant for STL.
 * `push` and `finish` throw a MeshError as the measurer does. None of this is a measurement, and none of it may be recorded.
 */
export function createQuickReader(options: Omit<MeshReaderOptions, 'onFacets'>): QuickReader {
  const boundingBox = emptyBox();
  const origin: Vector3 = [0, 0, 0];
  let sixfold = 0;
  const reader = createMeshReader({ ...options, onFacets });

  function onFacets(batch: FacetBatch): void {
    if (batch.first === 0) for (let k = 0; k < 3; k++) origin[k] = batch.corners[k] ?? 0;
    extendBox(boundingBox, batch);
    sixfold += sumTetrahedra(batch, origin);
  }

  return {
    push: (chunk) => reader.push(chunk),
    finish() {
      const { format, compression, declaredUnit, facets } = reader.finish();
      return { format, compression, declaredUnit, facets, boundingBox, volume: Math.abs(sixfold) / 6 };
    },
  };
}

/** Six times the signed volume between a point and the facets of a batch. */
function sumTetrahedra({ corners, count }: FacetBatch, [ox, oy, oz]: Vector3): number {
  let sum = 0;
  for (let at = 0; at < 9 * count; at += 9) {
    const ax = (corners[at] ?? 0) - ox, ay = (corners[at + 1] ?? 0) - oy, az = (corners[at + 2] ?? 0) - oz;
    const bx = (corners[at + 3] ?? 0) - ox, by = (corners[at + 4] ?? 0) - oy, bz = (corners[at + 5] ?? 0) - oz;
    const cx = (corners[at + 6] ?? 0) - ox, cy = (corners[at + 7] ?? 0) - oy, cz = (corners[at + 8] ?? 0) - oz;
    sum += ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx);
  }
  return sum;
}
