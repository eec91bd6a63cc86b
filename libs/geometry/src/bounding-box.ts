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

/** Length of a box's diagonal, in its unit. Scaled, so that squares of large and of small numbers stay in range. */
export function findDiagonal({ min, max }: BoundingBox): number {
  const x = max[0] - min[0], y = max[1] - min[1], z = max[2] - min[2];
  const scale = Math.max(x, y, z);
  if (!(scale > 0)) return 0;
  return scale * Math.sqrt((x / scale) * (x / scale) + (y / scale) * (y / scale) + (z / scale) * (z / scale));
}
