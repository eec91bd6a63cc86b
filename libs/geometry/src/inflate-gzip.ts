import { Inflate } from 'pako';
import type { ReadingLimits } from './limits';
import { MeshError, spellCounted } from './mesh-error';

/** Packed bytes are handed to the inflater in blocks of this size, so that all it does depends on the bytes alone and not on how they arrived. */
const blockBytes = 4096;

export interface Inflater {
  push(bytes: Uint8Array): void;
  /** Throws a MeshError where the archive ends too early. */
  finish(): void;
}

/**
 * Unpacks gzip (RFC 1952) that is pushed in chunks of any size, several members after one another and zeros after the last included. Throws a
 * MeshError for a damaged archive (its structure, checksums and lengths are all checked) and as soon as it grows beyond the limits.
 */
export function createInflater(limits: Pick<ReadingLimits, 'maximumExpandedBytes' | 'maximumExpansion' | 'freeExpansionBytes'>, take: (bytes: Uint8Array) => void): Inflater {
  const block = new Uint8Array(blockBytes);
  let filled = 0;
  let blockStart = 0;
  let expanded = 0;
  let member: Inflate | undefined;
  // What the inflater has not taken of the block, which it tells only here.
  let left = { avail_in: 0 };

  function begin(): Inflate {
    // 15 bits of window, and 16: gzip and nothing else.
    const inflate = new Inflate({ windowBits: 31 });
    inflate.onStart = (stream) => {
      left = stream;
    };
    inflate.onData = takeExpanded;
    inflate.onEnd = () => undefined;
    return inflate;
  }

  function takeExpanded(bytes: Uint8Array): void {
    expanded += bytes.length;
    const arrived = blockStart + filled;
    if (expanded > limits.maximumExpandedBytes || expanded > limits.freeExpansionBytes + limits.maximumExpansion * arrived) {
      throw new MeshError('too-large-expanded', `The gzip archive holds more than can be examined here: ${spellCounted(expanded, 'byte')} came of its first ${spellCounted(arrived, 'byte')}. Give the mesh without packing it, or reduce it.`, { byte: arrived });
    }
    take(bytes);
  }

  function inflateBlock(): void {
    let at = 0;
    while (at < filled) {
      if (member === undefined && blockStart + at > 0 && block[at] === 0) at += 1;
      else at = inflateMember(at);
    }
    blockStart += filled;
    filled = 0;
  }

  /** Inflates the block from `at` on, and says how far the member that it belongs to goes in it. */
  function inflateMember(at: number): number {
    member ??= begin();
    const whole = member.push(block.subarray(at, filled));
    if (!whole) throw new MeshError('archive-damaged', 'The gzip archive is damaged: what it holds does not agree with its own checks. Pack the mesh again, or give it unpacked.', { byte: blockStart + filled - left.avail_in });
    if (!member.ended) return filled;
    const end = filled - left.avail_in;
    member = undefined;
    return end;
  }

  return {
    push(bytes) {
      for (let at = 0; at < bytes.length; ) {
        const taken = Math.min(blockBytes - filled, bytes.length - at);
        block.set(bytes.subarray(at, at + taken), filled);
        filled += taken;
        at += taken;
        if (filled === blockBytes) inflateBlock();
      }
    },
    finish() {
      inflateBlock();
      if (member !== undefined) throw new MeshError('file-truncated', 'The gzip archive ends before its content does: it was cut off. Send or pack the mesh again.', { byte: blockStart });
    },
  };
}
