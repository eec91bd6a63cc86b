import { emptyBox, extendBox } from '../../bounding-box';
import { batchFacets, createFacetBatch } from '../../facet-batch';
import { isDegenerate } from '../../facet-shape';
import { integrateBody } from '../../integrate-body';
import type { FindingKind, Vector3 } from '../../measurement';
import { createWelder, type WeldedMesh } from '../../weld-corners';
import { examineMesh, type Examination } from '../examine-mesh';

export function weldFacets(corners: ArrayLike<number>): WeldedMesh {
  const facets = corners.length / 9;
  const welder = createWelder(facets);
  const batch = createFacetBatch();
  for (let first = 0; first < facets; first += batchFacets) {
    batch.count = Math.min(batchFacets, facets - first);
    for (let k = 0; k < 9 * batch.count; k++) batch.corners[k] = corners[9 * first + k] ?? 0;
    welder.add(batch);
  }
  return welder.finish();
}

/** Examines a mesh that is given as nine coordinates a facet, as the measurer does. */
export function examineCorners(corners: Float64Array, maximumIntersectionFacets?: number, maximumFacetsMet?: number): Examination {
  const mesh = weldFacets(corners);
  const boundingBox = emptyBox();
  extendBox(boundingBox, { corners, normals: new Float64Array(0), count: mesh.facetCount, first: 0 });
  const { min, max } = boundingBox;
  const origin = Array.from(corners.subarray(0, 3), (coordinate) => coordinate + 0) as Vector3;
  const diagonal = Math.hypot(max[0] - min[0], max[1] - min[1], max[2] - min[2]);
  const degenerate = Array.from({ length: mesh.facetCount }, (_, facet) => facet).filter((facet) => isDegenerate(corners, 9 * facet));
  return examineMesh(mesh, {
    origin,
    boundingBox,
    remarks: { 'degenerate-facets': { count: degenerate.length, facets: degenerate.slice(0, 20) } },
    body: integrateBody(mesh, origin, diagonal),
    maximumIntersectionFacets,
    maximumFacetsMet,
  });
}

export const countFindings = ({ soundness }: Examination): Partial<Record<FindingKind, number>> => Object.fromEntries(soundness.findings.map(({ kind, count }) => [kind, count]));
