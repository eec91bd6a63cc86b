import { findDiagonal, type BoundingBox } from '../bounding-box';
import { integrateBody, type BodyIntegrals } from '../integrate-body';
import type { Vector3 } from '../measurement';
import { checkDuplicates } from './duplicates';
import { checkEdges, findUnusualEdges } from './edges';
import { createEdgeTable } from './edge-table';
import type { Notes } from './notes';
import { examineOpenings, type OpenMesh } from './openings';
import { checkOrientation } from './orientation';
import { findShells, type ShellTable } from './shells';
import { checkVertices } from './vertices';

export interface SurfaceExamination {
  closed: boolean;
  oriented: boolean;
  /** The signed volume as stored is positive; of a mesh without one, that about the middle of the box. */
  outward: boolean;
  /** Groups of facets with the same corners. */
  duplicates: number[][];
  /** For each facet 1 where it is turned against its neighbours; undefined where none is. */
  flipped: Uint8Array | undefined;
  /** Undefined where the mesh is closed. */
  open: OpenMesh | undefined;
  /** Of the mesh, or of the one that closes its hairlines. */
  shells: ShellTable;
}

/** How the facets of a mesh hang together; notes what is wrong with edges, vertices and winding. */
export function examineSurface(notes: Notes, { origin, boundingBox, body }: { origin: Vector3; boundingBox: BoundingBox; body: BodyIntegrals }): SurfaceExamination {
  const { mesh } = notes;
  const { min, max } = boundingBox;
  const diagonal = findDiagonal(boundingBox);
  const middle: Vector3 = [min[0] + (max[0] - min[0]) / 2, min[1] + (max[1] - min[1]) / 2, min[2] + (max[2] - min[2]) / 2];
  const table = createEdgeTable(mesh);
  const unusual = findUnusualEdges(mesh, table);
  checkEdges(notes, table, unusual);
  checkVertices(notes, table);
  const duplicates = checkDuplicates(notes, table);
  const flipped = checkOrientation(notes, table);
  const closed = notes.count('boundary-edges') === 0;
  const oriented = closed && notes.count('unbalanced-edges') === 0;
  const open = closed ? undefined : examineOpenings(notes, table, unusual, origin, middle, diagonal);
  const outward = oriented ? body.volumeSign > 0 : (open?.outward ?? integrateBody(mesh, middle, diagonal).volumeSign > 0);
  if (open?.closed === undefined) return { closed, oriented, outward, duplicates, flipped, open, shells: findShells(mesh, table, unusual, oriented && body.volumeSign < 0) };
  // Where hairlines are closed, shells are those of the closed mesh.
  const { mesh: work, body: closedBody, joined } = open.closed;
  const closedTable = createEdgeTable(work);
  const shells = findShells(work, closedTable, findUnusualEdges(work, closedTable), closedBody.volumeSign < 0, joined);
  return { closed, oriented, outward, duplicates, flipped, open, shells };
}
