import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { gzipSync } from 'node:zlib';
import type { PartList } from '@masswright/contracts';
import { ApiUser } from '../tests/support/api-user';
import { writeFolder, type FolderFile } from '../tests/support/mesh-folder';
import { block, sphere, writeObj } from '../tests/support/meshes';
import type { BenchContext } from '../tools/bench/context';
import { withSignedInPage } from './browser-session';

export const needs = ['programs'];

const count = 500;
/** Files with which one worker is held against two. */
const compared = 150;
const words = ['bracket', 'housing', 'lever', 'spindle', 'cover', 'flange', 'rib', 'yoke'];
const mebibyte = 1024 * 1024;

/** The corners of a binary STL, facet by facet. */
function readCorners(stl: Uint8Array): number[] {
  const view = new DataView(stl.buffer, stl.byteOffset);
  return Array.from({ length: ((stl.length - 84) / 50) * 9 }, (_, index) => view.getFloat32(84 + Math.floor(index / 9) * 50 + 12 + (index % 9) * 4, true));
}

/** A binary STL with so many small blocks beside its body: files of other sizes, as real ones are. */
function addBlocks(stl: Uint8Array, blocks: number): Buffer {
  const whole = Buffer.concat([stl, ...Array.from({ length: blocks }, (_, index) => block([100 + 3 * index, 0, 0], [102 + 3 * index, 2, 2]).slice(84))]);
  whole.writeUInt32LE((whole.length - 84) / 50, 80);
  return whole;
}

/** Small meshes of 5,000 to 20,000 facets, none the size or the bytes of another: every sixth an OBJ, every seventh packed. */
function makeFiles(series: string, files: number): FolderFile[] {
  const bodies = Array.from({ length: 12 }, (_, index) => sphere(10 + index, 5_000 + (15_000 / 11) * index));
  const objects = bodies.map((body) => writeObj(readCorners(body)));
  return Array.from({ length: files }, (_, index) => {
    const label = new TextEncoder().encode(`# ${series} ${index} `);
    const isObj = index % 6 === 5;
    const isPacked = index % 7 === 6;
    const body = (isObj ? objects : bodies)[index % bodies.length] ?? new Uint8Array();
    const turn = Math.floor(index / bodies.length);
    // A comment before an OBJ and the first 80 bytes of a binary STL are anybody's.
    const whole = isObj ? Buffer.concat([label, Buffer.from(`${'-'.repeat(turn)}\n`), body]) : addBlocks(body, turn);
    if (!isObj) whole.set(label);
    return { place: `${words[index % words.length]}/${words[index % words.length]} ${index}.${isObj ? 'obj' : 'stl'}${isPacked ? '.gz' : ''}`, kind: 'mesh', bytes: isPacked ? gzipSync(whole) : whole };
  });
}

/** The most memory that a process ever had in use, of all its threads. */
function readPeakMebibytes(pid: number | undefined): number {
  const line = /VmHWM:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'));
  return Number(line?.[1]) / 1024;
}

async function waitForMeasured(user: ApiUser, projectId: string, files: number): Promise<void> {
  for (;;) {
    const { total, counts } = await user.get<PartList>(`/projects/${projectId}/parts?limit=1`);
    if (counts.failed > 0) throw new Error(`${counts.failed} of the files could not be measured.`);
    if (total === files && counts.measuring === 0) return;
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
}

/** A person chooses a folder and answers the question at once; how long until all rows are measured. */
async function runInBrowser(url: string, user: ApiUser, files: readonly FolderFile[]): Promise<{ seconds: number; answeredAfter: number }> {
  const project = await user.createProject('Five hundred');
  const folder = mkdtempSync(path.join(os.tmpdir(), 'intake-bench-'));
  try {
    writeFolder(folder, files);
    return await withSignedInPage(url, user.session?.user.email ?? '', async (page) => {
      await page.goto(`${url}/projects/${project.id}`);
      await page.getByRole('button', { name: 'Add meshes' }).first().click();
      const beganAt = performance.now();
      await page.getByLabel('Folder of meshes').setInputFiles(folder);
      await page.getByRole('radio', { name: 'millimetre' }).check();
      await page.getByLabel('Density').fill('2.7 g/cm3');
      await page.getByRole('button', { name: /^These are millimetres/ }).click();
      const answeredAfter = (performance.now() - beganAt) / 1000;
      await waitForMeasured(user, project.id, files.length);
      return { seconds: (performance.now() - beganAt) / 1000, answeredAfter };
    });
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** Files are in the storage already; how long from the first completion until the last is measured. */
async function runThroughApi(user: ApiUser, files: readonly FolderFile[]): Promise<number> {
  // Making files has kept this process busy: what the server closed meanwhile must be heard of before it is used again.
  await new Promise((resolve) => setTimeout(resolve, 50));
  const project = await user.createProject();
  const uploads: string[] = [];
  for (const { place, bytes } of files) uploads.push((await user.send(project.id, path.basename(place), bytes)).id);
  const beganAt = performance.now();
  const complete = async (): Promise<void> => {
    for (let id = uploads.pop(); id !== undefined; id = uploads.pop()) await user.complete(id);
  };
  await Promise.all(Array.from({ length: 4 }, complete));
  await waitForMeasured(user, project.id, files.length);
  return (performance.now() - beganAt) / 1000;
}

export async function run({ apiUrl, worker, startWorker, print }: BenchContext): Promise<void> {
  if (apiUrl === undefined || !worker || !startWorker) throw new Error('This benchmark needs the programs.');
  const user = new ApiUser(apiUrl, apiUrl);
  await user.signUp();
  const files = makeFiles('browser', count);
  const megabytes = files.reduce((sum, { bytes }) => sum + bytes.length, 0) / 1e6;
  const { seconds, answeredAfter } = await runInBrowser(apiUrl, user, files);
  print(`${count} files of together ${megabytes.toFixed(0)} MB from a browser to measured rows: ${seconds.toFixed(1)} s, ${((60 * count) / seconds).toFixed(0)} files a minute (the unit was answered after ${answeredAfter.toFixed(1)} s)`);
  const largest = Math.max(...files.map(({ bytes }) => bytes.length));
  print(`the worker's peak of resident memory: ${readPeakMebibytes(worker.pid).toFixed(0)} MiB; the largest file has ${(largest / mebibyte).toFixed(1)} MiB`);
  await worker.stop();

  // One thread each, so that it is processes that are compared, on machines with few cores too.
  const alone = await startWorker({ WORKER_CONCURRENCY: '1' });
  await runThroughApi(user, makeFiles('warm', 20));
  const one = await runThroughApi(user, makeFiles('one', compared));
  const second = await startWorker({ WORKER_CONCURRENCY: '1' });
  await runThroughApi(user, makeFiles('warm too', 20));
  const two = await runThroughApi(user, makeFiles('two', compared));
  print(`${compared} files through the api, from completion to measured: one worker process ${one.toFixed(1)} s, two ${two.toFixed(1)} s: ${(one / two).toFixed(2)} × as fast (bar: more than 1)`);
  await Promise.all([alone.stop(), second.stop()]);
}
