import { MeshError } from './mesh-error';

const questionMark = 63;

/**
 * Turns UTF-16 into the bytes of ASCII, pushed in chunks of any size. Numbers and keywords of a mesh are ASCII; every other character, which can
 * only stand in a name or a comment, becomes a question mark. The two bytes of the byte-order mark are left out.
 */
export function createUtf16Decoder(bigEndian: boolean, take: (bytes: Uint8Array) => void): { push: (bytes: Uint8Array) => void; finish: () => void } {
  let received = 0;
  let half = 0;

  function push(bytes: Uint8Array): void {
    const decoded = new Uint8Array((bytes.length + 1) >> 1);
    let count = 0;
    for (const byte of bytes) {
      received += 1;
      if (received % 2 === 1) {
        half = byte;
        continue;
      }
      const code = bigEndian ? 256 * half + byte : 256 * byte + half;
      if (received > 2) decoded[count++] = code < 128 ? code : questionMark;
    }
    if (count > 0) take(decoded.subarray(0, count));
  }

  return {
    push,
    finish() {
      if (received % 2 === 1) throw new MeshError('file-truncated', 'The text is in UTF-16 and ends in the middle of a character: it was cut off. Export the mesh again.', { byte: received });
    },
  };
}
