import type { ReadingLimits } from '../limits';
import { MeshError, spellCount } from '../mesh-error';
import { quoteWord, refuseNumber } from '../mesh-words';
import { isNonFiniteWord, parseDecimal } from '../parse-decimal';
import { createWordScanner } from '../scan-words';
import type { PlyBody } from './ply-body';
import type { PlyNumbers } from './ply-numbers';

/** Reads the numbers of an ASCII PLY file: one row of an element a line, blank lines aside. */
export function createPlyWords(limits: ReadingLimits, body: PlyBody, firstLine: number): PlyNumbers {
  const scanner = createWordScanner('PLY', limits, takeWord, takeLineEnd, firstLine);
  let rowEnded = false;

  function takeWord(bytes: Uint8Array, start: number, end: number): void {
    const { line } = scanner;
    if (body.done) throw new MeshError('count-contradicts-size', `Line ${spellCount(line)} comes after all that the header of this PLY file says is in it: a count is wrong. Export the mesh again.`, { line });
    if (rowEnded) throw new MeshError('syntax-invalid', `Line ${spellCount(line)} of this PLY file has more values than its element. Export the mesh again.`, { line });
    const value = parseDecimal(bytes, start, end) ?? (isNonFiniteWord(bytes, start, end) ? NaN : undefined);
    if (value === undefined) refuse(bytes, start, end, line);
    body.take(value);
    rowEnded = body.betweenRows;
  }

  function takeLineEnd(): void {
    rowEnded = false;
    const { line } = scanner;
    if (!body.betweenRows) throw new MeshError('syntax-invalid', `Line ${spellCount(line)} of this PLY file ends before ${body.describe()} is whole. Export the mesh again.`, { line });
  }

  return {
    push: (bytes) => scanner.push(bytes),
    finish: () => scanner.finish(),
    get place() {
      return { line: scanner.line };
    },
    get end() {
      return { line: scanner.line };
    },
    spareBytes: 0,
  };
}

function refuse(bytes: Uint8Array, start: number, end: number, line: number): never {
  refuseNumber(bytes, start, end, line, 'PLY');
  throw new MeshError('syntax-invalid', `Line ${spellCount(line)}: ${quoteWord(bytes, start, end)} stands where a number belongs in PLY. Export the mesh again.`, { line });
}
