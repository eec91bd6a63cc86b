import { describe, expect, it } from 'vitest';
import { makeDamagedFile, measureDamagedFile, readDamagedFile } from './testing/fuzzing/read-damaged';
import { makeSeedFiles } from './testing/fuzzing/seed-files';

/** Every run tries others; the first number is printed so that they can be repeated: FUZZ_SEED=… */
const given = process.env['FUZZ_SEED'];
const first = given === undefined ? Math.floor(Math.random() * 2 ** 31) : Number(given);
const files = 10_000;
/** One in so many is cut into other chunks too, and is measured. */
const closelyLookedAt = 10;

describe(`ten thousand damaged files (FUZZ_SEED=${first})`, () => {
  it('are read, or refused with format, code, place and a sentence, in bounded memory, the same whatever the chunks', { timeout: 600_000 }, async () => {
    const seeds = await makeSeedFiles();
    const results = new Map<string, number>();
    for (let number = first; number < first + files; number++) {
      const { seed, bytes, random } = makeDamagedFile(seeds, number);
      try {
        const { result, message } = readDamagedFile(bytes, Infinity);
        results.set(result, (results.get(result) ?? 0) + 1);
        if ((number - first) % closelyLookedAt !== 0) continue;
        const chunkBytes = random.pick([1, 2, 7, 100, 1024, 4096]);
        expect(readDamagedFile(bytes, chunkBytes)).toMatchObject({ result, message });
        measureDamagedFile(bytes);
      } catch (error) {
        throw new Error(`File ${number}, made of ${seed.name}, is not read as it should be.`, { cause: error });
      }
    }
    // The damage is such that every format gets through, and every kind of refusal comes up.
    for (const format of ['stl-binary', 'stl-ascii', 'obj', 'ply-ascii', 'ply-binary', 'off', '3mf', 'gltf', 'glb']) expect(results.get(format)).toBeGreaterThan(0);
    for (const code of ['file-truncated', 'number-invalid', 'number-not-finite', 'syntax-invalid', 'vertex-missing', 'facets-none', 'archive-damaged', 'format-unknown']) expect(results.get(code)).toBeGreaterThan(0);
  });

  it('begin from files that are whole', async () => {
    for (const seed of await makeSeedFiles()) expect(readDamagedFile(seed.pack(seed.content), Infinity).message).toMatch(/^\{"facets":/);
  });
});
