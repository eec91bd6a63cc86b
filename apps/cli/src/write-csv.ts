import type { StatementRecord } from '@masswright/contracts';
import { stringify } from 'csv-stringify/sync';
import { isFailed, type FileRecord } from './make-record';

type Cell = string | number | boolean | null | undefined;
type Read = (record: StatementRecord) => Cell;

const perAxis = (name: (axis: 'x' | 'y' | 'z') => string, read: (record: StatementRecord, k: 0 | 1 | 2) => Cell): [string, Read][] =>
  (['x', 'y', 'z'] as const).map((axis, k) => [name(axis), (record) => read(record, k as 0 | 1 | 2)]);
const perMoment = (name: (number: number) => string, read: (record: StatementRecord, k: 0 | 1 | 2) => Cell): [string, Read][] =>
  ([0, 1, 2] as const).map((k) => [name(k + 1), (record) => read(record, k)]);

/** Names of columns, each with its unit, its point, its axes and its sign, and what stands in it. */
const columns: readonly [string, Read][] = [
  ['sha256', ({ sha256 }) => sha256],
  ['format', ({ format }) => format],
  ['length_unit_of_mesh', ({ lengthUnit }) => lengthUnit],
  ['facets', ({ facets }) => facets],
  ['measuring_version', ({ measuringVersion }) => measuringVersion],
  ['defensible', ({ soundness }) => soundness.defensible],
  ['closed', ({ soundness }) => soundness.closed],
  ['oriented', ({ soundness }) => soundness.oriented],
  ['turned', ({ soundness }) => soundness.turned],
  ['shells', ({ soundness }) => soundness.shells],
  ['findings', ({ soundness }) => soundness.findings.map(({ kind, count }) => `${kind} ${count}`).join('; ')],
  ['density_kg_m3', ({ densityKgM3 }) => densityKgM3],
  ['volume_m3', ({ volumeM3 }) => volumeM3],
  ['area_m2', ({ areaM2 }) => areaM2],
  ['mass_kg', ({ massKg }) => massKg],
  ['mass_uncertainty_kg_k2', ({ uncertainty }) => uncertainty?.massKg],
  ...perAxis((axis) => `size_${axis}_m`, ({ boundingBoxM: { min, max } }, k) => max[k] - min[k]),
  ...perAxis((axis) => `centre_of_mass_${axis}_m_in_mesh_frame`, ({ centreOfMassM }, k) => centreOfMassM?.[k]),
  ...(['xx', 'yy', 'zz'] as const).map((element): [string, Read] => [`inertia_${element}_kg_m2_about_centre_of_mass_axes_of_mesh_frame`, (record) => record.inertiaAtCentreOfMassKgM2?.[element]]),
  ...(['xy', 'yz', 'zx'] as const).map((element): [string, Read] => [`inertia_${element}_equal_to_minus_integral_of_${element}_dm_kg_m2_about_centre_of_mass_axes_of_mesh_frame`, (record) => record.inertiaAtCentreOfMassKgM2?.[element]]),
  ...perMoment((number) => `principal_moment_${number}_kg_m2_about_centre_of_mass`, ({ principalMomentsKgM2 }, k) => principalMomentsKgM2?.[k]),
  ...perMoment((number) => `radius_of_gyration_${number}_m`, ({ radiiOfGyrationM }, k) => radiiOfGyrationM?.[k]),
  ['principal_axes', ({ axes }) => axes],
  ['moment_about_axis_kg_m2', ({ aboutAxis }) => aboutAxis?.inertiaKgM2],
  ['radius_of_gyration_about_axis_m', ({ aboutAxis }) => aboutAxis?.radiusOfGyrationM],
  ...perAxis((axis) => `axis_direction_${axis}_in_mesh_frame`, ({ aboutAxis }, k) => aboutAxis?.direction[k]),
  ...perAxis((axis) => `axis_point_${axis}_m_in_mesh_frame`, ({ aboutAxis }, k) => aboutAxis?.pointM[k]),
];

const options = { record_delimiter: '\r\n', quoted_match: /[\r\n]/u };
/** What a spreadsheet takes for a formula; with an apostrophe before it, it is text to it. */
const dangerous = /^'*[=+\-@\t\r\n＝＋－＠]/u;
const write = (cell: Cell): string => (cell === null || cell === undefined ? '' : typeof cell === 'string' && dangerous.test(cell) ? `'${cell}` : String(cell));

export const csvHeader = stringify([['file', ...columns.map(([name]) => name), 'error_code', 'error_message']], options);

/** A row as RFC 4180 wants it. Numbers have all their digits; what isn't known is empty. */
export function writeCsvRow(record: FileRecord): string {
  const cells = isFailed(record)
    ? [record.file, ...columns.map(() => null), record.error.code, record.error.message]
    : [record.file, ...columns.map(([, read]) => read(record)), null, null];
  return stringify([cells.map(write)], options);
}
