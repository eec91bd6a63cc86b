import { readFileSync } from 'node:fs';
import { ApiUser } from '../tests/support/api-user';
import { sphere } from '../tests/support/meshes';
import type { BenchContext } from '../tools/bench/context';

export const needs = ['programs'];

const headerBytes = 84;
const facetBytes = 50;
const times = 20;
/** Bar: integrals and closedness of 20 million facets (1 GB), straight from the object storage. */
const barMegabytes = 250;

/** A binary STL of a million facets, so many times over: what is looked at is memory, not the body. */
function makeLarge(): Buffer {
  const one = sphere(40, 1_000_000).subarray(headerBytes);
  const whole = Buffer.alloc(headerBytes + times * one.length);
  for (let turn = 0; turn < times; turn++) whole.set(one, headerBytes + turn * one.length);
  whole.writeUInt32LE((whole.length - headerBytes) / facetBytes, 80);
  return whole;
}

/** Megabytes of resident memory: the most that a process ever had, and what it has now. */
function readMemory(pid: number | undefined, field: 'VmHWM' | 'VmRSS'): number {
  const line = new RegExp(`${field}:\\s+(\\d+) kB`).exec(readFileSync(`/proc/${pid}/status`, 'utf8'));
  return (Number(line?.[1]) * 1024) / 1e6;
}

export async function run({ apiUrl, worker, print }: BenchContext): Promise<void> {
  if (apiUrl === undefined || !worker) throw new Error('This benchmark needs the programs.');
  // Before anything is asked of the server: it takes seconds, and a connection would be closed meanwhile.
  const bytes = makeLarge();
  const user = new ApiUser(apiUrl, apiUrl);
  await user.signUp();
  const project = await user.createProject('Large');
  const idle = readMemory(worker.pid, 'VmRSS');
  const upload = await user.send(project.id, 'large.stl', bytes);
  const storedAt = performance.now();
  const { id } = await user.complete(upload.id);
  const { revision } = await user.waitForRun(id, 300_000);
  const seconds = (performance.now() - storedAt) / 1000;
  const { measurement } = revision;
  const peak = readMemory(worker.pid, 'VmHWM');
  print(`${measurement?.facets ?? 0} facets (${(bytes.length / 1e6).toFixed(0)} MB) from the object storage: ${seconds.toFixed(1)} s to figures and closedness (${measurement?.soundness.closed === true ? 'closed' : 'not closed'}, ${measurement?.examined ?? 'failed'})`);
  print(`  the worker's peak of resident memory ${peak.toFixed(0)} MB, ${(peak / barMegabytes).toFixed(2)} × the bar of ${barMegabytes} MB; idle it has ${idle.toFixed(0)} MB`);
}
