// npm run -s measure -- <files or folders> …: the command-line program, built first where its sources have changed. Its output is on stdout, all else on stderr.
import { spawn, spawnSync } from 'node:child_process';
import process from 'node:process';
import { inCheckout, Obstacle, root } from './setup/checkout.mjs';
import { ensureNodePackages } from './setup/node-packages.mjs';

function build() {
  const env = { ...process.env, NX_DAEMON: 'false', NX_TUI: 'false', BUILD_DIR: '', NODE_ENV: 'production' };
  const done = spawnSync(inCheckout('node_modules/.bin/nx'), ['build', 'cli', '--outputStyle=static'], { cwd: root, env, encoding: 'utf8' });
  if (done.status !== 0) throw new Obstacle(`The build failed:\n${done.stdout}${done.stderr}`);
}

try {
  // What the installation prints is no record of a mesh.
  console.log = console.error;
  ensureNodePackages(process.stderr.fd);
  build();
  // Paths are those of whoever calls: npm runs its scripts in the folder of package.json.
  const program = spawn(process.execPath, ['--enable-source-maps', inCheckout('apps/cli/dist/main.js'), ...process.argv.slice(2)], { cwd: process.env.INIT_CWD ?? process.cwd(), stdio: 'inherit' });
  for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM'])) process.on(signal, () => program.kill(signal));
  program.once('exit', (code, signal) => process.exit(code ?? (signal === null ? 1 : 130)));
} catch (error) {
  console.error(error instanceof Obstacle ? error.message : error);
  process.exit(1);
}
