import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { vi } from 'vitest';
import { findFreePort, isPortFree } from '../../../tools/services/ports.mjs';
import { isAlive, type ProcessIdentity } from '../../../tools/services/process-identity.mjs';
import { workspaceRoot } from '../../../vite.shared.ts';

/** The first of ten ports in a row that are all free. */
export async function findPortBase(): Promise<number> {
  for (;;) {
    const base = await findFreePort();
    const free = await Promise.all(Array.from({ length: 10 }, (_, offset) => isPortFree(base + offset)));
    if (free.every(Boolean)) return base;
  }
}

interface Ward extends ProcessIdentity {
  name: string;
}

/** `npm start` as a process, on ports and data of its own, with the builds of this run. */
export class House {
  output = '';
  private readonly child: ChildProcess;

  constructor(
    private readonly dataFolder: string,
    readonly portBase: number,
    environment: Record<string, string> = {},
  ) {
    const env: NodeJS.ProcessEnv = { ...process.env };
    for (const name of Object.keys(env)) if (/^(DATABASE_|REDIS_|S3_|SMTP_|PUBLIC_URL|API_|WORKER_|VITEST|NODE_OPTIONS)/.test(name)) delete env[name];
    this.child = spawn(process.execPath, ['tools/start.mjs'], {
      cwd: workspaceRoot,
      env: { ...env, NODE_ENV: undefined, DATA_FOLDER: dataFolder, BUILD_DIR: process.env['TEST_BUILD_DIR'], PORT_BASE: String(portBase), ...environment },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    for (const stream of [this.child.stdout, this.child.stderr]) stream?.on('data', (chunk: Buffer) => (this.output += chunk.toString()));
  }

  get url(): string {
    return `http://127.0.0.1:${this.portBase}`;
  }

  async waitFor(text: string, timeout = 100_000): Promise<void> {
    await vi.waitFor(
      () => {
        if (this.output.includes(text)) return;
        if (this.child.exitCode !== null) throw new Error(`it ended with ${this.child.exitCode} before it said "${text}":\n${this.output}`);
        throw new Error(`it did not say "${text}":\n${this.output}`);
      },
      { timeout, interval: 50 },
    );
  }

  signal(signal: NodeJS.Signals): void {
    this.child.kill(signal);
  }

  async waitForExit(): Promise<number | null> {
    if (this.child.exitCode === null && this.child.signalCode === null) await once(this.child, 'exit');
    return this.child.exitCode;
  }

  /** Every process that it started and noted down. */
  readWards(): Ward[] {
    const folder = path.join(this.dataFolder, 'run');
    const notes = readdirSync(folder).filter((name) => name.startsWith('process-'));
    return notes.map((name) => JSON.parse(readFileSync(path.join(folder, name), 'utf8')) as Ward);
  }

  getWard(name: string): Ward {
    const ward = this.readWards().find((candidate) => candidate.name === name);
    if (!ward) throw new Error(`${name} was not noted`);
    return ward;
  }
}

export async function waitUntilGone(wards: Ward[]): Promise<void> {
  await vi.waitFor(
    () => {
      const left = wards.filter(isAlive).map((ward) => ward.name);
      if (left.length > 0) throw new Error(`still there: ${left.join(', ')}`);
    },
    { timeout: 30_000, interval: 50 },
  );
}
