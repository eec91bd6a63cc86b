import { MeshError, spellCount } from '../mesh-error';
import { showText } from '../mesh-words';

/** A file in a ZIP archive, as the archive's directory tells of it. */
export interface ZipEntry {
  name: string;
  method: number;
  encrypted: boolean;
  checksum: number;
  packedBytes: number;
  bytes: number;
  /** Where its own header is in the archive. */
  headerAt: number;
}

const [entrySignature, endSignature, locatorSignature, largeEndSignature] = [0x02014b50, 0x06054b50, 0x07064b50, 0x06064b50];
const entryBytes = 46;
const endBytes = 22;
const longestComment = 65_535;
/** Stands in a field of 32 bits for a number that is in one of 64. */
const elsewhere = 0xffffffff;

const viewOf = (bytes: Uint8Array): DataView => new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
/** Beyond 2⁵³ it is rounded, and far beyond any archive. */
const readLong = (view: DataView, at: number): number => view.getUint32(at, true) + 4294967296 * view.getUint32(at + 4, true);

function refuse(what: string, byte: number): never {
  throw new MeshError('archive-damaged', `The ZIP archive that this 3MF file is ${what}. Export it again.`, { byte });
}

/** Where the directory begins, how many entries it has, and where it ends. */
interface Directory {
  at: number;
  entries: number;
  end: number;
}

/**
 * Reads the directory at the end of a ZIP archive, which alone says what the archive holds. Names are compared without case, as the packaging conventions
 * want it. Throws a MeshError where the directory is not whole, where two files have the same name, or one a name that leads out of the archive.
 */
export function readZipDirectory(archive: Uint8Array): Map<string, ZipEntry> {
  const view = viewOf(archive);
  const { at: start, entries, end } = findDirectory(archive, view);
  const found = new Map<string, ZipEntry>();
  let at = start;
  for (let k = 0; k < entries; k++) {
    if (at + entryBytes > end || view.getUint32(at, true) !== entrySignature) refuse(`names ${spellCount(entries)} files and tells of fewer`, at);
    const [nameBytes, extraBytes, commentBytes] = [view.getUint16(at + 28, true), view.getUint16(at + 30, true), view.getUint16(at + 32, true)];
    const next = at + entryBytes + nameBytes + extraBytes + commentBytes;
    if (next > end) refuse('has a directory that is not whole', at);
    const entry = readEntry(archive, view, at, nameBytes, extraBytes);
    checkName(entry.name, at);
    const key = entry.name.replace(/^\//, '').toLowerCase();
    if (found.has(key)) refuse(`has two files of the name “${showText(entry.name, 60)}”`, at);
    found.set(key, entry);
    at = next;
  }
  return found;
}

function findDirectory(archive: Uint8Array, view: DataView): Directory {
  for (let at = archive.length - endBytes; at >= Math.max(0, archive.length - endBytes - longestComment); at--) {
    if (view.getUint32(at, true) !== endSignature || at + endBytes + view.getUint16(at + 20, true) > archive.length) continue;
    const [entries, size, offset] = [view.getUint16(at + 10, true), view.getUint32(at + 12, true), view.getUint32(at + 16, true)];
    const directory = entries === 0xffff || size === elsewhere || offset === elsewhere ? readLargeEnd(view, at) : { at: offset, entries, end: offset + size };
    if (directory === undefined || directory.end > at) refuse('has no directory where it says', at);
    return directory;
  }
  throw new MeshError('file-truncated', 'The ZIP archive that this 3MF file is ends before its directory: it was cut off. Send or export it again.', { byte: archive.length });
}

/** The end of the directory of an archive that has larger numbers; undefined where there is none. */
function readLargeEnd(view: DataView, endAt: number): Directory | undefined {
  const locatorAt = endAt - 20;
  if (locatorAt < 0 || view.getUint32(locatorAt, true) !== locatorSignature) return undefined;
  const at = readLong(view, locatorAt + 8);
  if (at + 56 > locatorAt || view.getUint32(at, true) !== largeEndSignature) return undefined;
  const [entries, size, offset] = [readLong(view, at + 32), readLong(view, at + 40), readLong(view, at + 48)];
  return { at: offset, entries, end: offset + size };
}

function readEntry(archive: Uint8Array, view: DataView, at: number, nameBytes: number, extraBytes: number): ZipEntry {
  const nameAt = at + entryBytes;
  const name = new TextDecoder().decode(archive.subarray(nameAt, nameAt + nameBytes));
  const numbers = [view.getUint32(at + 24, true), view.getUint32(at + 20, true), view.getUint32(at + 42, true)];
  const [bytes = 0, packedBytes = 0, headerAt = 0] = numbers.includes(elsewhere) ? readLargeNumbers(view, nameAt + nameBytes, extraBytes, numbers) : numbers;
  const flags = view.getUint16(at + 8, true);
  return { name, method: view.getUint16(at + 10, true), encrypted: (flags & 0x2041) !== 0, checksum: view.getUint32(at + 16, true), packedBytes, bytes, headerAt };
}

/** Numbers of 64 bits, in the order of those that they stand in for. */
function readLargeNumbers(view: DataView, from: number, length: number, numbers: number[]): number[] {
  for (let at = from; at + 4 <= from + length; at += 4 + view.getUint16(at + 2, true)) {
    if (view.getUint16(at, true) !== 1) continue;
    let next = at + 4;
    const end = Math.min(from + length, next + view.getUint16(at + 2, true));
    return numbers.map((number) => {
      if (number !== elsewhere || next + 8 > end) return number;
      next += 8;
      return readLong(view, next - 8);
    });
  }
  return numbers;
}

function checkName(name: string, at: number): void {
  if (/(^|[/\\])\.\.([/\\]|$)|^\\|^[a-z]:|\0/i.test(name)) refuse(`has a file whose name leads out of it (“${showText(name, 60)}”)`, at);
}
