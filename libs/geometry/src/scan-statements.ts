import { MeshError, spellCount, spellCounted } from './mesh-error';
import type { ReadingLimits } from './limits';

export interface StatementScanner {
  /** Takes bytes from a place on; gives the place that it came to, which is the end unless it was told to pause. */
  push(bytes: Uint8Array, from?: number): number;
  finish(): void;
  /** Leaves off after the statement that is being ended, so that what follows can be read by other means. */
  pause(): void;
  /** Goes on after lines that were read by other means. */
  passOver(lineEnds: number): void;
  /** The last byte that was taken; undefined within a statement or a comment, and where so long a line has begun that other means would have to watch it. */
  readonly gap: number | undefined;
  /** Passes over the rest of the statement; to be called while a word is taken. */
  skipStatement(): void;
  /** The line (from 1) that is being read. */
  readonly line: number;
}

const lineFeed = 10;
const carriageReturn = 13;
const numberSign = 35;
const backslash = 92;

/**
 * Cuts a text of one statement a line into words, in chunks of any size. A comment runs from `#` to the end of the line, whatever it ends with; a
 * backslash at the end of any other line joins the next one to it, as white space would. Line ends are LF, CRLF or CR. What is skipped is
 * not kept and may have words of any length.
 *
 * @param format as a sentence names it
 */
export function createStatementScanner(
  format: string,
  { maximumWordBytes, maximumLineBytes }: Pick<ReadingLimits, 'maximumWordBytes' | 'maximumLineBytes'>,
  takeWord: (bytes: Uint8Array, start: number, end: number) => void,
  endStatement: () => void,
): StatementScanner {
  const carry = new Uint8Array(maximumWordBytes);
  let carried = 0;
  let line = 1;
  // Bytes of this line in chunks before; where in this chunk the line begins.
  let lineBytes = 0;
  let lineStart = 0;
  let mode: 'words' | 'skipped' | 'comment' = 'words';
  let lastByte = 0;
  let atStart = true;
  let inStatement = false;
  let paused = false;

  function keep(bytes: Uint8Array, start: number, end: number): void {
    checkWord(carried + end - start);
    carry.set(bytes.subarray(start, end), carried);
    carried += end - start;
  }

  function checkWord(length: number): void {
    if (length <= maximumWordBytes) return;
    throw new MeshError('syntax-invalid', `Line ${spellCount(line)} has a word of more than ${spellCounted(maximumWordBytes, 'character')}: this is not an ${format} mesh, or it was damaged.`, { line });
  }

  function checkLine(at: number): void {
    if (lineBytes + at - lineStart <= maximumLineBytes) return;
    throw new MeshError('syntax-invalid', `Line ${spellCount(line)} is longer than ${spellCounted(maximumLineBytes, 'byte')}, the most that is read of one line of ${format}. Export the mesh again.`, { line });
  }

  /** Hands on the word that ends before `end`, if there is one; a backslash at the end of a line is none. */
  function endWord(bytes: Uint8Array, start: number, end: number, joined: boolean): void {
    if (carried > 0) {
      keep(bytes, start, end);
      const length = carried;
      carried = 0;
      handOn(carry, 0, joined ? length - 1 : length);
    } else if (end > start) {
      checkWord(end - start);
      handOn(bytes, start, joined ? end - 1 : end);
    }
  }

  function handOn(bytes: Uint8Array, start: number, end: number): void {
    // A byte-order mark of UTF-8 may stand before the first word.
    const marked = atStart && bytes[start] === 0xef && bytes[start + 1] === 0xbb && bytes[start + 2] === 0xbf;
    atStart = false;
    const from = marked ? start + 3 : start;
    if (end === from) return;
    inStatement = true;
    takeWord(bytes, from, end);
  }

  function endLine(at: number, joined: boolean): void {
    checkLine(at);
    if (!joined) {
      endStatement();
      mode = 'words';
      inStatement = false;
    }
    line += 1;
    lineBytes = 0;
    lineStart = at + 1;
  }

  function takeControl(code: number, at: number, before: number): void {
    if (code === lineFeed && before === carriageReturn) lineStart = at + 1;
    else if (code === lineFeed || code === carriageReturn) endLine(at, before === backslash && mode !== 'comment');
    else if (code < 9 || code > 13) {
      throw new MeshError('syntax-invalid', `Line ${spellCount(line)} has a control character (code ${code}): the file is damaged, or not text. Export it again.`, { line });
    }
  }

  function push(bytes: Uint8Array, from = 0): number {
    let start = from;
    lineStart = from;
    paused = false;
    for (let at = from; at < bytes.length; at++) {
      const code = bytes[at] ?? 0;
      if (code > 32 && (code !== numberSign || mode === 'comment')) continue;
      const before = at > 0 ? (bytes[at - 1] ?? 0) : lastByte;
      if (mode === 'words') endWord(bytes, start, at, before === backslash && (code === lineFeed || code === carriageReturn));
      if (code === numberSign) mode = 'comment';
      else if (code !== 32) takeControl(code, at, before);
      start = at + 1;
      if (paused) return endChunk(bytes, start);
    }
    if (mode === 'words' && start < bytes.length) keep(bytes, start, bytes.length);
    return endChunk(bytes, bytes.length);
  }

  function endChunk(bytes: Uint8Array, at: number): number {
    lastByte = bytes[at - 1] ?? lastByte;
    checkLine(at);
    lineBytes += at - lineStart;
    return at;
  }

  return {
    push,
    finish() {
      if (mode === 'words') endWord(carry, 0, 0, lastByte === backslash);
      endStatement();
    },
    pause: () => {
      paused = true;
    },
    passOver(lineEnds) {
      line += lineEnds;
      lineBytes = 0;
    },
    get gap() {
      return mode !== 'words' || inStatement || atStart || carried > 0 || 2 * lineBytes > maximumLineBytes ? undefined : lastByte;
    },
    skipStatement: () => {
      mode = 'skipped';
    },
    get line() {
      return line;
    },
  };
}
