import type { BoundingBox } from './bounding-box';
import type { FacetBatch } from './facet-batch';
import { createMeshReader, type MeshReaderOptions } from './mesh-reader';

export type AxisName = 'x' | 'y' | 'z';

/**
 * The outline of a mesh, seen along the shortest side of its box: `horizontal` runs to the right and `vertical` upwards, and neither is mirrored. The
 * cells run row by row from the upper left one; 1 where a facet reaches into the cell.
 */
export interface Silhouette {
  axis: AxisName;
  horizontal: AxisName;
  vertical: AxisName;
  width: number;
  height: number;
  cells: Uint8Array<ArrayBuffer>;
}

export interface SilhouetteOptions extends Omit<MeshReaderOptions, 'onFacets'> {
  /** The box of the mesh, as the first reading found it. */
  boundingBox: BoundingBox;
  /** Cells along the longer side of the picture. */
  cells: number;
}

export interface SilhouetteReader {
  push(chunk: Uint8Array): void;
  finish(): Silhouette;
}

const axisNames = ['x', 'y', 'z'] as const;
/** Seen from above, from the front (towards +y) and from the right. */
const views = { z: [0, 1], y: [0, 2], x: [1, 2] } as const;

/** Draws the outline of a mesh in a second reading of the same bytes. Memory is that of the reader and the cells. Throws a MeshError as the first did. */
export function createSilhouetteReader({ boundingBox, cells, ...options }: SilhouetteOptions): SilhouetteReader {
  const axis = findShortestSide(boundingBox);
  const [h, v] = views[axis];
  const side = (k: number): number => (boundingBox.max[k] ?? 0) - (boundingBox.min[k] ?? 0);
  const longest = Math.max(side(h), side(v));
  const perUnit = longest > 0 ? cells / longest : 0;
  const count = (k: number): number => Math.min(cells, Math.max(1, Math.ceil(side(k) * perUnit)));
  const [width, height] = [count(h), count(v)];
  const picture = new Uint8Array(width * height);
  const fill = createTriangleFiller(picture, width, height);
  const left = boundingBox.min[h], top = boundingBox.max[v];

  function onFacets({ corners, count: facets }: FacetBatch): void {
    const across = (at: number): number => ((corners[at + h] ?? 0) - left) * perUnit;
    const down = (at: number): number => (top - (corners[at + v] ?? 0)) * perUnit;
    for (let at = 0; at < 9 * facets; at += 9) fill(across(at), down(at), across(at + 3), down(at + 3), across(at + 6), down(at + 6));
  }

  const reader = createMeshReader({ ...options, onFacets });
  return {
    push: (chunk) => reader.push(chunk),
    finish() {
      reader.finish();
      return { axis, horizontal: axisNames[h], vertical: axisNames[v], width, height, cells: picture };
    },
  };
}

/** Of equal sides the one along z, then the one along y: a body is looked at from above, if nothing speaks against it. */
function findShortestSide({ min, max }: BoundingBox): AxisName {
  const [x, y, z] = [max[0] - min[0], max[1] - min[1], max[2] - min[2]];
  if (z <= y && z <= x) return 'z';
  return y <= x ? 'y' : 'x';
}

/**
 * Sets every cell that a triangle reaches into, row by row: in each row from the leftmost to the rightmost of its points there. Most facets of a
 * fine mesh lie in one row, and need no more than their extent.
 */
function createTriangleFiller(picture: Uint8Array, width: number, height: number): (ax: number, ay: number, bx: number, by: number, cx: number, cy: number) => void {
  let least = 0;
  let greatest = 0;

  /** Extends the span by the part of an edge between two heights. */
  function addEdge(px: number, py: number, qx: number, qy: number, upper: number, lower: number): void {
    if (Math.max(py, qy) < upper || Math.min(py, qy) > lower) return;
    const at = (y: number): number => (py === qy ? px : px + ((qx - px) * (Math.min(Math.max(y, Math.min(py, qy)), Math.max(py, qy)) - py)) / (qy - py));
    const one = at(upper), two = at(lower);
    least = Math.min(least, one, two);
    greatest = Math.max(greatest, one, two);
    if (py === qy) {
      least = Math.min(least, qx);
      greatest = Math.max(greatest, qx);
    }
  }

  function setSpan(row: number): void {
    const first = Math.min(width - 1, Math.max(0, Math.floor(least)));
    // What only touches a cell's left edge from without does not reach into it.
    const last = Math.max(first, Math.min(width, Math.ceil(greatest)) - 1);
    picture.fill(1, row * width + first, row * width + last + 1);
  }

  return (ax, ay, bx, by, cx, cy) => {
    const upper = Math.min(ay, by, cy), lower = Math.max(ay, by, cy);
    const firstRow = Math.min(height - 1, Math.max(0, Math.floor(upper)));
    const lastRow = Math.max(firstRow, Math.min(height, Math.ceil(lower)) - 1);
    for (let row = firstRow; row <= lastRow; row++) {
      if (firstRow === lastRow) {
        least = Math.min(ax, bx, cx);
        greatest = Math.max(ax, bx, cx);
      } else {
        least = Infinity;
        greatest = -Infinity;
        addEdge(ax, ay, bx, by, row, row + 1);
        addEdge(bx, by, cx, cy, row, row + 1);
        addEdge(cx, cy, ax, ay, row, row + 1);
      }
      setSpan(row);
    }
  };
}
