import { MeshError, spellCount } from './mesh-error';

/** No number or keyword is longer; a longer word is not STL, and must not grow a buffer. */
const longestWord = 512;

export interface WordScanner {
  push(bytes: Uint8Array): void;
  finish(): void;
  /** The line (from 1) that is being read. */
  readonly line: number;
}

/**
 * Cuts bytes into words at white space, in chunks of any size. A word inside one chunk is handed on in place; one that straddles chunks is
 * put together in a small buffer. Line ends (LF, CRLF, CR) are told apart from other white space.
 */
export function createWordScanner(takeWord: (bytes: Uint8Array, start: number, end: number) => void, takeLineEnd: () => void): WordScanner {
  const carry = new Uint8Array(longestWord);
  let carried = 0;
  let line = 1;
  let afterReturn = false;
  let atStart = true;

  function keep(bytes: Uint8Array, start: number, end: number): void {
    checkLength(carried + end - start);
    carry.set(bytes.subarray(start, end), carried);
    carried += end - start;
  }

  function checkLength(length: number): void {
    if (length <= longestWord) return;
    throw new MeshError('syntax-invalid', `Line ${spellCount(line)} has a word of more than ${longestWord} characters: this is not an STL mesh, or it was damaged.`, { line });
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

  function takeControl(code: number): void {
    if (code < 9 || code > 13) {
      throw new MeshError('syntax-invalid', `Line ${spellCount(line)} has a control character (code ${code}): the file is damaged, or not text. Export it again.`, { line });
    }
    if (code === 13 || (code === 10 && !afterReturn)) {
      takeLineEnd();
      line += 1;
    }
    afterReturn = code === 13;
  }

  function push(bytes: Uint8Array): void {
    let start = 0;
    for (let at = 0; at < bytes.length; at++) {
      const code = bytes[at] ?? 0;
      if (code > 32) continue;
      if (at > start || carried > 0) endWord(bytes, start, at);
      if (code === 32) afterReturn = false;
      else takeControl(code);
      start = at + 1;
    }
    if (start < bytes.length) keep(bytes, start, bytes.length);
  }

  return {
    push,
    finish: () => endWord(carry, 0, 0),
    get line() {
      return line;
    },
  };
}
