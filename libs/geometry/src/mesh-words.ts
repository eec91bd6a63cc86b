import { MeshError, spellCount } from './mesh-error';
import { isNonFiniteWord, parseDecimal } from './parse-decimal';

/** Binary STL can hold no larger coordinate, and the fifth power of this one still fits binary64. */
const largestCoordinate = 3.4028234663852886e38;

/** Whether a number is finite, and no larger than what is taken for a coordinate. */
export const isCoordinate = (value: number): boolean => value <= largestCoordinate && value >= -largestCoordinate;

/**
 * The coordinate that bytes[start, end) write; undefined where the word is not even like a number. Throws a MeshError for a slip in a number, one
 * that is not finite, and one beyond 3.4e38.
 *
 * @param format as a sentence names it: `STL`
 */
export function parseCoordinate(bytes: Uint8Array, start: number, end: number, line: number, format: string): number | undefined {
  const number = parseDecimal(bytes, start, end);
  if (number === undefined) {
    refuseNumber(bytes, start, end, line, format);
    return undefined;
  }
  if (!isCoordinate(number)) {
    throw new MeshError('number-not-finite', `A coordinate in line ${spellCount(line)} is larger than 3.4e38, the most that is taken from ${format}. Export the mesh again.`, { line });
  }
  return number;
}

/** Throws where a word is a number with a slip or one that is not finite; returns where it is no number at all. */
export function refuseNumber(bytes: Uint8Array, start: number, end: number, line: number, format: string): void {
  const word = quoteWord(bytes, start, end);
  if (isNonFiniteWord(bytes, start, end)) {
    throw new MeshError('number-not-finite', `A coordinate in line ${spellCount(line)} is ${word}, not a finite number. Export the mesh again.`, { line });
  }
  if (/^"[+-]?\d+,\d*(e[+-]?\d+)?"$/i.test(word)) {
    throw new MeshError('number-invalid', `Line ${spellCount(line)} has ${word} with a decimal comma; ${format} has a decimal point. Export the mesh again.`, { line });
  }
  if (/^"[+-.]?\d/.test(word)) throw new MeshError('number-invalid', `Line ${spellCount(line)} has ${word}, which is not a number. Export the mesh again.`, { line });
}

/** A word of the file for a message: at most 24 characters, and nothing unprintable. */
export function quoteWord(bytes: Uint8Array, start: number, end: number): string {
  const word = String.fromCharCode(...bytes.subarray(start, Math.min(end, start + 24))).replace(/[^\x20-\x7e]/g, '?');
  return `"${word}${end - start > 24 ? '…' : ''}"`;
}

/** A text of the file for a message: so many characters at most, and nothing that can't be seen. */
export const showText = (text: string, most: number): string => `${text.slice(0, most).replace(/[\p{C}\ufffd]/gu, '?')}${text.length > most ? '…' : ''}`;
