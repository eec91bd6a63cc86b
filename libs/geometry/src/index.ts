export { createIntegralsPass, createMeasurer, measureMesh, type IntegralsPass, type Measurer, type MeasurerOptions } from './measurer';
export { findingKinds, measuringVersion } from './measurement';
export type { Finding, FindingKind, Integrals, Measurement, MeshCompression, MeshFormat, Soundness, Symmetric3, Vector3 } from './measurement';
export { MeshError, meshErrorCodes, type MeshErrorCode, type MeshPlace } from './mesh-error';
export { createMeshReader, type MeshReader, type MeshReaderOptions, type MeshSummary } from './mesh-reader';
export { defaultLimits, type ReadingLimits } from './limits';
export type { FacetBatch, FacetSink } from './facet-batch';
export { writeAsciiStl, writeBinaryStl, type FacetCorners } from './write-stl';
