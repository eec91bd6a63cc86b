import { emptyBox, extendBox, findDiagonal } from './bounding-box';
import type { FacetBatch } from './facet-batch';
import { isDegenerate, isNormalContradicting } from './facet-shape';
import { createFacetSums } from './facet-sums';
import { finishBody, sumSelection, turnIntegrals } from './integrate-body';
import { integrateBlocked } from './integrate-blocked';
import { integrateDoubleDouble } from './integrate-double-double';
import type { ReadingLimits } from './limits';
import { findingFacets, measuringVersion, type Measurement, type Vector3 } from './measurement';
import { createMeshReader } from './mesh-reader';
import { checkConnections, judgeSoundness, noOccurrence, type Occurrence } from './soundness';
import { createWelder, type Welder } from './weld-corners';

/** Limits that are not given are the usual ones; the README says what memory they come to. */
export interface MeasurerOptions extends Partial<ReadingLimits> {
  /** Size of the whole file, packed where it is packed; exactly so many bytes must be pushed. */
  sizeBytes: number;
}

export interface Measurer {
  /** Takes the next bytes of the file, in chunks of any size. Throws a MeshError as soon as the file must be refused. */
  push(chunk: Uint8Array): void;
  /** What was found. Throws a MeshError where the file cannot be measured. Half of the work of a large mesh is done here. */
  finish(): Measurement;
  readonly facetsRead: number;
}

/**
 * Measures a mesh file that arrives in chunks. The result depends on the bytes alone, not on how they were cut: the same bytes give the same bits.
 * Memory grows with the facets received, never with what a header declares.
 */
export function createMeasurer(options: MeasurerOptions): Measurer {
  let welder: Welder | undefined;
  const sums = createFacetSums();
  const origin: Vector3 = [0, 0, 0];
  const boundingBox = emptyBox();
  const degenerate = noOccurrence();
  const contradicting = noOccurrence();
  const reader = createMeshReader({ ...options, onFacets });

  function onFacets(batch: FacetBatch): void {
    // Adding 0 makes +0 of -0, which JSON could not keep.
    if (batch.first === 0) for (let k = 0; k < 3; k++) origin[k] = (batch.corners[k] ?? 0) + 0;
    integrateBlocked(sums, origin, batch.corners, batch.count);
    extendBox(boundingBox, batch);
    examineFacets(batch, degenerate, contradicting);
    welder ??= beginWelding();
    welder.add(batch);
  }

  function beginWelding(): Welder {
    const { most, expected } = reader.facetsToCome;
    return createWelder(most, expected);
  }

  function finish(): Measurement {
    const { format, compression, facets, trailingBytes, solids, nonzeroAttributes, nonPlanarPolygons, foldedPolygons } = reader.finish();
    const mesh = (welder ?? beginWelding()).finish();
    const connections = checkConnections(mesh);
    const diagonal = findDiagonal(boundingBox);
    const body = finishBody(sums, diagonal, () => sumSelection(integrateDoubleDouble, mesh, origin));
    const soundness = judgeSoundness(connections, body.volumeSign, {
      'degenerate-facets': degenerate,
      'contradicting-normals': contradicting,
      'trailing-bytes': { count: trailingBytes, facets: [] },
      'several-solids': { count: solids > 1 ? solids : 0, facets: [] },
      'nonzero-attributes': nonzeroAttributes,
      'non-planar-polygons': nonPlanarPolygons,
      'folded-polygons': foldedPolygons,
    });
    return {
      measuringVersion,
      format,
      compression,
      declaredUnit: null,
      declaredMaterials: [],
      examined: 'whole',
      facets,
      origin,
      boundingBox,
      volume: soundness.defensible ? (soundness.turned ? turnIntegrals(body.volume) : body.volume) : null,
      surface: body.surface,
      soundness,
      shells: null,
      openings: null,
      polygonVolume: 0,
      facetDoubt: null,
    };
  }

  return {
    push: (chunk) => reader.push(chunk),
    finish,
    get facetsRead() {
      return reader.facetsRead;
    },
  };
}

/** Measures a mesh file that is at hand as a whole. Throws a MeshError where it cannot be measured. */
export function measureMesh(bytes: Uint8Array, options: Partial<ReadingLimits> = {}): Measurement {
  const measurer = createMeasurer({ sizeBytes: bytes.length, ...options });
  if (bytes.length > 0) measurer.push(bytes);
  return measurer.finish();
}

function examineFacets(batch: FacetBatch, degenerate: Occurrence, contradicting: Occurrence): void {
  const { corners, normals } = batch;
  for (let facet = 0; facet < batch.count; facet++) {
    const at = 9 * facet;
    if (isDegenerate(corners, at)) note(degenerate, batch.first + facet);
    else if (isNormalContradicting(corners, at, normals[3 * facet] ?? 0, normals[3 * facet + 1] ?? 0, normals[3 * facet + 2] ?? 0)) {
      note(contradicting, batch.first + facet);
    }
  }
}

function note(occurrence: Occurrence, facet: number): void {
  occurrence.count += 1;
  if (occurrence.facets.length < findingFacets) occurrence.facets.push(facet);
}
