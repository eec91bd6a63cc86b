const steps = [
  ['GB', 1e9],
  ['MB', 1e6],
  ['kB', 1e3],
] as const;

/** A size for a sentence, in decimal multiples of the byte: `2.15 GB`. */
export function formatBytes(bytes: number): string {
  const step = steps.find(([, size]) => bytes >= size);
  return step === undefined ? `${bytes} bytes` : `${Number((bytes / step[1]).toPrecision(3))} ${step[0]}`;
}
