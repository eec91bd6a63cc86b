import { findDiagonal } from './bounding-box';
import { examineMesh } from './examination/examine-mesh';
import { noOccurrence, type Occurrence } from './examination/notes';
import type { FacetBatch } from './facet-batch';
import { estimateFacetDoubt } from './facet-doubt/estimate-facet-doubt';
import { createFacetPass, type PassFindings } from './facet-pass';
import { isDegenerate, isNormalContradicting } from './facet-shape';
import { finishBody, sumSelection, turnIntegrals, type BodyIntegrals } from './integrate-body';
import { carefulKernel, type Summing } from './kernel/summing';
import type { ReadingLimits } from './limits';
import { findingFacets, measuringVersion, type FindingKind, type Measurement } from './measurement';
import { createMeshReader, type MeshSummary } from './mesh-reader';
import { createWelder, type WeldedMesh, type Welder } from './weld-corners';

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
 * Measures and examines a mesh file that arrives in chunks. The result depends on the bytes alone, not on how they were cut: the same bytes give the same bits.
 * Memory grows with the facets received, never with what a header declares: some 200 bytes a facet at the most.
 */
export function createMeasurer(options: MeasurerOptions): Measurer {
  let welder: Welder | undefined;
  const pass = createFacetPass();
  const degenerate = noOccurrence();
  const contradicting = noOccurrence();
  const reader = createMeshReader({ ...options, onFacets });

  function onFacets(batch: FacetBatch): void {
    pass.takeBatch(batch);
    examineFacets(batch, degenerate, contradicting);
    welder ??= beginWelding();
    welder.add(batch);
  }

  function beginWelding(): Welder {
    const { most, expected } = reader.facetsToCome;
    return createWelder(most, expected);
  }

  function finish(): Measurement {
    const summary = reader.finish();
    const mesh = (welder ?? beginWelding()).finish();
    return examine(mesh, pass.finish(), summary, {
      'degenerate-facets': degenerate,
      'contradicting-normals': contradicting,
      'trailing-bytes': { count: summary.trailingBytes, facets: [] },
      'several-solids': { count: summary.solids > 1 ? summary.solids : 0, facets: [] },
      'nonzero-attributes': summary.nonzeroAttributes,
      'non-planar-polygons': summary.nonPlanarPolygons,
      'folded-polygons': summary.foldedPolygons,
    });
  }

  return {
    push: (chunk) => reader.push(chunk),
    finish,
    get facetsRead() {
      return reader.facetsRead;
    },
  };
}

/** Measures and examines a mesh file that is at hand as a whole. Throws a MeshError where it cannot be measured. */
export function measureMesh(bytes: Uint8Array, options: Partial<ReadingLimits> = {}): Measurement {
  const measurer = createMeasurer({ sizeBytes: bytes.length, ...options });
  if (bytes.length > 0) measurer.push(bytes);
  return measurer.finish();
}

function examine(mesh: WeldedMesh, { sums, origin, boundingBox }: PassFindings, summary: MeshSummary, remarks: Partial<Record<FindingKind, Occurrence>>): Measurement {
  const body = finishBody(sums, findDiagonal(boundingBox), () => sumSelection(carefulKernel, mesh, origin));
  const { soundness, shells, openings, volume, turned } = examineMesh(mesh, { origin, boundingBox, remarks, body });
  return {
    ...describe(summary),
    // Bodies too many and too entangled to be told apart: how they lie in each other is not known.
    examined: soundness.cavities === null ? 'limited' : 'whole',
    origin,
    boundingBox,
    volume,
    surface: body.surface,
    soundness,
    shells,
    openings,
    facetDoubt: volume && estimateFacetDoubt(mesh, { origin, centreFromOrigin: volume.centreFromOrigin, sign: 1, ...(turned === null ? {} : { turned }) }),
  };
}

/** What a measurement says of the file itself. */
function describe({ format, compression, facets, polygonVolume, declaredUnit, declaredMaterials }: MeshSummary) {
  return { measuringVersion, format, compression, declaredUnit, declaredMaterials, facets, polygonVolume };
}

/** A reading of a file for its integrals and whether it is closed, and nothing else. Memory is constant for STL. */
export interface IntegralsPass {
  push(chunk: Uint8Array): void;
  /**
   * The measurement; or another pass, to which the same bytes are to be pushed once more from the beginning, where rounding did too much for the usual kernel.
   * Throws a MeshError where the file cannot be measured.
   */
  finish(): { kind: 'measured'; measurement: Measurement } | { kind: 'again'; pass: IntegralsPass };
  readonly facetsRead: number;
}

/**
 * Measures a mesh file that arrives in chunks as far as constant memory allows: integrals with their bounds, box, and whether the mesh is closed and oriented.
 * The integrals have the same bits as those of `createMeasurer`, unless that finds shells to be turned or hairlines to be closed. What was not examined is null; where
 * the edges do not cancel, `oriented` is false, `closed` is not known and the mesh is not defensible as far as it stands.
 */
export function createIntegralsPass(options: MeasurerOptions): IntegralsPass {
  const pass = createFacetPass();
  const reader = createMeshReader({ ...options, onFacets: (batch) => pass.takeBatch(batch), packed: pass.packed });
  return {
    push: (chunk) => reader.push(chunk),
    finish() {
      const summary = reader.finish();
      const found = pass.finish();
      let wantsCare = false;
      const body = finishBody(found.sums, findDiagonal(found.boundingBox), () => {
        wantsCare = true;
        return found.sums;
      });
      return wantsCare ? { kind: 'again', pass: createCarefulPass(options, found) } : { kind: 'measured', measurement: concludeIntegrals(summary, found, body) };
    },
    get facetsRead() {
      return reader.facetsRead;
    },
  };
}

function createCarefulPass(options: MeasurerOptions, found: PassFindings): IntegralsPass {
  const summing: Summing = carefulKernel(found.origin);
  const reader = createMeshReader({ ...options, onFacets: (batch) => summing.add(batch.corners, batch.count) });
  return {
    push: (chunk) => reader.push(chunk),
    finish() {
      const summary = reader.finish();
      const body = finishBody(found.sums, findDiagonal(found.boundingBox), () => summing.finish());
      return { kind: 'measured', measurement: concludeIntegrals(summary, found, body) };
    },
    get facetsRead() {
      return reader.facetsRead;
    },
  };
}

function concludeIntegrals(summary: MeshSummary, { origin, boundingBox, edgesCancel }: PassFindings, { volume, volumeSign, surface }: BodyIntegrals): Measurement {
  const turned = edgesCancel && volumeSign < 0;
  const defensible = edgesCancel && volumeSign !== 0;
  return {
    ...describe(summary),
    examined: 'integrals',
    origin,
    boundingBox,
    volume: !defensible ? null : turned ? turnIntegrals(volume) : volume,
    surface,
    soundness: {
      closed: edgesCancel ? true : null,
      oriented: edgesCancel,
      outward: volumeSign > 0,
      turned,
      boundaryEdges: edgesCancel ? 0 : null,
      nonManifoldEdges: null,
      nonManifoldVertices: null,
      degenerateFacets: null,
      duplicateFacets: null,
      shells: null,
      cavities: null,
      selfIntersections: null,
      defensible,
      findings: [],
    },
    shells: null,
    openings: null,
    facetDoubt: null,
  };
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
