import { exportColumns, type ExportColumn, type PartState, type StatementRecord } from '@masswright/contracts';
import type { StoredPart } from '@masswright/drizzle';
import { revisionLetter } from '../parts/part.presenter';
import type { CsvCell } from '../platform/csv';

/** A part as a table tells of it. `record` is there once the file is measured and its unit stated. */
export interface ExportedPart {
  stored: StoredPart;
  record: StatementRecord | undefined;
  state: PartState;
}

type Read = (part: ExportedPart) => CsvCell;
/** Names of columns, each with what stands in it. A unit is part of the name; point, axes and sign convention have columns beside the figures. */
type Columns = Record<string, Read>;

const ofRecord = (read: (record: StatementRecord) => CsvCell | undefined): Read => ({ record }) => (record === undefined ? null : (read(record) ?? null));
/** Said wherever the figures that it belongs to are. */
const said = (text: string, isThere: (record: StatementRecord) => unknown): Read => ofRecord((record) => (isThere(record) ? text : null));

const tensor = (record: StatementRecord) => record.inertiaAtCentreOfMassKgM2;
const axis = (number: 0 | 1 | 2): Columns =>
  Object.fromEntries((['x', 'y', 'z'] as const).map((along, k) => [`principal_axis_${number + 1}_${along}`, ofRecord((record) => record.principalAxes?.[number][k])]));

const columns: Record<ExportColumn, Columns> = {
  number: { number: ({ stored }) => stored.part.number },
  name: { name: ({ stored }) => stored.part.name },
  revision: { revision: ({ stored }) => revisionLetter(stored.revision.ordinal) },
  file: { folder: ({ stored }) => stored.upload.folder, file: ({ stored }) => stored.upload.fileName },
  sha256: { sha256: ({ stored }) => stored.upload.sha256?.toString('hex') ?? null },
  material: { material: ({ stored }) => stored.setting.materialName },
  unit: { length_unit: ({ stored }) => stored.setting.lengthUnit },
  // Of the record: a weighing may have set another than the material's.
  density: { density_kg_m3: ({ stored, record }) => (record === undefined ? stored.setting.densityKgM3 : record.densityKgM3) },
  facets: { facets: ({ stored }) => stored.measurement?.facets ?? null },
  size: Object.fromEntries(
    (['x', 'y', 'z'] as const).map((along, k) => [`size_${along}_m`, ofRecord(({ boundingBoxM: { min, max } }) => (max[k] ?? NaN) - (min[k] ?? NaN))]),
  ),
  volume: { volume_m3: ofRecord(({ volumeM3 }) => volumeM3) },
  area: { area_m2: ofRecord(({ areaM2 }) => areaM2) },
  mass: { mass_kg: ofRecord(({ massKg }) => massKg) },
  // Expanded, k = 2. The predicted correction of the facets is no part of it and has columns of its own.
  uncertainty: {
    volume_uncertainty_m3: ofRecord(({ uncertainty }) => uncertainty?.volumeM3),
    mass_uncertainty_kg: ofRecord(({ uncertainty }) => uncertainty?.massKg),
    coverage_factor: ofRecord(({ uncertainty }) => uncertainty?.k),
    volume_correction_m3: ofRecord(({ correction }) => correction?.volumeM3),
    mass_correction_kg: ofRecord(({ correction }) => correction?.massKg),
  },
  centre: {
    centre_of_mass_x_m: ofRecord(({ centreOfMassM }) => centreOfMassM?.[0]),
    centre_of_mass_y_m: ofRecord(({ centreOfMassM }) => centreOfMassM?.[1]),
    centre_of_mass_z_m: ofRecord(({ centreOfMassM }) => centreOfMassM?.[2]),
    centre_of_mass_frame: said('mesh frame', ({ centreOfMassM }) => centreOfMassM),
  },
  tensor: {
    ...Object.fromEntries((['xx', 'yy', 'zz', 'xy', 'yz', 'zx'] as const).map((element) => [`inertia_${element}_kg_m2`, ofRecord((record) => tensor(record)?.[element])])),
    tensor_point: said('centre of mass', tensor),
    tensor_axes: said('mesh frame', tensor),
    // Begun with a name: a text that begins with a minus sign is a formula to a spreadsheet.
    off_diagonals: ofRecord((record) => tensor(record) && `inertia_xy = ${tensor(record)?.offDiagonals}`),
  },
  moments: {
    principal_moment_1_kg_m2: ofRecord(({ principalMomentsKgM2 }) => principalMomentsKgM2?.[0]),
    principal_moment_2_kg_m2: ofRecord(({ principalMomentsKgM2 }) => principalMomentsKgM2?.[1]),
    principal_moment_3_kg_m2: ofRecord(({ principalMomentsKgM2 }) => principalMomentsKgM2?.[2]),
    principal_moments_point: said('centre of mass', ({ principalMomentsKgM2 }) => principalMomentsKgM2),
    principal_moments_axes: said('principal axes', ({ principalMomentsKgM2 }) => principalMomentsKgM2),
  },
  axes: { ...axis(0), ...axis(1), ...axis(2), principal_axes_frame: said('mesh frame', ({ principalAxes }) => principalAxes), principal_axes_kind: ofRecord(({ axes }) => axes) },
  radii: {
    radius_of_gyration_1_m: ofRecord(({ radiiOfGyrationM }) => radiiOfGyrationM?.[0]),
    radius_of_gyration_2_m: ofRecord(({ radiiOfGyrationM }) => radiiOfGyrationM?.[1]),
    radius_of_gyration_3_m: ofRecord(({ radiiOfGyrationM }) => radiiOfGyrationM?.[2]),
    radii_of_gyration_about: said('principal axes through the centre of mass', ({ radiiOfGyrationM }) => radiiOfGyrationM),
  },
  soundness: Object.fromEntries(
    (['defensible', 'closed', 'oriented', 'outward', 'turned'] as const).map((verdict) => [verdict, ({ stored }: ExportedPart) => stored.measurement?.[verdict] ?? null]),
  ),
  // Empty where it was not examined; `examined` says how far the examination went.
  shells: {
    shells: ({ stored }) => stored.measurement?.shells ?? null,
    cavities: ({ stored }) => stored.measurement?.cavities ?? null,
    self_intersections: ({ stored }) => stored.measurement?.selfIntersections ?? null,
    examined: ({ stored }) => stored.measurement?.examined ?? null,
  },
  state: { state: ({ state }) => state },
};

export interface ExportTable {
  header: string[];
  readRow: (part: ExportedPart) => CsvCell[];
}

/** The table with the columns that are asked for, in that order, each once; with all of them where none is. */
export function makeExportTable(asked: string): ExportTable {
  const names = asked === '' ? exportColumns : [...new Set(asked.split(','))].flatMap((name) => exportColumns.find((known) => known === name) ?? []);
  const chosen = names.flatMap((name) => Object.entries(columns[name]));
  return { header: chosen.map(([name]) => name), readRow: (part) => chosen.map(([, read]) => read(part)) };
}
