// npm run bench [-- name …]: the benchmarks in bench/, each on a machine that does nothing else for us meanwhile. Never part of the tests.
import { existsSync, readdirSync, rmSync } from 'node:fs';
import os from 'node:os';
import { runBench } from './bench/run-bench.mjs';
import { inCheckout, Obstacle } from './setup/checkout.mjs';
import { ensureDebianPackages } from './setup/debian-packages.mjs';
import { ensureNodePackages } from './setup/node-packages.mjs';
import { endTasks } from './setup/tasks.mjs';

const suffix = '.bench.ts';
const folder = inCheckout('bench');
const all = existsSync(folder) ? readdirSync(folder).filter((name) => name.endsWith(suffix)).map((name) => name.slice(0, -suffix.length)).sort() : [];
const names = process.argv.slice(2).length > 0 ? process.argv.slice(2) : all;

async function main() {
  const unknown = names.filter((name) => !all.includes(name));
  if (unknown.length > 0) throw new Obstacle(`There is no benchmark ${unknown.join(', ')}. There is: ${all.join(', ') || 'none'}.`);
  ensureDebianPackages(['postgresql', 'redis-server', 'chromium']);
  ensureNodePackages();
  console.log(`${os.availableParallelism()} cores, ${os.cpus()[0]?.model ?? 'unknown processor'}, Node.js ${process.version}`);
  for (const name of names) {
    console.log(`\n${name}`);
    await runBench(`${folder}/${name}${suffix}`, (line) => console.log(`  ${line}`));
  }
}

process.once('SIGINT', () => {
  endTasks();
  process.exit(130);
});
main().then(
  () => process.exit(0),
  (error) => {
    console.error(error instanceof Obstacle ? error.message : error);
    process.exit(1);
  },
).finally(() => rmSync(inCheckout('.test/bench'), { recursive: true, force: true }));
