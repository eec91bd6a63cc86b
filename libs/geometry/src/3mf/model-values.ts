import { identity, type Affine } from '../affine';
import type { DeclaredUnit } from '../measurement';
import { isCoordinate } from '../mesh-words';

const units: Readonly<Record<string, DeclaredUnit>> = { micron: 'micron', millimeter: 'mm', centimeter: 'cm', inch: 'inch', foot: 'foot', meter: 'm' };

/** The unit of a model; the specification says millimetres where it says nothing. Undefined for a word that is none. */
export const parseUnit = (word = 'millimeter'): DeclaredUnit | undefined => (Object.hasOwn(units, word) ? units[word] : undefined);

const decimal = /^\s*[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?\s*$/i;

/** A decimal number that can be a coordinate; undefined for anything else. */
export function parseNumber(text: string | undefined): number | undefined {
  if (text === undefined || !decimal.test(text)) return undefined;
  const number = Number(text);
  return isCoordinate(number) ? number : undefined;
}

/** A whole number that is not negative. */
export const parseWhole = (text: string | undefined): number | undefined => (text !== undefined && /^\s*\+?\d{1,10}\s*$/.test(text) ? Number(text) : undefined);

/** Twelve numbers, row by row of a matrix that a point is multiplied by from the left; undefined where they are none. */
export function parseTransform(text: string | undefined): Affine | undefined {
  if (text === undefined) return identity;
  const numbers = text.trim().split(/\s+/).map(parseNumber);
  return numbers.length === 12 && numbers.every((number) => number !== undefined) ? (numbers as unknown as Affine) : undefined;
}
