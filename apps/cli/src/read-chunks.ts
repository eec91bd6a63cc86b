import { open } from 'node:fs/promises';

/** As much as is read at once: it stays in the processor's cache until it is hashed and measured. */
const chunkBytes = 1 << 17;

/** Reads a file from its beginning into one buffer, again and again; `take` must not keep what it is given. */
export async function readChunks(file: string, take: (chunk: Uint8Array) => void): Promise<void> {
  const handle = await open(file, 'r');
  try {
    const buffer = new Uint8Array(chunkBytes);
    for (;;) {
      const { bytesRead } = await handle.read(buffer, 0, chunkBytes);
      if (bytesRead === 0) return;
      take(buffer.subarray(0, bytesRead));
    }
  } finally {
    await handle.close();
  }
}
