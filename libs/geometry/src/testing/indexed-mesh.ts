import type { Corners } from './shapes';

/** A mesh as most formats list it: places that differ, and three of them for each triangle. */
export interface IndexedMesh {
  vertices: number[];
  triangles: number[];
}

export function indexMesh(corners: Corners): IndexedMesh {
  const numbers = new Map<string, number>();
  const triangles: number[] = [];
  const vertices: number[] = [];
  for (let at = 0; at < corners.length; at += 3) {
    const place = corners.subarray(at, at + 3);
    const key = place.join(' ');
    if (!numbers.has(key)) {
      numbers.set(key, numbers.size);
      vertices.push(...place);
    }
    triangles.push(numbers.get(key) ?? 0);
  }
  return { vertices, triangles };
}

/** The items of a list in groups of three. */
export const inThrees = (list: readonly number[]): number[][] => Array.from({ length: list.length / 3 }, (_, k) => list.slice(3 * k, 3 * k + 3));
