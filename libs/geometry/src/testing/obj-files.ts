import type { Corners } from './shapes';

export const encode = (text: string): Uint8Array<ArrayBuffer> => Uint8Array.from(text, (character) => character.charCodeAt(0));

/** An OBJ text of a mesh: equal corners become one vertex, and every coordinate keeps all its digits. */
export function writeObj(corners: Corners): string {
  const numbers = new Map<string, number>();
  const faces: number[] = [];
  for (let at = 0; at < corners.length; at += 3) {
    const line = `v ${corners.subarray(at, at + 3).join(' ')}`;
    if (!numbers.has(line)) numbers.set(line, numbers.size + 1);
    faces.push(numbers.get(line) ?? 0);
  }
  const lines = Array.from({ length: faces.length / 3 }, (_, facet) => `f ${faces.slice(3 * facet, 3 * facet + 3).join(' ')}`);
  return [...numbers.keys(), ...lines, ''].join('\n');
}

/** A block of 2 × 3 × 4 by its eight vertices and six faces, outward. */
export const blockVertices = ['0 0 0', '2 0 0', '0 3 0', '2 3 0', '0 0 4', '2 0 4', '0 3 4', '2 3 4'];
export const blockFaces = [[1, 3, 4, 2], [5, 6, 8, 7], [1, 2, 6, 5], [3, 7, 8, 4], [1, 5, 7, 3], [2, 4, 8, 6]];
export const blockObj = `${blockVertices.map((vertex) => `v ${vertex}\n`).join('')}${blockFaces.map((face) => `f ${face.join(' ')}\n`).join('')}`;
