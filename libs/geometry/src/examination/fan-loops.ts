import { allocate } from '../grow-array';
import type { WeldedMesh } from '../weld-corners';
import type { MeasuredLoop } from './hairlines';
import { pointOf } from './notes';

/** Facets that close loops, each from a step of the loop to its centre: nine coordinates a facet. */
export function fanLoops(mesh: WeldedMesh, loops: readonly MeasuredLoop[]): Float64Array {
  const added = allocate(() => new Float64Array(9 * loops.reduce((sum, { loop }) => sum + loop.vertices.length, 0)));
  let at = 0;
  for (const { loop, centre } of loops) {
    for (const [k, vertex] of loop.vertices.entries()) {
      added.set(pointOf(mesh, vertex), at);
      added.set(pointOf(mesh, loop.vertices[(k + 1) % loop.vertices.length] ?? 0), at + 3);
      added.set(centre, at + 6);
      at += 9;
    }
  }
  return added;
}

/** The mesh with its loops fanned: the same facets and vertices, then those of the fans. */
export function closeLoops(mesh: WeldedMesh, loops: readonly MeasuredLoop[]): WeldedMesh {
  const steps = loops.reduce((sum, { loop }) => sum + loop.vertices.length, 0);
  const corners = allocate(() => new Uint32Array(3 * (mesh.facetCount + steps)));
  corners.set(mesh.corners.subarray(0, 3 * mesh.facetCount));
  const coordinates = allocate(() => new Float64Array(3 * (mesh.vertexCount + loops.length)));
  coordinates.set(mesh.coordinates.subarray(0, 3 * mesh.vertexCount));
  let facet = mesh.facetCount;
  for (const [k, { loop, centre }] of loops.entries()) {
    coordinates.set(centre, 3 * (mesh.vertexCount + k));
    for (const [step, vertex] of loop.vertices.entries()) {
      corners.set([vertex, loop.vertices[(step + 1) % loop.vertices.length] ?? 0, mesh.vertexCount + k], 3 * facet);
      facet += 1;
    }
  }
  return { facetCount: facet, vertexCount: mesh.vertexCount + loops.length, corners, coordinates };
}
