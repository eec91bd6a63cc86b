import { inThrees, indexMesh } from './indexed-mesh';
import type { Corners } from './shapes';

/** Writes a mesh as OFF. */
export function writeOff(corners: Corners): string {
  const { vertices, triangles } = indexMesh(corners);
  return ['OFF', `${vertices.length / 3} ${triangles.length / 3} 0`, ...inThrees(vertices).map((place) => place.join(' ')), ...inThrees(triangles).map((face) => `3 ${face.join(' ')}`), ''].join('\n');
}
