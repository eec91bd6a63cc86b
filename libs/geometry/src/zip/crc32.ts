const table = Uint32Array.from({ length: 256 }, (_, byte) => {
  let value = byte;
  for (let bit = 0; bit < 8; bit++) value = value & 1 ? (value >>> 1) ^ 0xedb88320 : value >>> 1;
  return value;
});

/** Carries the checksum of ZIP and gzip on over more bytes; 0 at the beginning. */
export function carryCrc32(checksum: number, bytes: Uint8Array): number {
  let value = ~checksum;
  for (const byte of bytes) value = (table[(value ^ byte) & 255] ?? 0) ^ (value >>> 8);
  return ~value >>> 0;
}
