import type { FacetBatch } from './facet-batch';
import type { Vector3 } from './measurement';

export interface BoundingBox {
  min: Vector3;
  max: Vector3;
}

/** A box that any corner extends. */
export const emptyBox = (): BoundingBox => ({ min: [Infinity, Infinity, Infinity], max: [-Infinity, -Infinity, -Infinity] });

/** Extends a box by the corners of a batch. Adding 0 makes +0 of -0, which JSON could not keep. */
export function extendBox({ min, max }: BoundingBox, { corners, count }: FacetBatch): void {
  for (let k = 0; k < 3; k++) {
    let least = min[k] ?? 0;
    let greatest = max[k] ?? 0;
    for (let at = k; at < 9 * count; at += 3) {
      const coordinate = (corners[at] ?? 0) + 0;
      if (coordinate < least) least = coordinate;
      if (coordinate > greatest) greatest = coordinate;
    }
    min[k] = least;
    max[k] = greatest;
  }
}
