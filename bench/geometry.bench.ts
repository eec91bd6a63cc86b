import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { closeSync, mkdtempSync, openSync, readFileSync, readSync, rmSync, statSync, writeFileSync, writeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Worker } from 'node:worker_threads';
import RAPIER from '@dimforge/rapier3d-compat';
import { createIntegralsPass, createMeasurer, createMeshReader, writeBinaryStl, type IntegralsPass } from '@masswright/geometry';
import { OBJLoader, STLLoader } from 'three-stdlib';
import { integrateByDataView } from './geometry/data-view-loop';
import { seventeenDigits, sevenDigits, writeObjText, writeStlText } from './geometry/loader-texts';
import { integratePacked } from './geometry/packed-integrals';

/** Each figure is the median of so many rounds; in a round every task has its turn, so that a slow spell hits all alike. */
const rounds = 7;
/** As much as a stream of a file hands on at once. */
const chunkBytes = 1 << 17;
const headerBytes = 84;

interface Context {
  print: (line: string) => void;
}

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

function integrateFile(file: string, also: (chunk: Uint8Array) => void = () => undefined): void {
  let pass: IntegralsPass = createIntegralsPass({ sizeBytes: statSync(file).size });
  readChunks(file, (chunk) => {
    also(chunk);
    pass.push(chunk);
  });
  for (let end = pass.finish(); end.kind === 'again'; end = pass.finish()) {
    ({ pass } = end);
    readChunks(file, (chunk) => pass.push(chunk));
  }
}

function integrateAndHash(file: string): void {
  const hash = createHash('sha256');
  integrateFile(file, (chunk) => void hash.update(chunk));
  hash.digest();
}

function examineFile(file: string): void {
  const measurer = createMeasurer({ sizeBytes: statSync(file).size });
  readChunks(file, (chunk) => measurer.push(chunk));
  measurer.finish();
}

function parseBytes(bytes: Uint8Array): void {
  const reader = createMeshReader({ sizeBytes: bytes.length, onFacets: () => undefined });
  reader.push(bytes);
  reader.finish();
}

/** Milliseconds of processor time, so that what else the machine does counts little. */
function time(task: () => void): number {
  const before = process.cpuUsage();
  task();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1000;
}

const median = (values: number[]): number => values.sort((one, two) => one - two)[values.length >> 1] ?? NaN;

/** Medians of the tasks, each of which has its turn in every round. */
function compare<Name extends string>(tasks: Record<Name, () => void>, times: (task: () => void) => number = time): Record<Name, number> {
  const names = Object.keys(tasks) as Name[];
  const taken = Object.fromEntries(names.map((name) => [name, [] as number[]])) as Record<Name, number[]>;
  for (let round = -1; round < rounds; round++) {
    for (const name of names) {
      const one = times(tasks[name]);
      if (round >= 0) taken[name].push(one);
    }
  }
  return Object.fromEntries(names.map((name) => [name, median(taken[name])])) as Record<Name, number>;
}

const perFacet = (milliseconds: number, facets: number): string => `${((1e6 * milliseconds) / facets).toFixed(1)} ns a facet`;
const ratio = (value: number): string => `${value.toFixed(2)} ×`;

/** The kernel on bytes that are in memory, against C, against the plain loop, and against a physics engine that loads the mesh for its mass. */
function compareKernel(file: string, folder: string, { print }: Context): void {
  const bytes = readFileSync(file);
  const facets = (bytes.length - headerBytes) / 50;
  const integrate = (): void => {
    const pass = createIntegralsPass({ sizeBytes: bytes.length });
    pass.push(bytes);
    pass.finish();
  };
  const { kernel, loop, whole } = compare({ kernel: () => integratePacked(bytes), loop: () => integrateByDataView(bytes), whole: integrate });
  print(`kernel with its bounds, twenty integrals: ${perFacet(kernel, facets)}; with the sketch of the edges: ${perFacet(whole, facets)}`);
  print(`  against a DataView loop of the same work (${perFacet(loop, facets)}): ${ratio(loop / kernel)} (bar: 1.7)`);
  const c = timeC(file, folder);
  print(c === undefined ? '  no C compiler here, so no comparison with C' : `  against C -O3 of the same work (${c.toFixed(1)} ns a facet): ${ratio((c * facets) / 1e6 / kernel)} (bar: 1.0)`);
}

async function compareEngine({ print }: Context): Promise<void> {
  await RAPIER.init();
  const corners = makeSphere(160);
  const facets = corners.length / 9;
  const bytes = writeBinaryStl(corners);
  const vertices = Float32Array.from(corners);
  const indices = Uint32Array.from({ length: vertices.length / 3 }, (_, corner) => corner);
  const load = (): void => {
    const world = new RAPIER.World({ x: 0, y: 0, z: 0 });
    const body = world.createRigidBody(RAPIER.RigidBodyDesc.dynamic());
    world.createCollider(RAPIER.ColliderDesc.trimesh(vertices, indices).setDensity(1), body);
    body.recomputeMassPropertiesFromColliders();
    body.mass();
    world.free();
  };
  const { engine, kernel } = compare({ engine: load, kernel: () => integratePacked(bytes) });
  print(`  against a physics engine that loads the mesh and states its mass (${perFacet(engine, facets)}, in binary32): ${ratio(engine / kernel)} (bar: 20)`);
}

/** Nanoseconds a facet; undefined where no compiler is. */
function timeC(file: string, folder: string): number | undefined {
  const program = path.join(folder, 'same-work');
  try {
    execFileSync('cc', ['-O3', '-o', program, path.resolve('bench/geometry/same-work.c'), '-lm'], { stdio: 'ignore' });
  } catch {
    return undefined;
  }
  return Number(execFileSync(program, [file, String(rounds)], { encoding: 'utf8' }).split(' ')[0]);
}

function compareReading(file: string, facets: number, { print }: Context): void {
  const { hash, integrate } = compare({ hash: () => hashFile(file), integrate: () => integrateAndHash(file) });
  // Apart: what it leaves to be collected would be counted with the others.
  const { examine } = compare({ examine: () => examineFile(file) });
  print(`${facets} facets of binary STL, processor time:`);
  print(`  read + SHA-256: ${perFacet(hash, facets)}`);
  print(`  read + SHA-256 + integrals, bounds, box and closedness: ${perFacet(integrate, facets)}, ${ratio(integrate / hash)} read + SHA-256 (bar: at most 1.7)`);
  print(`  read + examine to the end: ${perFacet(examine, facets)}, ${ratio(examine / hash)} read + SHA-256`);
}

/** Ten million facets and more: the hash in a thread beside the integrals, by the clock. */
async function compareThreads(file: string, facets: number, { print }: Context): Promise<void> {
  const alone: number[] = [];
  const beside: number[] = [];
  // Started before: a program that measures many files has it waiting.
  const thread = new Worker(hashThread, { eval: true, workerData: { chunkBytes } });
  const hashBeside = (): Promise<void> =>
    new Promise((resolve, reject) => {
      thread.once('message', () => resolve()).once('error', reject);
      thread.postMessage(file);
    });
  await hashBeside();
  for (let round = -1; round < 5; round++) {
    const begin = performance.now();
    hashFile(file);
    const middle = performance.now();
    const hashed = hashBeside();
    integrateFile(file);
    await hashed;
    const end = performance.now();
    if (round < 0) continue;
    alone.push(middle - begin);
    beside.push(end - middle);
  }
  await thread.terminate();
  print(`${facets} facets on two threads, by the clock: read + SHA-256 ${(median(alone) / 1000).toFixed(2)} s, with integrals and closedness beside it ${(median(beside) / 1000).toFixed(2)} s, ${ratio(median(beside) / median(alone))} (bar: at most 1.1)`);
}

const hashThread = `
const { createHash } = require('node:crypto');
const { closeSync, openSync, readSync } = require('node:fs');
const { parentPort, workerData } = require('node:worker_threads');
const buffer = new Uint8Array(workerData.chunkBytes);
parentPort.on('message', (file) => {
  const hash = createHash('sha256');
  const descriptor = openSync(file, 'r');
  for (let read = readSync(descriptor, buffer); read > 0; read = readSync(descriptor, buffer)) hash.update(buffer.subarray(0, read));
  closeSync(descriptor);
  parentPort.postMessage(hash.digest('hex'));
});`;

/** The same facets again and again under one header: what is measured is time, not the body. */
function writeLarge(file: string, small: Uint8Array, times: number): number {
  const facets = ((small.length - headerBytes) / 50) * times;
  const descriptor = openSync(file, 'w');
  const header = Buffer.from(small.subarray(0, headerBytes));
  header.writeUInt32LE(facets, 80);
  writeSync(descriptor, header);
  for (let turn = 0; turn < times; turn++) writeSync(descriptor, small, headerBytes);
  closeSync(descriptor);
  return facets;
}

/** Texts as exporters write them: seven digits, and as a second line all seventeen. Theirs take a text, or bytes that they make one of; ours takes bytes. */
function compareLoaders(corners: Float64Array, { print }: Context): void {
  const facets = corners.length / 9;
  const compareOne = (name: string, bar: string, bytes: Uint8Array<ArrayBuffer>, parse: (bytes: Uint8Array<ArrayBuffer>) => void): void => {
    // One after the other: what theirs leaves to be collected would be counted with ours.
    const { ours } = compare({ ours: () => parseBytes(bytes) });
    const { theirs } = compare({ theirs: () => parse(bytes) });
    const speed = (bytes.length / ours / 1e6).toFixed(2);
    print(`  ${name}: ${perFacet(ours, facets)} (${speed} GB/s) against ${perFacet(theirs, facets)}: ${ratio(theirs / ours)}${bar}`);
  };
  const parseStl = (bytes: Uint8Array<ArrayBuffer>): void => void new STLLoader().parse(bytes.slice().buffer);
  const parseObj = (bytes: Uint8Array<ArrayBuffer>): void => void new OBJLoader().parse(new TextDecoder().decode(bytes));
  print(`text of ${facets} facets against three-stdlib's loaders, processor time:`);
  compareOne('ASCII STL, 7 digits', ' (bar: 30)', writeStlText(corners, sevenDigits), parseStl);
  compareOne('ASCII STL, 17 digits', '', writeStlText(corners, seventeenDigits), parseStl);
  compareOne('OBJ of shared vertices, 7 digits', ' (bar: 100)', writeObjText(corners, sevenDigits, false), parseObj);
  compareOne('OBJ of shared vertices, 17 digits', '', writeObjText(corners, seventeenDigits, false), parseObj);
  compareOne('OBJ with texture places and normals, 7 digits', '', writeObjText(corners, sevenDigits, true), parseObj);
}

/** What the library costs, each figure beside its bar. */
export async function run(context: Context): Promise<void> {
  const folder = mkdtempSync(path.join(tmpdir(), 'masswright-bench-'));
  try {
    const file = path.join(folder, 'sphere.stl');
    const bytes = writeBinaryStl(makeSphere(707));
    const facets = (bytes.length - headerBytes) / 50;
    writeFileSync(file, bytes);
    compareKernel(file, folder, context);
    await compareEngine(context);
    compareReading(file, facets, context);
    const large = path.join(folder, 'large.stl');
    await compareThreads(large, writeLarge(large, bytes, 10), context);
    compareLoaders(makeSphere(160), context);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
