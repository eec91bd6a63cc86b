import { completeLimits } from '../../limits';
import { measureMesh } from '../../measurer';
import { MeshError, meshErrorCodes } from '../../mesh-error';
import { createMeshReader } from '../../mesh-reader';
import { mutate } from './mutate';
import { createRandom, type Random } from './random';
import type { SeedFile } from './seed-files';

/** Small enough that no input takes long, large enough that every path is taken. */
const limits = { ...completeLimits({}), maximumFacets: 200_000, freePlacedFacets: 50_000, maximumVertices: 200_000, freeExpansionBytes: 1 << 20, maximumExpansion: 20 };

/** What reading may take of memory outside the heap of objects: so much in any case, and so much for each byte of the input. */
const freeMemory = 24 << 20;
const memoryPerByte = 200;
/** An input that takes longer hangs, on any machine. */
const longestSeconds = 20;

/** Refusals that say nothing about one place, or come before the format is known. */
const withoutPlace = new Set(['file-empty', 'facets-none']);
const beforeFormat = new Set(['file-empty', 'format-unknown', 'file-truncated', 'count-contradicts-size', 'archive-damaged', 'too-large-expanded', 'too-many-facets', 'size-differs']);

export interface Outcome {
  /** The code of the refusal, or the format of what was read. */
  result: string;
  message: string;
  seconds: number;
  memoryBytes: number;
}

/** The damaged file of a number; the same number makes the same file. */
export function makeDamagedFile(seeds: readonly SeedFile[], number: number): { seed: SeedFile; bytes: Uint8Array; random: Random } {
  const random = createRandom(number);
  const seed = random.pick(seeds);
  const other = random.pick(seeds);
  const inside = mutate(seed.content, random, other.content);
  // Half of the packed ones are damaged within, half without, and some both ways.
  const draw = random.below(5);
  const packed = seed.pack(draw < 3 ? inside : seed.content);
  return { seed, bytes: draw < 2 ? packed : mutate(packed, random, other.pack(other.content)), random };
}

/**
 * Reads a damaged file in chunks of one size. Throws an error of its own where reading fails in any way but a refusal that says what is wrong and where, where it gives facets
 * with coordinates that are none, and where it takes too long or too much memory.
 */
export function readDamagedFile(bytes: Uint8Array, chunkBytes: number): Outcome {
  const before = process.memoryUsage().arrayBuffers;
  const started = performance.now();
  let memoryBytes = 0;
  const sample = (): void => {
    memoryBytes = Math.max(memoryBytes, process.memoryUsage().arrayBuffers - before);
  };
  const reader = createMeshReader({
    ...limits,
    sizeBytes: bytes.length,
    onFacets({ corners, count }) {
      for (let at = 0; at < 9 * count; at++) if (!(Math.abs(corners[at] ?? NaN) <= 3.5e38)) throw new Error(`A facet has the coordinate ${corners[at]}.`);
      sample();
    },
  });
  let outcome: Pick<Outcome, 'result' | 'message'>;
  try {
    for (let at = 0; at < bytes.length; at += chunkBytes) reader.push(bytes.slice(at, Math.min(bytes.length, at + chunkBytes)));
    const { format, facets, ...remarks } = reader.finish();
    if (facets < 1 || facets > limits.maximumFacets) throw new Error(`${facets} facets were read.`);
    outcome = { result: format, message: JSON.stringify({ facets, ...remarks }) };
  } catch (error) {
    outcome = checkRefusal(error);
  }
  sample();
  const seconds = (performance.now() - started) / 1000;
  if (seconds > longestSeconds) throw new Error(`Reading ${bytes.length} bytes took ${seconds} s.`);
  if (memoryBytes > freeMemory + memoryPerByte * bytes.length) throw new Error(`Reading ${bytes.length} bytes took ${memoryBytes} bytes of memory.`);
  return { ...outcome, seconds, memoryBytes };
}

function checkRefusal(error: unknown): Pick<Outcome, 'result' | 'message'> {
  if (!(error instanceof MeshError)) throw error;
  const { code, at, format, message } = error;
  const place = at?.byte ?? at?.line;
  if (!meshErrorCodes.includes(code)) throw new Error(`${code} is no code of a refusal.`);
  if (place === undefined ? !withoutPlace.has(code) : !Number.isSafeInteger(place) || place < (at?.line === undefined ? 0 : 1)) throw new Error(`A refusal has no place: ${code}, ${message}`);
  if (format === null && !beforeFormat.has(code)) throw new Error(`A refusal has no format: ${code}, ${message}`);
  if (!/^[^\p{C}\ufffd]{10,600}\.$/u.test(message) || /undefined|NaN|\[object/.test(message.replaceAll(/“[^”]*”|"[^"]*"/g, ''))) throw new Error(`A refusal has no proper sentence: ${code}, ${message}`);
  return { result: code, message: `${message} ${JSON.stringify(at)} ${format}` };
}

/** Measures a damaged file as a whole; throws where that fails in any way but a refusal. */
export function measureDamagedFile(bytes: Uint8Array): void {
  try {
    const { content, centreFromOrigin, second } = measureMesh(bytes, { ...limits, maximumFacets: 5000 }).surface;
    const figures = [content, ...centreFromOrigin, second.xx, second.yy, second.zz, second.xy, second.yz, second.zx];
    if (!figures.every((figure) => Number.isFinite(figure))) throw new Error(`A figure is no number: ${figures.join(', ')}`);
  } catch (error) {
    if (!(error instanceof MeshError)) throw error;
  }
}
