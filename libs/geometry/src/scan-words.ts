import type { ReadingLimits } from './limits';
import { MeshError, spellCount, spellCounted } from './mesh-error';

export interface WordScanner {
  /** Takes bytes from a place on; gives the place that it came to, which is the end unless it was told to pause. */
  push(bytes: Uint8Array, from?: number): number;
  finish(): void;
  /** Leaves off after the word that is being taken, so that what follows can be read by other means. */
  pause(): void;
  /** Goes on after words that were read by other means, to the end of the last of them, from which on the length of its line counts. */
  passOver(lineEnds: number): void;
  /** The last byte that was taken; undefined where a word has begun, or so long a line that other means would have to watch it. */
  readonly gap: number | undefined;
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
  let paused = false;

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

  function push(bytes: Uint8Array, from = 0): number {
    let start = from;
    lineStart = from;
    paused = false;
    for (let at = from; at < bytes.length; at++) {
      const code = bytes[at] ?? 0;
      if (code > 32) continue;
      wordEnd = at;
      if (at > start || carried > 0) {
        endWord(bytes, start, at);
        afterReturn = false;
        if (paused) return endChunk(at);
      }
      if (code === 32) afterReturn = false;
      else takeControl(code, at);
      start = at + 1;
    }
    if (start < bytes.length) keep(bytes, start, bytes.length);
    return endChunk(bytes.length);
  }

  function endChunk(at: number): number {
    checkLine(at);
    lineBytes += at - lineStart;
    return at;
  }

  return {
    push,
    finish: () => endWord(carry, 0, 0),
    pause: () => {
      paused = true;
    },
    passOver(lineEnds) {
      line += lineEnds;
      lineBytes = 0;
      afterReturn = false;
    },
    get gap() {
      if (carried > 0 || 2 * lineBytes > maximumLineBytes) return undefined;
      return afterReturn ? 13 : 32;
    },
    restartLine: () => restartLine(wordEnd),
    get line() {
      return line;
    },
  };
}
