import type { StatementRecord } from '@masswright/contracts';
import { formatCount, formatFigure } from '@masswright/units';
import { isFailed, type FileRecord } from './make-record';

const digits = 6;
const figure = (value: number | null | undefined, factor = 1): string => (value === null || value === undefined ? '–' : formatFigure(value * factor, { digits }));
const figures = (values: readonly number[] | null | undefined, factor = 1): string[] => [0, 1, 2].map((k) => figure(values?.[k], factor));

/** Lengths in millimetres, moments in kg·mm²: numbers that are read at a glance for parts of a hand's size. */
const headings = ['file', 'facets', 'mesh', 'volume cm³', 'mass kg', 'x mm', 'y mm', 'z mm', 'I₁ kg·mm²', 'I₂ kg·mm²', 'I₃ kg·mm²', 'I axis kg·mm²'];

function describeMesh({ soundness }: StatementRecord): string {
  if (soundness.defensible) return soundness.turned ? 'closed, turned' : soundness.closed === false ? 'hairline gaps' : 'closed';
  if (soundness.closed === null) return 'edges do not cancel';
  if (!soundness.closed) return 'open';
  return soundness.oriented ? 'not defensible' : 'wound both ways';
}

function writeRow(record: StatementRecord): string[] {
  return [
    record.file,
    formatCount(record.facets),
    describeMesh(record),
    figure(record.volumeM3, 1e6),
    figure(record.massKg),
    ...figures(record.centreOfMassM, 1e3),
    ...figures(record.principalMomentsKgM2, 1e6),
    figure(record.aboutAxis?.inertiaKgM2, 1e6),
  ];
}

/** All records in aligned columns, with what the figures are about below them; files that failed follow with their reasons. */
export function writeTable(records: readonly FileRecord[]): string {
  const measured = records.filter((record): record is StatementRecord => !isFailed(record));
  const rows = [headings, ...measured.map(writeRow)];
  const widths = headings.map((_, column) => Math.max(...rows.map((row) => row[column]?.length ?? 0)));
  const lines = rows.map((row) => row.map((cell, column) => (column === 0 || column === 2 ? cell.padEnd(widths[column] ?? 0) : cell.padStart(widths[column] ?? 0))).join('  ').trimEnd());
  const failures = records.filter(isFailed).map(({ file, error }) => `${file}: ${error.message}`);
  const caption = [
    'x, y, z: centre of mass in the mesh frame. I₁, I₂, I₃: principal moments about the centre of mass, ascending.',
    'I axis: moment about the axis that was asked for. Products and all digits are in --format json and csv; an off-diagonal element there is -∫xy dm.',
  ];
  return [...(measured.length > 0 ? [...lines, '', ...caption] : []), ...(measured.length > 0 && failures.length > 0 ? [''] : []), ...failures, ''].join('\n');
}
