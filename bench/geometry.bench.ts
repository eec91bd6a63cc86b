import { createHash } from 'node:crypto';
import { closeSync, mkdtempSync, openSync, readSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { createMeasurer, createMeshReader, writeAsciiStl, writeBinaryStl } from '@masswright/geometry';

/** Each figure is the median of so many rounds; in a round every task has its turn, so that a slow spell hits all alike. */
const rounds = 7;
const chunkBytes = 1 << 20;

/** A sphere by rings of quadrilaterals, about 2 n² facets. */
function makeSphere(rings: number): Float64Array {
  const corners: number[] = [];
  const point = (i: number, j: number): number[] => {
    const [polar, around] = [(Math.PI * i) / rings, (2 * Math.PI * (j % rings)) / rings];
    const radius = i === 0 || i === rings ? 0 : Math.sin(polar);
    return [50 * radius * Math.cos(around), 50 * radius * Math.sin(around), i === rings ? -50 : 50 * Math.cos(polar)];
  };
  for (let i = 0; i < rings; i++) {
    for (let j = 0; j < rings; j++) {
      if (i > 0) corners.push(...point(i, j), ...point(i + 1, j), ...point(i, j + 1));
      if (i + 1 < rings) corners.push(...point(i + 1, j), ...point(i + 1, j + 1), ...point(i, j + 1));
    }
  }
  return Float64Array.from(corners);
}

/** Reads a file chunk by chunk into one buffer, as a stream would hand it on. */
function readChunks(file: string, take: (chunk: Uint8Array) => void): void {
  const buffer = new Uint8Array(chunkBytes);
  const descriptor = openSync(file, 'r');
  for (let read = readSync(descriptor, buffer); read > 0; read = readSync(descriptor, buffer)) take(buffer.subarray(0, read));
  closeSync(descriptor);
}

function hashFile(file: string): void {
  const hash = createHash('sha256');
  readChunks(file, (chunk) => void hash.update(chunk));
  hash.digest();
}

function parseFile(file: string): void {
  const reader = createMeshReader({ sizeBytes: statSync(file).size, maximumFacets: Infinity, onFacets: () => undefined });
  readChunks(file, (chunk) => reader.push(chunk));
  reader.finish();
}

function measureFile(file: string): void {
  const hash = createHash('sha256');
  const measurer = createMeasurer({ sizeBytes: statSync(file).size });
  readChunks(file, (chunk) => {
    hash.update(chunk);
    measurer.push(chunk);
  });
  hash.digest();
  measurer.finish();
}

const median = (values: number[]): number => values.sort((one, two) => one - two)[values.length >> 1] ?? NaN;

/** Milliseconds of processor time, so that what else the machine does counts little. */
function time(task: () => void): number {
  const before = process.cpuUsage();
  task();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1000;
}

/** What measuring costs beside reading and hashing the file, which has to be done in any case. */
export function run(context: { print: (line: string) => void }): Promise<void> {
  const folder = mkdtempSync(path.join(tmpdir(), 'masswright-bench-'));
  try {
    for (const rings of [50, 707]) {
      const corners = makeSphere(rings);
      const facets = corners.length / 9;
      const [binary, ascii] = [path.join(folder, 'binary.stl'), path.join(folder, 'ascii.stl')];
      writeFileSync(binary, writeBinaryStl(corners));
      // A tenth of the facets: a text of a million would not fit a string.
      const some = corners.subarray(0, 9 * Math.ceil(facets / 10));
      writeFileSync(ascii, writeAsciiStl(some));
      const tasks: Record<string, { facets: number; run: () => void }> = {
        'read + SHA-256': { facets, run: () => hashFile(binary) },
        'read + parse, binary': { facets, run: () => parseFile(binary) },
        'read + parse, ASCII': { facets: some.length / 9, run: () => parseFile(ascii) },
        'read + SHA-256 + measure, binary': { facets, run: () => measureFile(binary) },
      };
      const times = Object.fromEntries(Object.keys(tasks).map((name) => [name, [] as number[]]));
      for (let round = 0; round < rounds; round++) for (const [name, task] of Object.entries(tasks)) times[name]?.push(time(task.run));
      const perFacet = (name: string): number => (1e6 * median(times[name] ?? [])) / (tasks[name]?.facets ?? NaN);
      context.print(`${facets} facets, processor time a facet, and as a multiple of read + SHA-256 of the binary file:`);
      for (const name of Object.keys(tasks)) context.print(`${name.padEnd(34)} ${perFacet(name).toFixed(0).padStart(6)} ns ${(perFacet(name) / perFacet('read + SHA-256')).toFixed(1).padStart(6)} ×`);
    }
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
  return Promise.resolve();
}
