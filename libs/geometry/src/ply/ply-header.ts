import { MeshError, spellCount } from '../mesh-error';
import { showText } from '../mesh-words';

/** Numbers as PLY stores them, by their older names. */
export type PlyType = 'char' | 'uchar' | 'short' | 'ushort' | 'int' | 'uint' | 'float' | 'double';

const types: Readonly<Record<string, PlyType>> = {
  ...{ char: 'char', uchar: 'uchar', short: 'short', ushort: 'ushort', int: 'int', uint: 'uint', float: 'float', double: 'double' },
  ...{ int8: 'char', uint8: 'uchar', int16: 'short', uint16: 'ushort', int32: 'int', uint32: 'uint', float32: 'float', float64: 'double' },
};

export const plyTypeBytes: Readonly<Record<PlyType, number>> = { char: 1, uchar: 1, short: 2, ushort: 2, int: 4, uint: 4, float: 4, double: 8 };

export interface PlyProperty {
  name: string;
  type: PlyType;
  /** Of a list: how the number of its values is stored. Null for a single value. */
  countType: PlyType | null;
}

export interface PlyElement {
  name: string;
  count: number;
  properties: PlyProperty[];
}

export type PlyEncoding = 'ascii' | 'little-endian' | 'big-endian';

export interface PlyHeader {
  encoding: PlyEncoding;
  elements: PlyElement[];
}

const encodings: Readonly<Record<string, PlyEncoding>> = { ascii: 'ascii', binary_little_endian: 'little-endian', binary_big_endian: 'big-endian' };

const own = <Value>(table: Readonly<Record<string, Value>>, key: string | undefined): Value | undefined => (key !== undefined && Object.hasOwn(table, key) ? table[key] : undefined);

export interface PlyHeaderParser {
  /** Takes the next line. True where it ends the header. */
  takeLine(text: string): boolean;
  readonly header: PlyHeader;
  readonly line: number;
}

/**
 * Takes the header of a PLY file line by line. Elements and properties may have any names and come in any number and order. Words that PLY does not have
 * are passed over as long as no element was begun; after that they could stand for something that shifts all that follows, and are refused.
 */
export function createPlyHeaderParser(): PlyHeaderParser {
  const elements: PlyElement[] = [];
  let encoding: PlyEncoding | undefined;
  let line = 0;

  function refuse(message: string): never {
    throw new MeshError('syntax-invalid', `Line ${spellCount(line)} of the PLY header ${message}. Export the mesh again.`, { line });
  }

  function takeFormat(name: string | undefined, version: string | undefined): void {
    encoding = own(encodings, name);
    if (encoding === undefined) refuse('has no format that PLY knows (ascii, binary_little_endian, binary_big_endian)');
    if (version !== '1.0') refuse('has a version other than 1.0, the only one that is read');
  }

  function takeElement(name: string | undefined, count: string | undefined): void {
    if (name === undefined || count === undefined || !/^\d{1,15}$/.test(count)) refuse('has an element without a name or number');
    if (elements.some((element) => element.name === name)) refuse(`has the element "${showText(name, 24)}" for a second time`);
    elements.push({ name, count: Number(count), properties: [] });
  }

  function takeProperty(words: string[]): void {
    const element = elements.at(-1);
    if (element === undefined) refuse('has a property before any element');
    const isList = words[0] === 'list';
    const [typeName, name, more] = isList ? words.slice(2) : words;
    const countType = isList ? own(types, words[1]) : null;
    const type = own(types, typeName);
    if (type === undefined || countType === undefined || name === undefined || more !== undefined) refuse('has a property whose type or name PLY does not know');
    if (countType === 'float' || countType === 'double') refuse('has a list whose length is not a whole number');
    element.properties.push({ name, type, countType });
  }

  return {
    takeLine(text) {
      line += 1;
      const [word, ...rest] = text.split(/[ \t\v\f\r]+/).filter((part) => part !== '');
      if (line === 1 || word === undefined || word === 'comment' || word === 'obj_info') return false;
      if (word === 'format') takeFormat(rest[0], rest[1]);
      else if (word === 'element') takeElement(rest[0], rest[1]);
      else if (word === 'property') takeProperty(rest);
      else if (word === 'end_header') return true;
      else if (elements.length > 0) refuse('begins with a word that PLY does not have');
      return false;
    },
    get header() {
      if (encoding === undefined) refuse('ends it, and none before has said what format the file is in');
      return { encoding, elements };
    },
    get line() {
      return line;
    },
  };
}
