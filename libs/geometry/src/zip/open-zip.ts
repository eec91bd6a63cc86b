import { Inflate } from 'pako';
import type { ReadingLimits } from '../limits';
import { MeshError, spellCount, spellCounted } from '../mesh-error';
import { showText } from '../mesh-words';
import { carryCrc32 } from './crc32';
import { readZipDirectory, type ZipEntry } from './zip-directory';

export interface ZipArchive {
  /** Whether there is a file of this name; case does not count. */
  has(name: string): boolean;
  /** Unpacks a file piece by piece. Throws a MeshError where it is damaged, encrypted or not there, and as soon as it grows beyond the limits. */
  read(name: string, take: (bytes: Uint8Array) => void): void;
  /** Bytes that all files read so far held. */
  readonly expandedBytes: number;
}

const headerSignature = 0x04034b50;
const headerBytes = 30;
const pieceBytes = 65_536;

/** Opens a ZIP archive that is there as a whole. Files are stored or deflated; lengths and checksums are checked. */
export function openZip(archive: Uint8Array, limits: Pick<ReadingLimits, 'maximumExpandedBytes' | 'maximumExpansion' | 'freeExpansionBytes'>): ZipArchive {
  const entries = readZipDirectory(archive);
  let expanded = 0;

  function count(bytes: number, at: number): void {
    expanded += bytes;
    if (expanded <= limits.maximumExpandedBytes && expanded <= limits.freeExpansionBytes + limits.maximumExpansion * archive.length) return;
    throw new MeshError('too-large-expanded', `The ZIP archive that this 3MF file is holds more than can be examined here: more than ${spellCounted(expanded, 'byte')} come of its ${spellCount(archive.length)}. Reduce the mesh.`, { byte: at });
  }

  return {
    has: (name) => entries.has(name.toLowerCase()),
    read(name, take) {
      const entry = entries.get(name.toLowerCase());
      if (entry === undefined) throw new MeshError('syntax-invalid', `This 3MF file refers to “${showText(name, 60)}”, which is not in it. Export it again.`, { byte: 0 });
      const packed = findContent(archive, entry);
      let checksum = 0;
      let length = 0;
      const takePiece = (bytes: Uint8Array): void => {
        count(bytes.length, entry.headerAt);
        length += bytes.length;
        checksum = carryCrc32(checksum, bytes);
        take(bytes);
      };
      const whole = entry.method === 0 ? passOn(packed, takePiece) : inflate(packed, takePiece);
      if (!whole || length !== entry.bytes || checksum !== entry.checksum) refuse(entry, 'is damaged: it does not agree with its own checks');
    },
    get expandedBytes() {
      return expanded;
    },
  };
}

function refuse({ name, headerAt }: ZipEntry, what: string): never {
  throw new MeshError('archive-damaged', `In this 3MF file, “${showText(name, 60)}” ${what}. Export it again.`, { byte: headerAt });
}

/** The packed bytes of a file. */
function findContent(archive: Uint8Array, entry: ZipEntry): Uint8Array {
  if (entry.encrypted) refuse(entry, 'is encrypted, and can’t be read');
  if (entry.method !== 0 && entry.method !== 8) refuse(entry, 'is packed by a method that is not read');
  const view = new DataView(archive.buffer, archive.byteOffset, archive.byteLength);
  const { headerAt } = entry;
  if (headerAt + headerBytes > archive.length || view.getUint32(headerAt, true) !== headerSignature) refuse(entry, 'is not where the directory says');
  const start = headerAt + headerBytes + view.getUint16(headerAt + 26, true) + view.getUint16(headerAt + 28, true);
  if (start + entry.packedBytes > archive.length) refuse(entry, 'goes on beyond the end');
  return archive.subarray(start, start + entry.packedBytes);
}

function passOn(bytes: Uint8Array, take: (bytes: Uint8Array) => void): true {
  for (let at = 0; at < bytes.length; at += pieceBytes) take(bytes.subarray(at, at + pieceBytes));
  return true;
}

/** False where what was packed makes no sense. */
function inflate(packed: Uint8Array, take: (bytes: Uint8Array) => void): boolean {
  // Deflated bytes without a header.
  const inflater = new Inflate({ windowBits: -15, chunkSize: pieceBytes });
  inflater.onData = take;
  inflater.onEnd = () => undefined;
  for (let at = 0; at < packed.length && !inflater.ended; at += pieceBytes) {
    if (!inflater.push(packed.subarray(at, at + pieceBytes))) return false;
  }
  return inflater.ended;
}
