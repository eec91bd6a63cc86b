import type { Finding, Integrals, Measurement, Soundness, Symmetric3, Vector3 } from '@masswright/contracts';
import type { measurements } from '../schema';

const vectorOf = (values: readonly number[] | null): Vector3 => {
  const [x, y, z] = values ?? [];
  if (x === undefined || y === undefined || z === undefined) throw new Error('A stored vector has fewer than three elements.');
  return [x, y, z];
};
const symmetricOf = (values: readonly number[] | null): Symmetric3 => {
  const [xx, yy, zz, xy, yz, zx] = values ?? [];
  if (xx === undefined || yy === undefined || zz === undefined || xy === undefined || yz === undefined || zx === undefined) {
    throw new Error('A stored tensor has fewer than six elements.');
  }
  return { xx, yy, zz, xy, yz, zx };
};
const listOf = ({ xx, yy, zz, xy, yz, zx }: Symmetric3): number[] => [xx, yy, zz, xy, yz, zx];

type MeasurementRow = typeof measurements.$inferSelect;

/** The measurement that a row holds, bit for bit. */
export function presentMeasurement(row: MeasurementRow): Measurement {
  const volume: Integrals | null =
    row.volume === null
      ? null
      : { content: row.volume, centreFromOrigin: vectorOf(row.volumeCentreFromOrigin), second: symmetricOf(row.volumeSecond), errorBound: row.volumeErrorBound };
  return {
    measuringVersion: row.measuringVersion,
    format: row.format,
    compression: row.compression,
    declaredUnit: row.declaredUnit,
    declaredMaterials: row.declaredMaterials,
    examined: row.examined,
    facets: row.facets,
    origin: vectorOf(row.origin),
    boundingBox: { min: vectorOf(row.boxMin), max: vectorOf(row.boxMax) },
    volume,
    surface: { content: row.area, centreFromOrigin: vectorOf(row.areaCentreFromOrigin), second: symmetricOf(row.areaSecond), errorBound: row.areaErrorBound },
    soundness: presentSoundness(row),
    shells: row.listedShells,
    openings: row.openings,
    polygonVolume: row.polygonVolume,
    facetDoubt: row.facetDoubt,
  };
}

function presentSoundness(row: MeasurementRow): Soundness {
  const { closed, oriented, outward, turned, boundaryEdges, nonManifoldEdges, nonManifoldVertices, degenerateFacets, duplicateFacets, shells, cavities, selfIntersections, defensible } = row;
  // Measuring version m1 kept no lines.
  const findings = row.findings.map((finding) => ({ ...finding, lines: (finding as Partial<Finding>).lines ?? [] }));
  return { closed, oriented, outward, turned, boundaryEdges, nonManifoldEdges, nonManifoldVertices, degenerateFacets, duplicateFacets, shells, cavities, selfIntersections, defensible, findings };
}

/** What an examination may find otherwise than the integrals alone say. */
export function examinedOf({ volume, soundness, examined, openings, facetDoubt, shells }: Measurement) {
  return {
    ...soundness,
    examined,
    volume: volume?.content ?? null,
    volumeCentreFromOrigin: volume?.centreFromOrigin ?? null,
    volumeSecond: volume === null ? null : listOf(volume.second),
    volumeErrorBound: volume?.errorBound ?? 0,
    openings,
    facetDoubt,
    listedShells: shells,
  };
}

/** The columns that hold a measurement. */
export function rowOf(measurement: Measurement) {
  const { measuringVersion, format, compression, declaredUnit, declaredMaterials, facets, origin, boundingBox, surface, polygonVolume } = measurement;
  return {
    ...{ measuringVersion, format, compression, declaredUnit, declaredMaterials, facets, origin, polygonVolume },
    boxMin: boundingBox.min,
    boxMax: boundingBox.max,
    area: surface.content,
    areaCentreFromOrigin: surface.centreFromOrigin,
    areaSecond: listOf(surface.second),
    areaErrorBound: surface.errorBound,
    ...examinedOf(measurement),
  };
}
