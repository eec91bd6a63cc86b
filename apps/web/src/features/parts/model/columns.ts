import type { ExportColumn, PartSort } from '@masswright/contracts';
import { alignedColumns, listUnits, type AlignedColumn, type ColumnRooms } from './row-figures';

/** Columns that the list of parts can have, in the order in which they are offered. */
export const columnIds = ['number', 'name', 'revision', 'material', 'unit', 'size', 'volume', 'mass', 'beam', 'moment1', 'moment2', 'moment3', 'soundness', 'state', 'file', 'changed'] as const;
export type ColumnId = (typeof columnIds)[number];

/** What is shown until a person chooses otherwise. */
export const standardColumns: readonly ColumnId[] = ['number', 'name', 'revision', 'material', 'unit', 'size', 'mass', 'beam', 'moment1', 'moment2', 'moment3', 'soundness', 'state'];

export interface Column {
  id: ColumnId;
  /** What the chooser and a screen reader call it. */
  name: string;
  /** What stands at its head, where that is shorter. */
  head?: string;
  unit?: string;
  /** The least; wider only where the figures of the list have more digits. The name alone takes what is left. */
  width: number;
  isNumeric?: boolean;
  /** Figures of the body: empty while something is missing, and then its reason stands in their place. */
  isFigure?: boolean;
  sort?: PartSort;
  /** What of an export it stands for. */
  exported?: ExportColumn;
}

const { length, volume, mass, inertia } = listUnits;
const moment = (number: 1 | 2 | 3): Column => ({
  id: `moment${number}`,
  name: `Principal moment ${number}`,
  head: `I${'₁₂₃'.charAt(number - 1)}`,
  unit: inertia.symbol,
  width: 98,
  isNumeric: true,
  isFigure: true,
  sort: `moment${number}`,
  exported: 'moments',
});

const all: readonly Column[] = [
  { id: 'number', name: 'Number', head: 'No.', width: 46, isNumeric: true, sort: 'number', exported: 'number' },
  { id: 'name', name: 'Part', width: 130, sort: 'name', exported: 'name' },
  { id: 'revision', name: 'Revision', head: 'Rev', width: 36, exported: 'revision' },
  { id: 'material', name: 'Material', width: 132, sort: 'material', exported: 'material' },
  { id: 'unit', name: 'Unit', width: 48, sort: 'unit', exported: 'unit' },
  { id: 'size', name: 'Size', unit: length.symbol, width: 178, isNumeric: true, isFigure: true, sort: 'size', exported: 'size' },
  { id: 'volume', name: 'Volume', unit: volume.symbol, width: 112, isNumeric: true, isFigure: true, sort: 'volume', exported: 'volume' },
  { id: 'mass', name: 'Mass', unit: mass.symbol, width: 84, isNumeric: true, isFigure: true, sort: 'mass', exported: 'mass' },
  { id: 'beam', name: 'Balance along x, y and z', head: 'Balance x y z', width: 118, isFigure: true, exported: 'centre' },
  moment(1),
  moment(2),
  moment(3),
  { id: 'soundness', name: 'Mesh', width: 126, exported: 'soundness' },
  { id: 'state', name: 'State', width: 178, sort: 'state', exported: 'state' },
  { id: 'file', name: 'File', width: 190, sort: 'file', exported: 'file' },
  { id: 'changed', name: 'Setting changed', head: 'Changed', width: 170, sort: 'changed' },
];

const byId = new Map(all.map((column) => [column.id, column]));

export function getColumn(id: ColumnId): Column {
  const column = byId.get(id);
  if (!column) throw new RangeError(`There is no column ${id}.`);
  return column;
}

/** Of a digit of the list, and of what stands about a cell's content. */
const digitWidth = 7.2;
const cellPadding = 12;
const isAligned = (id: ColumnId): id is AlignedColumn & ColumnId => (alignedColumns as readonly string[]).includes(id);

/** As wide as its figures need, so that none is cut off. */
export function computeColumnWidth(id: ColumnId, rooms: ColumnRooms): number {
  const { width } = getColumn(id);
  if (!isAligned(id)) return width;
  const { before, behind } = rooms[id];
  return Math.max(width, Math.ceil((before + behind) * digitWidth) + cellPadding);
}

export const isColumnId = (text: string): text is ColumnId => byId.has(text as ColumnId);

/** A choice of columns as text, `number,name,mass`; what names none, or one twice, is passed over, and a list without names gets them. */
export function readColumns(text: string | null | undefined): readonly ColumnId[] | undefined {
  const ids = [...new Set((text ?? '').split(',').filter(isColumnId))];
  if (ids.length === 0) return undefined;
  return ids.includes('name') ? ids : ['name', ...ids];
}

export const writeColumns = (ids: readonly ColumnId[]): string => ids.join(',');
export const isStandard = (ids: readonly ColumnId[]): boolean => writeColumns(ids) === writeColumns(standardColumns);

/** The names of an export's columns for those that are shown, in their order. */
export function chooseExportColumns(ids: readonly ColumnId[]): ExportColumn[] {
  return [...new Set(ids.map((id) => getColumn(id).exported).filter((name) => name !== undefined))];
}

/** The longest run of figure columns that stand side by side: there is the room for a sentence in their place. */
export function findFigureRun(ids: readonly ColumnId[], isEmpty: (id: ColumnId) => boolean): { start: number; length: number; width: number } | undefined {
  let best: { start: number; length: number; width: number } | undefined;
  let start = 0;
  while (start < ids.length) {
    let end = start;
    let width = 0;
    for (let id = ids[end]; id !== undefined && getColumn(id).isFigure && isEmpty(id); id = ids[end]) {
      width += getColumn(id).width;
      end += 1;
    }
    if (end > start && width > (best?.width ?? 0)) best = { start, length: end - start, width };
    start = Math.max(end, start + 1);
  }
  return best;
}
