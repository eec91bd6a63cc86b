import type { ReadingLimits } from '../limits';
import { MeshError, spellCounted } from '../mesh-error';
import { createPlyHeaderParser, type PlyHeader } from './ply-header';

const lineFeed = 10;
const carriageReturn = 13;

export interface PlyHeaderScanner {
  /** How many of these bytes belong to the header; fewer than all, or `header` is set, where it ends in them. */
  push(bytes: Uint8Array): number;
  /** Undefined as long as the header goes on. */
  readonly header: PlyHeader | undefined;
  /** Lines taken. */
  readonly line: number;
}

/**
 * Cuts the header of a PLY file into lines, pushed in chunks of any size. The first line says how all of them end: with LF, CRLF or CR. It matters where the
 * header ends, since the next byte may be part of a number.
 */
export function createPlyHeaderScanner({ maximumHeaderBytes }: Pick<ReadingLimits, 'maximumHeaderBytes'>): PlyHeaderScanner {
  const parser = createPlyHeaderParser();
  let text = '';
  let received = 0;
  let lineEnd: number | undefined;
  let header: PlyHeader | undefined;

  /** True where the byte ends a line. */
  function endsLine(byte: number): boolean {
    if (lineEnd !== undefined) return byte === lineEnd;
    if (byte === lineFeed) lineEnd = lineFeed;
    // A carriage return that ended the first line is known by what follows it.
    else if (text.endsWith('\r')) {
      lineEnd = carriageReturn;
      endLine();
      return byte === carriageReturn;
    }
    return byte === lineFeed;
  }

  function endLine(): void {
    if (parser.takeLine(text)) header = parser.header;
    text = '';
  }

  return {
    push(bytes) {
      let at = 0;
      while (at < bytes.length && header === undefined) {
        const byte = bytes[at++] ?? 0;
        if (endsLine(byte)) endLine();
        else text += String.fromCharCode(byte);
        received += 1;
        if (received > maximumHeaderBytes) {
          const line = parser.line + 1;
          throw new MeshError('syntax-invalid', `The header of this PLY file goes on for more than ${spellCounted(maximumHeaderBytes, 'byte')}, the most that is read of one. Export the mesh again.`, { line });
        }
      }
      return at;
    },
    get header() {
      return header;
    },
    get line() {
      return parser.line;
    },
  };
}
