import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Supervisor } from '../start/supervisor.mjs';
import { findFreePort, Service } from './index.mjs';
import { isListening } from './object-storage.mjs';
import { findIdentity, isAlive } from './process-identity.mjs';

let folder: string;
beforeEach(async () => {
  folder = await mkdtemp(path.join(os.tmpdir(), 'masswright-services-'));
});
afterEach(() => rm(folder, { recursive: true, force: true }));

/** A server that listens, and notes its name in a file when it is told to end. */
async function makeServer(name: string, order: number, port: number, body = ''): Promise<Service> {
  const file = path.join(folder, `${name}.mjs`);
  await writeFile(
    file,
    `import net from 'node:net'; import { appendFileSync } from 'node:fs';
     ${body}
     net.createServer().listen(${port}, '127.0.0.1');
     process.on('SIGTERM', () => { appendFileSync(${JSON.stringify(path.join(folder, 'ended'))}, '${name}\\n'); process.exit(0); });`,
  );
  return new Service({ name, command: process.execPath, args: [file], logFile: path.join(folder, `${name}.log`), order, isReady: () => isListening(port), stopDeadlineMs: 2_000 });
}

describe('a service', () => {
  it('is started, killed, and started again on its port', async () => {
    const port = await findFreePort();
    const service = await makeServer('one', 1, port);
    await service.start();
    const first = service.pid;
    await service.restart('SIGKILL');
    expect(service.pid).not.toBe(first);
    expect(await isListening(port)).toBe(true);
    await service.stop();
    expect(await isListening(port)).toBe(false);
    expect(service.pid).toBeUndefined();
  });

  it('that ends before it answers says why, with its last lines', async () => {
    const service = await makeServer('broken', 1, await findFreePort(), "console.error('no such bucket'); process.exit(3);");
    await expect(service.start()).rejects.toThrow(/broken ended \(exit code 3\)[^]*no such bucket/);
  });

  it('that is held by SIGSTOP is ended all the same', async () => {
    const service = await makeServer('held', 1, await findFreePort());
    await service.start();
    service.kill('SIGSTOP');
    await service.stop();
    expect(await readFile(path.join(folder, 'ended'), 'utf8')).toBe('held\n');
  });
});

describe('supervision', () => {
  const lines: string[] = [];
  const fatal = vi.fn();
  let supervisor: Supervisor;
  beforeEach(() => {
    lines.length = 0;
    fatal.mockReset();
    supervisor = new Supervisor({ log: (line) => lines.push(line), onFatal: fatal });
  });
  afterEach(() => supervisor.stop());

  it('starts again what dies, after a pause that doubles', async () => {
    const port = await findFreePort();
    const service = await makeServer('one', 1, port);
    await supervisor.start(service);
    for (const pause of ['0.1', '0.2', '0.4']) {
      service.kill('SIGKILL');
      await vi.waitFor(() => expect(lines).toContain(`one ended (SIGKILL); it starts again in ${pause} s.`), { timeout: 10_000 });
      await vi.waitFor(() => expect(lines.at(-1)).toBe('one runs again.'), { timeout: 10_000 });
    }
    expect(await isListening(port)).toBe(true);
    expect(fatal).not.toHaveBeenCalled();
  });

  it('does not try again where the environment is wrong, and passes the message on', async () => {
    const port = await findFreePort();
    const flag = JSON.stringify(path.join(folder, 'flag'));
    const service = await makeServer('two', 1, port, `import { existsSync } from 'node:fs'; if (existsSync(${flag})) { console.error('S3_BUCKET should be a name'); process.exit(78); }`);
    await supervisor.start(service);
    await writeFile(path.join(folder, 'flag'), '');
    service.kill('SIGKILL');
    await vi.waitFor(() => expect(fatal).toHaveBeenCalledWith(expect.stringContaining('S3_BUCKET should be a name')), { timeout: 10_000 });
    expect(lines).toEqual(['two ended (SIGKILL); it starts again in 0.1 s.']);
  });

  it('stops in order, the highest first', async () => {
    for (const [name, order] of [['low', 1], ['high', 3], ['middle', 2]] as const) await supervisor.start(await makeServer(name, order, await findFreePort()));
    await supervisor.stop();
    expect(await readFile(path.join(folder, 'ended'), 'utf8')).toBe('high\nmiddle\nlow\n');
  });
});

describe('the guardian', () => {
  it('stops everything in order when the script that started it is killed', async () => {
    const services = fileURLToPath(new URL('./index.mjs', import.meta.url));
    const ports = [await findFreePort(), await findFreePort()];
    await makeServer('first', 1, ports[0] ?? 0);
    await makeServer('second', 2, ports[1] ?? 0);
    const script = path.join(folder, 'script.mjs');
    await writeFile(
      script,
      `import { Service } from ${JSON.stringify(services)};
       import net from 'node:net';
       const up = (port) => new Promise((resolve) => { const socket = net.connect(port, '127.0.0.1', () => { socket.end(); resolve(true); }); socket.on('error', () => resolve(false)); });
       const pids = [];
       for (const [name, order, port] of [['first', 1, ${ports[0]}], ['second', 2, ${ports[1]}]]) {
         const service = new Service({ name, command: process.execPath, args: [${JSON.stringify(folder)} + '/' + name + '.mjs'], logFile: ${JSON.stringify(folder)} + '/' + name + '.log', order, isReady: () => up(port) });
         await service.start();
         pids.push(service.pid);
       }
       console.log(JSON.stringify(pids));
       setInterval(() => undefined, 1000);`,
    );
    const child = spawn(process.execPath, [script], { stdio: ['ignore', 'pipe', 'inherit'] });
    const [chunk] = (await once(child.stdout, 'data')) as [Buffer];
    const identities = (JSON.parse(chunk.toString()) as number[]).map((pid) => findIdentity(pid));
    expect(identities.every((identity) => identity !== undefined && isAlive(identity))).toBe(true);
    child.kill('SIGKILL');
    await vi.waitFor(() => expect(identities.some((identity) => identity !== undefined && isAlive(identity))).toBe(false), { timeout: 10_000 });
    expect(await readFile(path.join(folder, 'ended'), 'utf8')).toBe('second\nfirst\n');
  });
});
