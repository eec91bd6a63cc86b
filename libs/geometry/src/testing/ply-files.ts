import { inThrees, indexMesh } from './indexed-mesh';
import { encode } from './obj-files';
import type { Corners } from './shapes';

export type PlyNumberType = 'char' | 'uchar' | 'short' | 'ushort' | 'int' | 'uint' | 'float' | 'double';
export type PlyEncodingName = 'ascii' | 'binary_little_endian' | 'binary_big_endian';

/** A value of a row: one number, or a list with the type of its length. */
export type PlyValue = [type: PlyNumberType, value: number] | [countType: PlyNumberType, type: PlyNumberType, values: number[]];

export interface PlyTable {
  name: string;
  /** A line of the header for each value of a row. */
  properties: string[];
  rows: PlyValue[][];
}

const isList = (value: PlyValue): value is [PlyNumberType, PlyNumberType, number[]] => value.length === 3;
const setters = { char: 'setInt8', uchar: 'setUint8', short: 'setInt16', ushort: 'setUint16', int: 'setInt32', uint: 'setUint32', float: 'setFloat32', double: 'setFloat64' } as const;
const sizes = { char: 1, uchar: 1, short: 2, ushort: 2, int: 4, uint: 4, float: 4, double: 8 } as const;

/** Writes any tables as PLY. */
export function writePlyTables(encoding: PlyEncodingName, tables: readonly PlyTable[], lineEnd = '\n'): Uint8Array<ArrayBuffer> {
  const header = ['ply', `format ${encoding} 1.0`, 'comment by a test', ...tables.flatMap(({ name, properties, rows }) => [`element ${name} ${rows.length}`, ...properties.map((line) => `property ${line}`)]), 'end_header', ''].join(lineEnd);
  const rows = tables.flatMap((table) => table.rows);
  if (encoding === 'ascii') return encode(header + rows.map((row) => row.map((value) => (isList(value) ? [value[2].length, ...value[2]] : [value[1]]).join(' ')).join(' ') + lineEnd).join(''));
  const numbers = rows.flatMap((row) => row.flatMap((value): [PlyNumberType, number][] => (isList(value) ? [[value[0], value[2].length], ...value[2].map((item): [PlyNumberType, number] => [value[1], item])] : [value])));
  const view = new DataView(new ArrayBuffer(header.length + numbers.reduce((sum, [type]) => sum + sizes[type], 0)));
  new Uint8Array(view.buffer).set(encode(header));
  let at = header.length;
  for (const [type, value] of numbers) {
    view[setters[type]](at, value, encoding === 'binary_little_endian');
    at += sizes[type];
  }
  return new Uint8Array(view.buffer);
}

export interface PlyChoices {
  coordinateType?: 'float' | 'double';
  countType?: PlyNumberType;
  indexType?: PlyNumberType;
  lineEnd?: string;
}

/** Writes a mesh as PLY. */
export function writePly(corners: Corners, encoding: PlyEncodingName, { coordinateType = 'double', countType = 'uchar', indexType = 'int', lineEnd }: PlyChoices = {}): Uint8Array<ArrayBuffer> {
  const { vertices, triangles } = indexMesh(corners);
  const points = inThrees(vertices).map((place) => place.map((value): PlyValue => [coordinateType, value]));
  const faces = inThrees(triangles).map((face): PlyValue[] => [[countType, indexType, face]]);
  return writePlyTables(
    encoding,
    [
      { name: 'vertex', properties: ['x', 'y', 'z'].map((axis) => `${coordinateType} ${axis}`), rows: points },
      { name: 'face', properties: [`list ${countType} ${indexType} vertex_indices`], rows: faces },
    ],
    lineEnd,
  );
}
