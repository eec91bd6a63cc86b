import { spawn, spawnSync } from 'node:child_process';
import { cpSync, mkdtempSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createRolesAndDatabase, migrateSchema } from '@masswright/drizzle';
import { metricsToken, programEnvironment, startTestApi, type TestApi } from '../../support/api';
import { ApiUser } from '../../support/api-user';
import { environment } from '../../support/environment';
import { block } from '../../support/meshes';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';
import { startTestWorker, type TestWorker } from '../../support/worker';
import { findFreePort } from '../../../tools/services/ports.mjs';

const root = path.resolve(import.meta.dirname, '../../..');

interface LogLine {
  requestId?: string;
  route?: string;
  job?: string;
  msg?: string;
}

/** The built api in a process of its own, whose log can be read. */
async function startApiProcess(database: TestDatabase, overrides: Record<string, string> = {}) {
  const port = await findFreePort();
  const child = spawn(process.execPath, [path.join(environment.buildDir, 'apps/api/main.js')], {
    env: { PATH: process.env['PATH'], ...programEnvironment(database, port), LOG_LEVEL: 'info', ...overrides },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (text: Buffer) => (output += text.toString()));
  const exited = new Promise<number | null>((resolve) => child.once('exit', resolve));
  const url = `http://127.0.0.1:${port}`;
  return { child, url, output: () => output, exited };
}

let database: TestDatabase;
let api: TestApi;
let worker: TestWorker;
let user: ApiUser;

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  worker = await startTestWorker({ ...programEnvironment(database, Number(new URL(api.url).port)), LOG_LEVEL: 'info' });
  user = api.visit();
  await user.signUp();
});
afterAll(async () => {
  await worker.stop();
  await api.close();
  await database.drop();
});

describe('health', () => {
  it('is live and ready apart from each other: without its database the api lives and is not ready', async () => {
    const process = await startApiProcess(database, { DATABASE_URL: 'postgres://masswright_app:x@127.0.0.1:1/none' });
    const status = async (which: string) => (await fetch(`${process.url}/api/health/${which}`).catch(() => undefined))?.status;
    for (let turn = 0; turn < 400 && (await status('live')) !== 200; turn++) await new Promise((resolve) => setTimeout(resolve, 50));
    expect(await status('live')).toBe(200);
    expect(await status('ready')).toBe(503);
    process.child.kill('SIGTERM');
    await process.exited;
  });

  it('of both programs is good here, and says nothing more than that', async () => {
    for (const url of [`${api.url}/api/health/live`, `${api.url}/api/health/ready`, `${worker.url}/health/live`, `${worker.url}/health/ready`]) {
      const response = await fetch(url);
      expect([response.status, await response.json()], url).toEqual([200, { status: 'ok' }]);
    }
  });
});

describe('metrics', () => {
  it('are for whoever has the token: queue depth and the age of the oldest outbox row among them', async () => {
    for (const url of [`${api.url}/api/metrics`, `${worker.url}/metrics`]) {
      expect((await fetch(url)).status).toBe(404);
      expect((await fetch(url, { headers: { Authorization: 'Bearer wrong' } })).status).toBe(404);
      const response = await fetch(url, { headers: { Authorization: `Bearer ${metricsToken}` } });
      expect(response.status).toBe(200);
      const text = await response.text();
      expect(text).toMatch(/^masswright_outbox_oldest_age_seconds \d/m);
      if (url.startsWith(worker.url)) expect(text).toMatch(/^masswright_queue_depth\{queue="measuring"\} \d/m);
    }
  });

  it('tell the age of work that waits', async () => {
    await database.look(`insert into outbox (job, payload, request_id, created_at, due_at) values ('mail.send', '{}', 'waiting', now() - interval '90 seconds', now() + interval '1 day')`);
    const text = await (await fetch(`${api.url}/api/metrics`, { headers: { Authorization: `Bearer ${metricsToken}` } })).text();
    expect(Number(/^masswright_outbox_oldest_age_seconds (\S+)/m.exec(text)?.[1])).toBeGreaterThan(89);
    await database.look(`delete from outbox where request_id = 'waiting'`);
  });
});

describe('logs', () => {
  it('carry one request id through api, outbox and job, and neither file names, tokens nor addresses', async () => {
    const process = await startApiProcess(database);
    for (let turn = 0; turn < 400; turn++) {
      if ((await fetch(`${process.url}/api/health/live`).catch(() => undefined))?.ok === true) break;
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
    const person = new ApiUser(process.url, process.url);
    await person.signUp();
    const { id } = await person.createProject();
    const upload = await person.send(id, 'secret-gimbal.stl', block([0, 0, 0], [1, 2, 3]));
    const completion = await person.ask<{ id: string }>('POST', `/uploads/${upload.id}/completion`, { setting: { lengthUnit: 'mm', densityKgM3: 1000 } });
    const requestId = completion.headers.get('x-request-id') ?? 'none';
    await person.waitForRun(completion.body.id);
    await new Promise((resolve) => setTimeout(resolve, 200));
    process.child.kill('SIGTERM');
    await process.exited;
    const lines = (text: string) => text.split('\n').flatMap((line) => (line.startsWith('{') ? [JSON.parse(line) as LogLine] : []));
    expect(lines(process.output()).find((line) => line.requestId === requestId)).toMatchObject({ route: '/api/v1/uploads/:uploadId/completion' });
    expect(lines(worker.log()).find((line) => line.requestId === requestId)).toMatchObject({ job: 'measurement.run', msg: 'done' });
    expect(await database.look('select 1 from outbox where request_id = $1', [requestId])).toHaveLength(1);
    for (const text of [process.output(), worker.log()]) {
      for (const secret of ['secret-gimbal', person.cookie?.split('=')[1] ?? 'none', person.session?.user.email ?? 'none', upload.id, 'X-Amz-Signature']) {
        expect(text.includes(secret), secret).toBe(false);
      }
      // Every line is JSON.
      for (const line of text.trim().split('\n')) expect(() => JSON.parse(line) as unknown).not.toThrow();
    }
  });
});

describe('a wrong environment', () => {
  it.each(['apps/api/main.js', 'apps/worker/main.js', 'drizzle/migrate.js'])('stops %s with the variable’s name and what it should look like', (file) => {
    const result = spawnSync(process.execPath, [path.join(environment.buildDir, file)], { env: { PATH: process.env['PATH'], DATABASE_URL: 'mysql://hidden-word@x' }, encoding: 'utf8' });
    expect(result.status).toBe(78);
    expect(result.stderr).toContain('DATABASE_URL should look like postgres://');
    expect(result.stderr).not.toContain('hidden-word');
  });
});

describe('migrations', () => {
  const name = `test_migration_${process.pid}`;
  const inDatabase = (url: string) => Object.assign(new URL(url), { pathname: `/${name}` }).href;
  const urls = () => ({ admin: environment.adminUrl, migration: inDatabase(environment.migrationUrl), application: inDatabase(environment.applicationUrl) });

  afterAll(async () => {
    const client = new pg.Client({ connectionString: environment.adminUrl });
    await client.connect();
    await client.query(`drop database if exists ${name} with (force)`);
    await client.end();
  });

  it('started four times at once on an empty server take turns and run once', async () => {
    await Promise.all([1, 2, 3, 4].map(() => createRolesAndDatabase(urls())));
    await Promise.all([1, 2, 3, 4].map(() => migrateSchema(urls().migration)));
    const client = new pg.Client({ connectionString: urls().migration });
    await client.connect();
    const { rows } = await client.query<{ count: number }>('select count(*)::int as count from drizzle.__drizzle_migrations');
    await client.end();
    const files = readdirSync(path.join(root, 'drizzle/migrations')).filter((file) => file.endsWith('.sql'));
    expect(rows[0]?.count).toBe(files.length);
  });

  it('go forward only, and leave no difference between the tables and the schema in the code', () => {
    const drizzle = path.join(root, 'drizzle');
    // drizzle-kit writes what differs beside the migrations that it is shown, so it is shown a copy.
    const copy = mkdtempSync(path.join(environment.dataDir, 'migrations-'));
    cpSync(path.join(drizzle, 'migrations'), copy, { recursive: true });
    const options = ['--dialect=postgresql', '--schema=./src/schema/index.ts', `--out=./${path.relative(drizzle, copy)}`];
    const result = spawnSync('npx', ['drizzle-kit', 'generate', ...options], { cwd: drizzle, encoding: 'utf8' });
    expect(`${result.stdout}${result.stderr}`).toContain('No schema changes');
    for (const file of readdirSync(copy).filter((one) => one.endsWith('.sql'))) {
      expect(readFileSync(path.join(copy, file), 'utf8'), file).not.toMatch(/drop table|drop column|truncate/i);
    }
  });

  it('can be backed up by the role that is for it', () => {
    const { stdout, status, stderr } = spawnSync('pg_dump', ['--data-only', '--table=users', '--dbname', database.migrationUrl], { encoding: 'utf8' });
    expect(stderr).toBe('');
    expect(status).toBe(0);
    expect(stdout).toContain(user.session?.user.email ?? 'nobody');
    const refused = spawnSync('pg_dump', ['--data-only', '--table=users', '--dbname', database.applicationUrl], { encoding: 'utf8' });
    expect(refused.stdout).not.toContain(user.session?.user.email ?? 'nobody');
  });
});

describe('the page’s policy', () => {
  it('lets the page load from the app alone and talk to it and the storage', async () => {
    const policy = (await fetch(`${api.url}/api/health/live`)).headers.get('content-security-policy') ?? '';
    const directives = Object.fromEntries(policy.split(';').map((directive) => [directive.trim().split(' ')[0] ?? '', directive.trim().split(' ').slice(1)]));
    expect(directives['default-src']).toEqual(["'none'"]);
    expect(directives['script-src']).toEqual(["'self'"]);
    expect(directives['connect-src']).toEqual(["'self'", new URL(environment.storage.endpoint).origin]);
    expect(directives['frame-ancestors']).toEqual(["'none'"]);
  });
});

describe('what is generated from the code', () => {
  it('is up to date: the OpenAPI document and the client’s types', () => {
    const result = spawnSync(process.execPath, [path.join(root, 'tools/generate.mjs'), '--check'], { encoding: 'utf8' });
    expect(`${result.stdout}${result.stderr}`).not.toContain('Out of date');
    expect(result.status).toBe(0);
  });
});
