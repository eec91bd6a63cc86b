/** Bytes as small hexadecimal digits. */
const toHex = (bytes: Uint8Array): string => Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');

/**
 * SHA-256 of a piece of a file, as hexadecimal digits. The browser's own is used where the page has it; it is missing where an installation is reached
 * over a network without TLS.
 */
export async function hashBlob(blob: Blob): Promise<string> {
  const bytes = await blob.arrayBuffer();
  // The type says that it is always there.
  const subtle = globalThis.crypto.subtle as SubtleCrypto | undefined;
  if (subtle) return toHex(new Uint8Array(await subtle.digest('SHA-256', bytes)));
  const { sha256 } = await import('@noble/hashes/sha2.js');
  return toHex(sha256(new Uint8Array(bytes)));
}
