export interface Progress {
  show(what: string, share: number): void;
  clear(): void;
}

const everyMs = 150;

/** One line that is written over and over, where somebody watches; a line a file begun otherwise. */
export function createProgress(stream: { isTTY?: boolean; write(text: string): unknown }): Progress {
  let shown = '';
  let shownAt = 0;
  return {
    show(what, share) {
      const now = Date.now();
      if (!stream.isTTY) {
        if (shown !== what) stream.write(`${what}\n`);
        shown = what;
      } else if (now - shownAt >= everyMs) {
        shownAt = now;
        shown = what;
        stream.write(`\r\u001b[K${what} ${Math.floor(share * 100)} %`);
      }
    },
    clear() {
      if (stream.isTTY && shown !== '') stream.write('\r\u001b[K');
      if (stream.isTTY) shown = '';
    },
  };
}
