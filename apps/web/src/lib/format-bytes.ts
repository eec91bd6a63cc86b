const steps = [
  { symbol: 'GB', bytes: 1e9 },
  { symbol: 'MB', bytes: 1e6 },
  { symbol: 'kB', bytes: 1e3 },
] as const;

/** A size in decimal units (1 kB = 1000 bytes), three digits. */
export function formatBytes(bytes: number): string {
  const step = steps.find((candidate) => bytes >= candidate.bytes);
  if (!step) return bytes === 1 ? '1 byte' : `${bytes} bytes`;
  const value = bytes / step.bytes;
  return `${value.toFixed(value < 10 ? 2 : value < 100 ? 1 : 0)} ${step.symbol}`;
}
