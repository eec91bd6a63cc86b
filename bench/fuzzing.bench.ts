import { makeDamagedFile, makeSeedFiles, readDamagedFile } from '@masswright/geometry/fuzzing';

/** A line of progress after so many files. */
const perLine = 100_000;

/**
 * Reads a million damaged mesh files of every format (or FUZZ_COUNT of them, from the number FUZZ_SEED on), and says what became of them. Throws for the first that is neither read
 * nor refused as it should be; its number makes it again.
 */
export async function run({ print }: { print: (line: string) => void }): Promise<void> {
  const count = Number(process.env['FUZZ_COUNT'] ?? 1_000_000);
  const first = Number(process.env['FUZZ_SEED'] ?? Math.floor(Math.random() * 2 ** 31));
  const seeds = await makeSeedFiles();
  const results = new Map<string, number>();
  let longest = { seconds: 0, number: 0 };
  let largest = { memoryBytes: 0, number: 0 };
  print(`${count} damaged files from number ${first} on`);
  for (let number = first; number < first + count; number++) {
    const { seed, bytes } = makeDamagedFile(seeds, number);
    try {
      const { result, seconds, memoryBytes } = readDamagedFile(bytes, Infinity);
      results.set(result, (results.get(result) ?? 0) + 1);
      if (seconds > longest.seconds) longest = { seconds, number };
      if (memoryBytes > largest.memoryBytes) largest = { memoryBytes, number };
    } catch (error) {
      throw new Error(`File ${number}, made of ${seed.name}, is not read as it should be.`, { cause: error });
    }
    if ((number - first + 1) % perLine === 0) print(`${number - first + 1} files`);
  }
  for (const [result, times] of [...results].sort(([, one], [, two]) => two - one)) print(`${result.padEnd(24)} ${String(times).padStart(8)} ${((100 * times) / count).toFixed(2).padStart(7)} %`);
  print(`the longest took ${(1000 * longest.seconds).toFixed(0)} ms (file ${longest.number}), the largest ${(largest.memoryBytes / 2 ** 20).toFixed(1)} MiB of memory outside the heap (file ${largest.number})`);
}
