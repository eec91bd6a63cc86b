import { spawn, type ChildProcess } from 'node:child_process';
import path from 'node:path';
import { findFreePort } from '../../tools/services/ports.mjs';
import { environment } from './environment';

export interface TestWorker {
  child: ChildProcess;
  url: string;
  /** Its log so far. */
  log: () => string;
  stop: (signal?: NodeJS.Signals) => Promise<void>;
}

/** The built worker in a process of its own, ready to work. */
export async function startTestWorker(variables: Record<string, string>): Promise<TestWorker> {
  const port = await findFreePort();
  const child = spawn(process.execPath, ['--enable-source-maps', path.join(environment.buildDir, 'apps/worker/main.js')], {
    env: { PATH: process.env['PATH'], QUEUE_LOCK_MS: '2000', ...variables, WORKER_PORT: String(port) },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let log = '';
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (text: Buffer) => (log += text.toString()));
  const url = `http://127.0.0.1:${port}`;
  const gone = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  const stop = async (signal: NodeJS.Signals = 'SIGTERM') => {
    child.kill(signal);
    await gone;
  };
  const end = Date.now() + 20_000;
  for (;;) {
    if (child.exitCode !== null) throw new Error(`The worker ended with ${child.exitCode}: ${log}`);
    const answer = await fetch(`${url}/health/ready`).catch(() => undefined);
    if (answer?.ok === true) return { child, url, log: () => log, stop };
    if (Date.now() > end) {
      await stop('SIGKILL');
      throw new Error(`The worker was not ready within 20 s: ${log}`);
    }
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
