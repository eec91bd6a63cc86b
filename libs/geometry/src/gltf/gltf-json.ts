import { MeshError, spellCount, type MeshErrorCode } from '../mesh-error';
import { showText } from '../mesh-words';
import { findJsonPlace, type JsonPath } from './find-json-place';

/** An object of the JSON of a glTF model. What it is asked for is checked, and refused with its place where it is something else. */
export interface JsonObject {
  readonly path: JsonPath;
  /** What a sentence calls it: `accessors[3]`. */
  readonly name: string;
  has(key: string): boolean;
  /** A whole number that is not negative. */
  whole(key: string): number;
  wholeOr<Other>(key: string, other: Other): number | Other;
  /** So many finite numbers; undefined where there are none. */
  numbers(key: string, count: number): number[] | undefined;
  /** Whole numbers that are not negative, as many as there are. */
  indices(key: string): number[];
  text(key: string): string | undefined;
  /** As many texts as there are. */
  texts(key: string): string[];
  flag(key: string): boolean;
  object(key: string): JsonObject | undefined;
  /** How many items a list has; 0 where there is none. */
  count(key: string): number;
  /** One of a list's objects. */
  item(key: string, index: number): JsonObject;
  refuse(code: MeshErrorCode, message: string, key?: string): never;
}

/** A refusal at a place of the JSON. */
export type RefuseJson = (code: MeshErrorCode, message: string, path: JsonPath) => never;

const isObject = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null && !Array.isArray(value);
const isWhole = (value: unknown): value is number => typeof value === 'number' && Number.isSafeInteger(value) && value >= 0;

function spellPath(path: JsonPath): string {
  return path.length === 0 ? 'The document' : path.map((step, k) => (typeof step === 'number' ? `[${step}]` : `${k > 0 ? '.' : ''}${showText(step, 40)}`)).join('');
}

/**
 * Parses the JSON of a glTF model.
 *
 * @param bytes the text, in UTF-8
 * @param start where it begins in the file
 */
export function parseGltfJson(bytes: Uint8Array, start: number): JsonObject {
  let value: unknown;
  try {
    value = JSON.parse(new TextDecoder().decode(bytes));
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error;
    // Where the engine says where.
    const place = /position (\d+)/.exec(error.message)?.[1];
    throw new MeshError('syntax-invalid', 'The JSON of this glTF model is damaged, or was cut off. Export it again.', { byte: start + Math.min(bytes.length, Number(place ?? 0)) });
  }
  const refuse: RefuseJson = (code, message, path) => {
    throw new MeshError(code, message, { byte: start + findJsonPlace(bytes, path) });
  };
  if (!isObject(value) || !isObject(value['asset'])) throw new MeshError('format-unknown', 'This is a JSON document, but no glTF model: it does not say so under "asset". Give the mesh itself.', { byte: start });
  return wrapObject(value, [], refuse);
}

function wrapObject(fields: Record<string, unknown>, path: JsonPath, refuseAt: RefuseJson): JsonObject {
  const get = (key: string): unknown => (Object.hasOwn(fields, key) ? fields[key] : undefined);
  const refuse = (code: MeshErrorCode, message: string, key?: string): never => refuseAt(code, message, key === undefined ? path : [...path, key]);
  const refuseValue = (key: string, wanted: string): never => refuse('syntax-invalid', `In this glTF model, ${spellPath([...path, key])} is not ${wanted}. Export it again.`, key);

  function getList(key: string): unknown[] {
    const list = get(key);
    if (list === undefined) return [];
    return Array.isArray(list) ? (list as unknown[]) : refuseValue(key, 'a list');
  }

  const whole = (key: string): number => {
    const value = get(key);
    return isWhole(value) ? value : refuseValue(key, 'a whole number');
  };

  return {
    path,
    name: spellPath(path),
    has: (key) => get(key) !== undefined,
    whole,
    wholeOr: (key, other) => (get(key) === undefined ? other : whole(key)),
    numbers(key, count) {
      const list = get(key);
      if (list === undefined) return undefined;
      const isRight = Array.isArray(list) && list.length === count && list.every((value) => typeof value === 'number' && Number.isFinite(value));
      return isRight ? (list as number[]) : refuseValue(key, `a list of ${count} numbers`);
    },
    indices(key) {
      const list = getList(key);
      return list.every(isWhole) ? list : refuseValue(key, 'a list of whole numbers');
    },
    text(key) {
      const value = get(key);
      return value === undefined || typeof value === 'string' ? value : refuseValue(key, 'a text');
    },
    texts(key) {
      const list = getList(key);
      return list.every((value) => typeof value === 'string') ? list : refuseValue(key, 'a list of texts');
    },
    flag: (key) => get(key) === true,
    object(key) {
      const value = get(key);
      if (value === undefined) return undefined;
      return isObject(value) ? wrapObject(value, [...path, key], refuseAt) : refuseValue(key, 'an object');
    },
    count: (key) => getList(key).length,
    item(key, index) {
      const list = getList(key);
      if (index >= list.length) refuse('syntax-invalid', `This glTF model refers to ${spellPath([...path, key, index])}, but there ${list.length === 1 ? 'is' : 'are'} ${spellCount(list.length)}. Export it again.`, key);
      const value = list[index];
      return isObject(value) ? wrapObject(value, [...path, key, index], refuseAt) : refuseAt('syntax-invalid', `In this glTF model, ${spellPath([...path, key, index])} is not an object. Export it again.`, [...path, key, index]);
    },
    refuse,
  };
}
