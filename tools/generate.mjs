// Writes what is generated from the code and committed: the OpenAPI document, the types of the web's client, and geometry's compiled modules.
// `--check` only compares and fails where something is out of date.
import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import process from 'node:process';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));
const client = path.join(root, 'libs/client/src');
const work = mkdtempSync(path.join(tmpdir(), 'masswright-generate-'));

/** @param {string[]} command @param {Record<string, string>} [environment] */
function run([program, ...parameters], environment = {}) {
  const result = spawnSync(program ?? '', parameters, { cwd: root, stdio: ['ignore', 'ignore', 'inherit'], env: { ...process.env, ...environment } });
  if (result.status !== 0) throw new Error(`${program} ${parameters.join(' ')} failed.`);
}

/**
 * A WebAssembly module as a source file, so that browsers and threads take it with the code. Its memory is fixed.
 * @param {{ source: string, pages: number, name: string, target: string }} module pages are of 64 KiB
 */
function compileModule({ source, pages, name, target }) {
  const compiled = path.join(work, `${name}.wasm`);
  const memory = ['--initialMemory', String(pages), '--maximumMemory', String(pages)];
  run(['npx', 'asc', `libs/geometry/assembly/${source}`, '-O3', '--noAssert', '--runtime', 'stub', '--enable', 'simd', ...memory, '-o', compiled]);
  const base64 = readFileSync(compiled).toString('base64');
  writeFileSync(target, `/* Compiled from assembly/ by \`npm run generate\`; not to be edited. */\nexport const ${name} =\n  '${base64}';\n`);
}

try {
  const document = path.join(work, 'openapi.json');
  const types = path.join(work, 'schema.generated.ts');
  run(['npx', 'vite', 'build', 'apps/api', '--outDir', path.join(root, 'node_modules/.cache/openapi')], { BUILD_DIR: '' });
  run(['node', path.join(root, 'node_modules/.cache/openapi/openapi.js'), document]);
  run(['npx', 'openapi-typescript', document, '--output', types]);
  const kernels = path.join(work, 'kernel.generated.ts');
  compileModule({ source: 'index.ts', pages: 6, name: 'compiledKernel', target: kernels });
  const lane = path.join(work, 'lane.generated.ts');
  compileModule({ source: 'text/index.ts', pages: 7, name: 'compiledLane', target: lane });
  /** @type {[string, string][]} what was generated, and where it is kept */
  const pairs = [
    [document, path.join(client, 'openapi.json')],
    [types, path.join(client, 'schema.generated.ts')],
    [kernels, path.join(root, 'libs/geometry/src/kernel/kernel.generated.ts')],
    [lane, path.join(root, 'libs/geometry/src/text-lane/lane.generated.ts')],
  ];
  const read = (/** @type {string} */ file) => {
    try {
      return readFileSync(file, 'utf8');
    } catch {
      return '';
    }
  };
  const stale = pairs.filter(([fresh, kept]) => read(fresh) !== read(kept));
  if (process.argv.includes('--check')) {
    if (stale.length > 0) {
      console.error(`Out of date: ${stale.map(([, kept]) => path.relative(root, kept)).join(', ')}. Run: npm run generate`);
      process.exitCode = 1;
    }
  } else {
    for (const [fresh, kept] of stale) writeFileSync(kept, readFileSync(fresh));
    console.log(stale.length === 0 ? 'Everything was up to date.' : `Written: ${stale.map(([, kept]) => path.relative(root, kept)).join(', ')}`);
  }
} finally {
  rmSync(work, { recursive: true, force: true });
}
