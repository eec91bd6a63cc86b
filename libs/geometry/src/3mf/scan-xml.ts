import { SaxesParser } from 'saxes';
import type { ReadingLimits } from '../limits';
import { MeshError, spellCount, spellCounted } from '../mesh-error';

/** Attributes of an element by their names as they are written, prefixes and all. */
export type Attributes = Readonly<Record<string, string>>;

export interface XmlHandler {
  open(name: string, attributes: Attributes): void;
  close(): void;
}

export interface XmlScanner {
  push(bytes: Uint8Array): void;
  finish(): void;
  /** The line (from 1) that is being read. */
  readonly line: number;
}

/**
 * Reads XML for its elements, pushed in chunks of any size. Text between them is passed over. Throws a MeshError with the line for XML that is not well formed, that
 * declares a document type (and could have entities of its own), or that goes on without an element for too long.
 *
 * @param part what a sentence calls the document
 */
export function createXmlScanner(part: string, { maximumLineBytes, maximumDepth }: Pick<ReadingLimits, 'maximumLineBytes' | 'maximumDepth'>, handler: XmlHandler): XmlScanner {
  const parser = new SaxesParser({ xmlns: false, position: false });
  let decoder: InstanceType<typeof TextDecoder> | undefined;
  let depth = 0;
  let lastElement = 0;

  function refuse(what: string): never {
    throw new MeshError('syntax-invalid', `Line ${spellCount(parser.line)} of ${part} in this 3MF file ${what}. Export it again.`, { line: parser.line });
  }

  parser.on('error', () => refuse('is not well-formed XML'));
  parser.on('doctype', () => refuse('declares a document type, which a 3MF file can’t have'));
  parser.on('opentag', ({ name, attributes }) => {
    depth += 1;
    if (depth > maximumDepth) refuse(`has elements more than ${maximumDepth} deep in one another`);
    lastElement = parser.position;
    handler.open(name, attributes);
  });
  parser.on('closetag', () => {
    depth -= 1;
    lastElement = parser.position;
    handler.close();
  });

  function decode(bytes: Uint8Array | undefined): string {
    try {
      return decoder?.decode(bytes, { stream: bytes !== undefined }) ?? '';
    } catch (error) {
      if (!(error instanceof TypeError)) throw error;
      return refuse('has bytes that are no characters');
    }
  }

  return {
    push(bytes) {
      decoder ??= new TextDecoder(findEncoding(bytes), { fatal: true });
      const text = decode(bytes);
      parser.write(text);
      if (parser.position - lastElement > maximumLineBytes) refuse(`goes on for more than ${spellCounted(maximumLineBytes, 'character')} without an element, the most that is read`);
    },
    finish() {
      parser.write(decode(undefined));
      parser.close();
    },
    get line() {
      return parser.line;
    },
  };
}

/** By the byte-order mark; without one it is UTF-8. */
function findEncoding([first, second]: Uint8Array): string {
  if (first === 0xfe && second === 0xff) return 'utf-16be';
  return first === 0xff && second === 0xfe ? 'utf-16le' : 'utf-8';
}
