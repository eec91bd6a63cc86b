import { tooManyFacets } from '../format-reader';
import type { ReadingLimits } from '../limits';
import type { MeshFormat } from '../measurement';
import { MeshError, spellCount, type MeshPlace } from '../mesh-error';
import { plyTypeBytes, type PlyElement, type PlyHeader } from './ply-header';

/** Throws a MeshError where a PLY file can't hold a mesh of faces, by its header alone. */
export function checkPlyHeader({ elements }: PlyHeader, format: MeshFormat, limits: ReadingLimits, at: MeshPlace): void {
  const find = (name: string): PlyElement | undefined => elements.find((element) => element.name === name);
  const [vertex, face] = [find('vertex'), find('face')];
  const strips = find('tristrips');
  if (strips !== undefined && strips.count > 0) throw new MeshError('syntax-invalid', 'This PLY file has triangle strips, which are not read. Export the mesh with one face for each triangle.', at);
  if (face === undefined || face.count === 0) throw new MeshError('facets-none', 'This PLY file has points but no faces. Export it as a mesh of triangles.', at);
  if (vertex === undefined) throw new MeshError('syntax-invalid', 'This PLY file has faces but no vertices. Export the mesh again.', at);
  for (const axis of ['x', 'y', 'z']) {
    if (vertex.properties.filter(({ name, countType }) => name === axis && countType === null).length !== 1) {
      throw new MeshError('syntax-invalid', `The vertices of this PLY file have no ${axis}, or more than one. Export the mesh again.`, at);
    }
  }
  const corners = face.properties.filter(({ name, type, countType }) => countType !== null && (name === 'vertex_indices' || name === 'vertex_index') && type !== 'float' && type !== 'double');
  if (corners.length !== 1) throw new MeshError('syntax-invalid', 'The faces of this PLY file have no list "vertex_indices" of whole numbers, or more than one. Export the mesh again.', at);
  if (elements.indexOf(face) < elements.indexOf(vertex)) throw new MeshError('syntax-invalid', 'This PLY file has its faces before its vertices, which is not read. Export the mesh again.', at);
  if (vertex.count > limits.maximumVertices) {
    throw new MeshError('too-many-vertices', `The mesh (PLY) has more than ${spellCount(limits.maximumVertices)} vertices, the most that can be examined here. Reduce it or split it into parts.`, at);
  }
  if (face.count > limits.maximumFacets) throw tooManyFacets(limits.maximumFacets, format, at);
}

/** Bytes that a triangle takes in a binary file. */
export function countTriangleBytes({ elements }: PlyHeader): number {
  const face = elements.find(({ name }) => name === 'face');
  return (face?.properties ?? []).reduce((sum, { type, countType }) => sum + (countType === null ? plyTypeBytes[type] : plyTypeBytes[countType] + 3 * plyTypeBytes[type]), 0);
}
