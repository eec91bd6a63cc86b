import type { MeshPlace } from '../mesh-error';
import type { PlyBody } from './ply-body';
import { plyTypeBytes, type PlyType } from './ply-header';

/** What stands after the header of a PLY file, as numbers. */
export interface PlyNumbers {
  push(bytes: Uint8Array): void;
  finish(): void;
  /** Of the number that is read. */
  readonly place: MeshPlace;
  /** Where the file ended. */
  readonly end: MeshPlace;
  /** Bytes after the last number. */
  readonly spareBytes: number;
}

/** Reads the numbers of a binary PLY file, whose first byte is the `start`th of the file. */
export function createPlyNumbers(littleEndian: boolean, body: PlyBody, start: number): PlyNumbers {
  const carry = new Uint8Array(8);
  const carryView = new DataView(carry.buffer);
  let carried = 0;
  let place = start;
  let spareBytes = 0;

  function take(view: DataView, at: number, type: PlyType): void {
    body.take(readNumber(view, at, type, littleEndian));
    place += plyTypeBytes[type];
  }

  return {
    push(bytes) {
      const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
      let at = 0;
      while (at < bytes.length && !body.done) {
        const { type } = body;
        const size = plyTypeBytes[type];
        if (carried === 0 && bytes.length - at >= size) {
          take(view, at, type);
          at += size;
        } else {
          carry[carried++] = bytes[at++] ?? 0;
          if (carried < size) continue;
          carried = 0;
          take(carryView, 0, type);
        }
      }
      spareBytes += bytes.length - at;
    },
    finish: () => undefined,
    get place() {
      return { byte: place };
    },
    get end() {
      return { byte: place + carried };
    },
    get spareBytes() {
      return spareBytes;
    },
  };
}

function readNumber(view: DataView, at: number, type: PlyType, littleEndian: boolean): number {
  switch (type) {
    case 'char':
      return view.getInt8(at);
    case 'uchar':
      return view.getUint8(at);
    case 'short':
      return view.getInt16(at, littleEndian);
    case 'ushort':
      return view.getUint16(at, littleEndian);
    case 'int':
      return view.getInt32(at, littleEndian);
    case 'uint':
      return view.getUint32(at, littleEndian);
    case 'float':
      return view.getFloat32(at, littleEndian);
    case 'double':
      return view.getFloat64(at, littleEndian);
  }
}
