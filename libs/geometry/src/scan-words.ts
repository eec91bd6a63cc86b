import type { ReadingLimits } from './limits';
import { MeshError, spellCount, spellCounted } from './mesh-error';

export interface WordScanner {
  push(bytes: Uint8Array): void;
  finish(): void;
  /** Counts the length of the line from the word on that is being taken. */
  restartLine(): void;
  /** The line (from 1) that is being read. */
  readonly line: number;
}

/**
 * Cuts bytes into words at white space, in chunks of any size. A word inside one chunk is handed on in place; one that straddles chunks is
 * put together in a small buffer. Line ends (LF, CRLF, CR) are told apart from other white space.
 *
 * @param format as a sentence names it
 * @param firstLine the number of the line that the first byte stands in
 */
export function createWordScanner(
  format: string,
  { maximumWordBytes, maximumLineBytes }: Pick<ReadingLimits, 'maximumWordBytes' | 'maximumLineBytes'>,
  takeWord: (bytes: Uint8Array, start: number, end: number) => void,
  takeLineEnd: () => void,
  firstLine = 1,
): WordScanner {
  const carry = new Uint8Array(maximumWordBytes);
  let carried = 0;
  let line = firstLine;
  // Bytes of this line in chunks before; where in this chunk its count begins, and which word ends.
  let lineBytes = 0;
  let lineStart = 0;
  let wordEnd = 0;
  let afterReturn = false;
  let atStart = true;

  function keep(bytes: Uint8Array, start: number, end: number): void {
    checkLength(carried + end - start);
    carry.set(bytes.subarray(start, end), carried);
    carried += end - start;
  }

  function checkLength(length: number): void {
    if (length <= maximumWordBytes) return;
    throw new MeshError('syntax-invalid', `Line ${spellCount(line)} has a word of more than ${spellCounted(maximumWordBytes, 'character')}: this is not ${format === 'PLY' ? 'a' : 'an'} ${format} mesh, or it was damaged.`, { line });
  }

  function checkLine(at: number): void {
    if (lineBytes + at - lineStart <= maximumLineBytes) return;
    throw new MeshError('syntax-invalid', `Line ${spellCount(line)} goes on for more than ${spellCounted(maximumLineBytes, 'byte')} without a facet, the most that is read of one line of ${format}. Export the mesh again.`, { line });
  }

  function restartLine(at: number): void {
    checkLine(at);
    lineBytes = 0;
    lineStart = at;
  }

  function endWord(bytes: Uint8Array, start: number, end: number): void {
    if (carried === 0) {
      if (end > start) handOn(bytes, start, end);
      return;
    }
    keep(bytes, start, end);
    const length = carried;
    carried = 0;
    handOn(carry, 0, length);
  }

  function handOn(bytes: Uint8Array, start: number, end: number): void {
    checkLength(end - start);
    // A byte-order mark of UTF-8 may stand before the first word.
    const marked = atStart && bytes[start] === 0xef && bytes[start + 1] === 0xbb && bytes[start + 2] === 0xbf;
    atStart = false;
    const from = marked ? start + 3 : start;
    if (end > from) takeWord(bytes, from, end);
  }

  function takeControl(code: number, at: number): void {
    if (code < 9 || code > 13) {
      throw new MeshError('syntax-invalid', `Line ${spellCount(line)} has a control character (code ${code}): the file is damaged, or not text. Export it again.`, { line });
    }
    if (code === 13 || (code === 10 && !afterReturn)) {
      restartLine(at);
      takeLineEnd();
      line += 1;
    }
    afterReturn = code === 13;
  }

  function push(bytes: Uint8Array): void {
    let start = 0;
    lineStart = 0;
    for (let at = 0; at < bytes.length; at++) {
      const code = bytes[at] ?? 0;
      if (code > 32) continue;
      wordEnd = at;
      if (at > start || carried > 0) {
        endWord(bytes, start, at);
        afterReturn = false;
      }
      if (code === 32) afterReturn = false;
      else takeControl(code, at);
      start = at + 1;
    }
    if (start < bytes.length) keep(bytes, start, bytes.length);
    checkLine(bytes.length);
    lineBytes += bytes.length - lineStart;
  }

  return {
    push,
    finish: () => endWord(carry, 0, 0),
    restartLine: () => restartLine(wordEnd),
    get line() {
      return line;
    },
  };
}
