import { parse } from 'csv-parse/sync';
import { createMaterialRequest, materialGroupNames, materialGroups, type CreateMaterialRequest, type ImportMaterialsAnswer } from '@masswright/contracts';
import { materialNameKey } from '@masswright/mechanics';
import { parseQuantity } from '@masswright/units';
import { byteOrderMark, unguardText, writeCsv } from '../platform/csv';
import type { KnownMaterial } from './find-known-material';

export type ImportError = ImportMaterialsAnswer['errors'][number];
export interface ReadMaterial {
  /** As in the file; the header is row 1. */
  row: number;
  material: CreateMaterialRequest;
}

const header = ['name', 'group', 'density_kg_m3', 'spread_kg_m3', 'spread_basis', 'source'] as const;
/** Columns whose cells carry a unit, beside those whose name does. */
const known = [...header, 'density', 'spread'] as const;
type Column = (typeof known)[number];
/** The page calls a group a family. */
const otherNames: Readonly<Record<string, Column>> = { family: 'group' };
const mostRows = 5000;

export function writeMaterialsCsv(materials: readonly KnownMaterial[]): string {
  const rows = materials.map(({ name, group, densityKgM3, densitySpreadKgM3, spreadBasis, source }) => [name, group, densityKgM3, densitySpreadKgM3, spreadBasis, source]);
  return byteOrderMark + writeCsv([header, ...rows]);
}

/** Reads a table of materials: the good rows, and what is wrong with the others, by row and column in words. */
export function readMaterialsCsv(text: string): { read: ReadMaterial[]; errors: ImportError[] } {
  const rows = splitRows(text);
  if (!Array.isArray(rows)) return { read: [], errors: [rows] };
  const [first = [], ...rest] = rows;
  const places = new Map<Column, number>();
  const errors: ImportError[] = [];
  first.forEach((cell, place) => {
    const name = cell.trim().toLowerCase().replace(/[\s-]+/gu, '_');
    const column = known.find((one) => one === (otherNames[name] ?? name));
    if (column !== undefined && !places.has(column)) places.set(column, place);
    else if (name !== '') errors.push({ row: 1, column: cell.trim(), message: column === undefined ? `The column ${cell.trim()} is not known here and is left out. Known are ${known.join(', ')}.` : `The column ${column} is there twice; the first is taken.` });
  });
  const missing = findMissing(places);
  if (missing !== undefined) return { read: [], errors: [...errors, missing] };
  if (rest.length > mostRows) return { read: [], errors: [{ row: mostRows + 2, column: null, message: `The file has ${rest.length} materials; ${mostRows} can be taken at once. Cut it in pieces.` }] };
  const seen = new Map<string, number>();
  const read: ReadMaterial[] = [];
  rest.forEach((cells, index) => {
    const row = index + 2;
    if (cells.every((cell) => cell.trim() === '')) return;
    const result = readRow(row, (column) => unguardText(cells[places.get(column) ?? -1]?.trim() ?? ''), cells.length > first.length, seen);
    if ('material' in result) read.push(result);
    else errors.push(...result.errors);
  });
  return { read, errors };
}

function splitRows(text: string): string[][] | ImportError {
  const body = text.startsWith(byteOrderMark) ? text.slice(1) : text;
  if (body.trim() === '') return { row: 1, column: null, message: `The file is empty. Its first row names the columns: ${header.join(',')}.` };
  const firstLine = body.split(/\r\n|\n|\r/u, 1)[0] ?? '';
  // Spreadsheets of many countries write semicolons. The header has none of these signs in a name.
  const delimiter = [',', ';', '\t'].reduce((best, sign) => (firstLine.split(sign).length > firstLine.split(best).length ? sign : best));
  try {
    return parse(body, { delimiter, relax_column_count: true, record_delimiter: ['\r\n', '\n', '\r'] });
  } catch (error) {
    const line = error instanceof Error && 'lines' in error && typeof error.lines === 'number' ? error.lines : 1;
    return { row: line, column: null, message: 'From here on the file can’t be read as a table: a quotation mark is open that is never closed, or stands inside a cell without being doubled.' };
  }
}

function findMissing(places: ReadonlyMap<Column, number>): ImportError | undefined {
  const lacks = (...either: Column[]) => (either.some((column) => places.has(column)) ? undefined : either.join(' or '));
  const missing = [lacks('name'), lacks('density_kg_m3', 'density'), lacks('spread_kg_m3', 'spread')].find((one) => one !== undefined);
  return missing === undefined ? undefined : { row: 1, column: missing, message: `The first row names the columns, and ${missing} is missing. It should be: ${header.join(',')}.` };
}

type Read = (column: Column) => string;

function readRow(row: number, cell: Read, isTooLong: boolean, seen: Map<string, number>): ReadMaterial | { errors: ImportError[] } {
  const errors: ImportError[] = [];
  const refuse = (column: string | null, message: string) => errors.push({ row, column, message });
  if (isTooLong) refuse(null, 'This row has more cells than the first. If a name or a number has a comma in it, put it in quotation marks.');
  const density = readDensity(cell, refuse);
  const spread = readSpread(cell, density, refuse);
  const parsed = createMaterialRequest.safeParse({
    name: cell('name'),
    group: readGroup(cell('group')),
    densityKgM3: density ?? 1,
    densitySpreadKgM3: spread ?? 0,
    spreadBasis: (cell('spread_basis') || 'judgement').toLowerCase(),
    source: cell('source'),
  });
  if (!parsed.success) for (const { path, message } of parsed.error.issues) refuse(columnOf[String(path[0])] ?? null, wordsOf[String(path[0])] ?? message);
  const key = materialNameKey(cell('name'));
  const earlier = seen.get(key);
  if (key !== '' && earlier !== undefined) refuse('name', `Row ${earlier} has this name already; the first is taken.`);
  else seen.set(key, row);
  return errors.length > 0 || !parsed.success ? { errors } : { row, material: parsed.data };
}

const foldGroup = (words: string): string => words.toLowerCase().replace(/[\s_-]+/gu, ' ').replace(/s$/u, '');
const groupsByWords = new Map(materialGroups.flatMap((group) => [[foldGroup(group), group], [foldGroup(materialGroupNames[group]), group]] as const));

/** A group by its own word or by those of the page, in singular or plural; other words are left for the contract to refuse. */
const readGroup = (words: string): string => (words === '' ? 'other' : (groupsByWords.get(foldGroup(words)) ?? words));

const columnOf: Record<string, string> = { name: 'name', group: 'group', densityKgM3: 'density_kg_m3', densitySpreadKgM3: 'spread_kg_m3', spreadBasis: 'spread_basis', source: 'source' };
/** Where the contract's own words say too little for a table. */
const wordsOf: Record<string, string> = { group: `A group is one of ${materialGroups.join(', ')}, or is named as on the page, such as ${materialGroupNames.polymer}.`, spreadBasis: 'The basis of a spread is source or judgement.' };

type Refuse = (column: string, message: string) => void;

function readDensity(cell: Read, refuse: Refuse): number | undefined {
  const column = cell('density_kg_m3') !== '' ? 'density_kg_m3' : cell('density') !== '' ? 'density' : 'density_kg_m3';
  const quantity = parseQuantity(cell(column), 'density', column === 'density' ? {} : { bareUnit: 'kg/m³' });
  if (!('error' in quantity)) return quantity.value;
  refuse(column, quantity.error);
  return undefined;
}

const share = /^(\d+(?:\.\d*)?|\.\d+)\s*%$/u;

/** As a density, or in per cent of it. */
function readSpread(cell: Read, densityKgM3: number | undefined, refuse: Refuse): number | undefined {
  const column = cell('spread_kg_m3') !== '' ? 'spread_kg_m3' : cell('spread') !== '' ? 'spread' : 'spread_kg_m3';
  const text = cell(column).replace(/^±\s*/u, '');
  const percent = share.exec(text)?.[1];
  if (percent !== undefined) return densityKgM3 === undefined ? undefined : (densityKgM3 * Number(percent)) / 100;
  const quantity = parseQuantity(text, 'density', column === 'spread' ? {} : { bareUnit: 'kg/m³' });
  if (!('error' in quantity)) return quantity.value;
  refuse(column, text === '' ? 'State by how much the density may be off, in kg/m³ or in per cent, such as 27 or 1 %.' : quantity.error);
  return undefined;
}
