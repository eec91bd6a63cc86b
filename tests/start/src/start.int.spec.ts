import { chmodSync, existsSync, mkdtempSync, readFileSync, rmSync, statSync } from 'node:fs';
import net from 'node:net';
import path from 'node:path';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { findPortBase, House, waitUntilGone } from './house';

const data = mkdtempSync(path.join(process.env['TEST_DATA_DIR'] ?? '', 'start-'));
// Open to the user that PostgreSQL runs as, or the start would keep its data elsewhere.
chmodSync(data, 0o755);
const names = ['Mail', 'Object storage', 'PostgreSQL', 'Redis', 'api', 'worker'];
let portBase: number;
beforeAll(async () => {
  portBase = await findPortBase();
});
let running: House | undefined;
afterAll(async () => {
  running?.signal('SIGTERM');
  await running?.waitForExit();
  rmSync(data, { recursive: true, force: true });
});

function startHouse(environment: Record<string, string> = {}): House {
  running = new House(data, portBase, environment);
  return running;
}

async function query(statement: string): Promise<unknown[]> {
  const password = readFileSync(path.join(data, 'postgres/superuser-password'), 'utf8');
  const client = new pg.Client({ host: '127.0.0.1', port: portBase + 2, user: 'postgres', password, database: 'postgres' });
  await client.connect();
  try {
    return (await client.query<Record<string, unknown>>(statement)).rows;
  } finally {
    await client.end();
  }
}

describe('npm start', () => {
  it('ends with the address and the sign-ins, and the application answers there', async () => {
    const house = startHouse();
    await house.waitFor('Ctrl-C stops everything.');
    for (const stage of ['System packages', 'Node packages', 'Disk and ports', 'Services', 'Database migrated', 'Worker and api', 'Demonstration']) {
      expect(house.output).toMatch(new RegExp(`^ +\\d+\\.\\d s  ${stage}`, 'm'));
    }
    expect(house.output).toContain(`\n  ${house.url}\n`);
    expect(house.output).toMatch(/^ {2}administrator +\S+@\S+ +\S.*$/m);
    expect(house.output).toContain(`http://127.0.0.1:${portBase + 6}`);
    const page = await fetch(house.url);
    expect(page.status).toBe(200);
    expect(page.headers.get('content-security-policy')).toContain("default-src 'none'");
    expect((await fetch(`${house.url}/api/health/ready`)).status).toBe(200);
    expect(house.readWards().map((ward) => ward.name).sort()).toEqual(names);
  });

  it('keeps its secrets where only their owner can read them', () => {
    for (const file of ['secrets.json', 'postgres/superuser-password', 'redis/redis.conf']) expect(statSync(path.join(data, file)).mode & 0o077, file).toBe(0);
  });

  it('starts again what is killed', async () => {
    const house = running as House;
    for (const name of names) {
      const killed = house.getWard(name);
      process.kill(killed.pid, 'SIGKILL');
      await house.waitFor(`${name} ended (SIGKILL); it starts again in 0.1 s.`);
      await house.waitFor(`${name} runs again.`);
      expect(house.getWard(name).pid).not.toBe(killed.pid);
    }
    expect((await fetch(`${house.url}/api/health/ready`)).status).toBe(200);
  });

  it('refuses to start twice from one checkout', async () => {
    const second = new House(data, portBase);
    expect(await second.waitForExit()).toBe(1);
    expect(second.output).toMatch(/one running already in this checkout: http:\S+ \(process \d+\)/);
    expect((await fetch(running?.url ?? '')).status).toBe(200);
  });

  it('stops everything in order when it is told to', async () => {
    const house = running as House;
    await query("create table kept as select 'yes' as word");
    const wards = house.readWards();
    house.signal('SIGTERM');
    expect(await house.waitForExit()).toBe(0);
    await waitUntilGone(wards);
    // PostgreSQL removes its note when it shuts down, and leaves it when it is killed.
    expect(existsSync(path.join(data, 'postgres/data/postmaster.pid'))).toBe(false);
  });

  it('keeps the data for the next start, and a kill of the script stops everything, too', async () => {
    const house = startHouse();
    await house.waitFor('Ctrl-C stops everything.');
    expect(await query('select word from kept')).toEqual([{ word: 'yes' }]);
    const wards = house.readWards();
    expect(wards).toHaveLength(names.length);
    house.signal('SIGKILL');
    await house.waitForExit();
    await waitUntilGone(wards);
    expect(existsSync(path.join(data, 'postgres/data/postmaster.pid'))).toBe(false);
  });

  it('names the port that is in use, what wants it and the variable to change', async () => {
    const other = net.createServer().listen(portBase + 3, '127.0.0.1');
    const house = startHouse();
    expect(await house.waitForExit()).toBe(1);
    other.close();
    expect(house.output).toContain(`Port ${portBase + 3} on 127.0.0.1 is in use by another program, and Redis wants it.`);
    expect(house.output).toContain('REDIS_PORT');
    expect(house.output).not.toContain('    at ');
  });

  it('stops with the name of a variable that is wrong', async () => {
    const house = startHouse({ LOG_LEVEL: 'loud' });
    expect(await house.waitForExit()).toBe(1);
    expect(house.output).toMatch(/The environment is wrong:[^]*LOG_LEVEL should be one of fatal/);
    expect(house.output).not.toContain('    at ');
  });
});
