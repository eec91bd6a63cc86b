import { randomUUID } from 'node:crypto';
import net from 'node:net';
import { sql } from 'drizzle-orm';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Database, insertMembership, insertOrganisation, insertProject, insertUser, schema, type Transaction } from '@masswright/drizzle';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';

let testDatabase: TestDatabase;
let database: Database;

interface Tenant {
  organisationId: string;
  userId: string;
  projectId: string;
}

async function createTenant(name: string): Promise<Tenant> {
  const tenant = { organisationId: randomUUID(), userId: randomUUID(), projectId: randomUUID() };
  const email = `${tenant.userId}@halyard.example`;
  await database.transaction({ ...tenant, email }, async (tx) => {
    await insertUser(tx, { id: tenant.userId, email, name, passwordHash: 'none' });
    await insertOrganisation(tx, { id: tenant.organisationId, name });
    await insertMembership(tx, { organisationId: tenant.organisationId, userId: tenant.userId, role: 'administrator' });
    await insertProject(tx, { id: tenant.projectId, organisationId: tenant.organisationId, name: `Project of ${name}`, createdBy: tenant.userId });
  });
  return tenant;
}

const projectNames = async (tx: Transaction) => (await tx.select({ name: schema.projects.name }).from(schema.projects)).map(({ name }) => name);

/** The SQLSTATE of whatever a promise rejects with. */
async function codeOf(promise: Promise<unknown>): Promise<string | undefined> {
  try {
    await promise;
    return undefined;
  } catch (error) {
    let at: unknown = error;
    while (at instanceof Error) {
      if ('code' in at && typeof at.code === 'string') return at.code;
      at = at.cause;
    }
    return 'no code';
  }
}

/** A way to PostgreSQL on which connections break at the very moment when `begin` is sent. */
async function startCuttingRelay(target: string) {
  const { hostname, port } = new URL(target);
  let begins = 0;
  const sockets = new Set<net.Socket>();
  const server = net.createServer((client) => {
    const upstream = net.connect(Number(port), hostname);
    for (const socket of [client, upstream]) {
      sockets.add(socket);
      socket.on('error', () => socket.destroy());
      socket.on('close', () => {
        client.destroy();
        upstream.destroy();
      });
    }
    client.on('data', (bytes) => {
      if (begins > 0 && bytes.includes('begin')) {
        begins -= 1;
        client.destroy();
      } else upstream.write(bytes);
    });
    upstream.pipe(client);
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const relayed = new URL(target);
  relayed.port = String((server.address() as net.AddressInfo).port);
  return {
    url: relayed.href,
    cutBegins: (count: number) => (begins = count),
    close: () => {
      server.close();
      for (const socket of sockets) socket.destroy();
    },
  };
}

let first: Tenant;
let second: Tenant;

beforeAll(async () => {
  testDatabase = await createTestDatabase();
  // One connection: whatever one transaction left on it, the next would find.
  database = new Database({ url: testDatabase.applicationUrl, poolSize: 1, applicationName: 'tenancy-test' });
  first = await createTenant('First');
  second = await createTenant('Second');
});
afterAll(async () => {
  await database.close();
  await testDatabase.drop();
});

describe('one transaction sees one organisation', () => {
  it('4,000 transactions of two organisations on one connection, errors in between, never see each other’s rows', async () => {
    const broken = new Error('deliberate');
    let wrong = 0;
    let thrown = 0;
    const one = async (turn: number) => {
      const [tenant, name] = turn % 2 === 0 ? ([first, 'Project of First'] as const) : ([second, 'Project of Second'] as const);
      const fails = turn % 7 === 0;
      try {
        await database.transaction({ organisationId: tenant.organisationId, userId: tenant.userId }, async (tx) => {
          const names = await projectNames(tx);
          if (names.length !== 1 || names[0] !== name) wrong += 1;
          if (turn % 21 === 0) await tx.execute(sql`select 1 / 0`);
          if (fails) throw broken;
        });
      } catch {
        thrown += 1;
      }
    };
    for (let turn = 0; turn < 4_000; turn += 20) {
      await Promise.all(Array.from({ length: 20 }, (_, index) => one(turn + index)));
    }
    expect(wrong).toBe(0);
    expect(thrown).toBe(Math.ceil(4_000 / 7));
  });

  it('without an organisation nothing is seen, also after a transaction that had one', async () => {
    await database.transaction(first, async (tx) => expect(await projectNames(tx)).toHaveLength(1));
    await database.transaction({}, async (tx) => {
      for (const table of [schema.projects, schema.parts, schema.organisations, schema.memberships, schema.users, schema.sessions, schema.invitations, schema.auditEvents, schema.outbox]) {
        expect(await tx.select().from(table)).toEqual([]);
      }
    });
  });

  it('a setting left over on the connection is overwritten by the next transaction', async () => {
    await database.transaction(first, async (tx) => {
      await tx.execute(sql`select set_config('masswright.organisation_id', ${first.organisationId}, false)`);
    });
    await database.transaction(second, async (tx) => expect(await projectNames(tx)).toEqual(['Project of Second']));
    await database.transaction({}, async (tx) => expect(await projectNames(tx)).toEqual([]));
    await database.transaction({}, async (tx) => {
      await tx.execute(sql`select set_config('masswright.organisation_id', '', false)`);
    });
  });
});

describe('what looks past row-level security still stops at the organisation', () => {
  it('a foreign key into another organisation is refused', async () => {
    const upload = { id: randomUUID(), projectId: second.projectId, fileName: 'a.stl', sizeBytes: 1, partSizeBytes: 1, objectKey: randomUUID(), multipartId: 'x' };
    const insert = database.transaction(first, async (tx) => {
      await tx.insert(schema.uploads).values({ ...upload, organisationId: first.organisationId, createdBy: first.userId });
    });
    expect(await codeOf(insert)).toBe('23503');
  });

  it('a row can’t be written into another organisation', async () => {
    const insert = database.transaction(first, (tx) =>
      insertProject(tx, { id: randomUUID(), organisationId: second.organisationId, name: 'Planted', createdBy: first.userId }),
    );
    expect(await codeOf(insert)).toBe('42501');
  });

  it('a unique value that another organisation has is free, and its being there can’t be told', async () => {
    await database.transaction(first, (tx) => insertProject(tx, { id: randomUUID(), organisationId: first.organisationId, name: 'Project of Second', createdBy: first.userId }));
    const again = database.transaction(first, (tx) => insertProject(tx, { id: randomUUID(), organisationId: first.organisationId, name: 'PROJECT OF SECOND', createdBy: first.userId }));
    expect(await codeOf(again)).toBe('23505');
    await database.transaction(first, async (tx) => {
      await expect(tx.update(schema.projects).set({ name: 'Taken over' }).where(sql`${schema.projects.id} = ${second.projectId}`).returning()).resolves.toEqual([]);
    });
    expect(await testDatabase.look('select name from projects where id = $1', [second.projectId])).toEqual([{ name: 'Project of Second' }]);
  });

  it('work for the outbox can’t be left in another organisation’s name, nor read without the relay’s scope', async () => {
    const leave = (organisationId: string | null) =>
      database.transaction(first, async (tx) => {
        await tx.insert(schema.outbox).values({ organisationId, job: 'mail.send', payload: {}, requestId: 'test' });
      });
    expect(await codeOf(leave(second.organisationId))).toBe('42501');
    expect(await codeOf(leave(first.organisationId))).toBeUndefined();
    await database.transaction(first, async (tx) => expect(await tx.select().from(schema.outbox)).toEqual([]));
    await database.transaction({ relay: true }, async (tx) => {
      expect(await tx.select().from(schema.outbox)).toHaveLength(1);
      expect(await tx.select().from(schema.projects)).toEqual([]);
    });
  });
});

describe('the transaction wrapper', () => {
  it('gives its connection back when begin fails, however often', async () => {
    const relay = await startCuttingRelay(testDatabase.applicationUrl);
    const cut = new Database({ url: relay.url, poolSize: 1, applicationName: 'cut-test', connectionTimeoutMs: 2_000 });
    try {
      for (let turn = 0; turn < 5; turn++) {
        // One begin is cut: it is made again on a fresh connection. Two in a row: the caller is told.
        relay.cutBegins(turn % 2 === 0 ? 1 : 2);
        const names = cut.transaction(first, projectNames);
        if (turn % 2 === 0) expect(await names).toContain('Project of First');
        else await expect(names).rejects.toMatchObject({ name: 'DatabaseUnavailableError' });
      }
      // With a pool of one, a connection that was never given back would keep this one waiting.
      expect(await cut.transaction(first, projectNames)).toContain('Project of First');
    } finally {
      await cut.close();
      relay.close();
    }
  });

  it('says that the database was lost when the connection dies inside, and rolls back', async () => {
    const id = randomUUID();
    const lost = database.transaction(first, async (tx) => {
      await insertProject(tx, { id, organisationId: first.organisationId, name: 'Lost', createdBy: first.userId });
      await testDatabase.look(`select pg_terminate_backend(pid) from pg_stat_activity where application_name = 'tenancy-test'`);
      await tx.execute(sql`select 1`);
    });
    await expect(lost).rejects.toMatchObject({ name: 'DatabaseUnavailableError' });
    expect(await testDatabase.look('select 1 from projects where id = $1', [id])).toEqual([]);
    await database.transaction(first, async (tx) => expect(await projectNames(tx)).toContain('Project of First'));
  });
});

describe('the catalogue', () => {
  interface TableRow extends pg.QueryResultRow {
    name: string;
    enabled: boolean;
    forced: boolean;
    owner: string;
    policies: number;
    has_organisation: boolean;
  }
  const privileges = ['SELECT', 'INSERT', 'UPDATE', 'DELETE', 'TRUNCATE', 'REFERENCES', 'TRIGGER'] as const;

  /** Written by hand: what the application may do with each table. `update` lists the columns. */
  const expected: Record<string, { may: (typeof privileges)[number][]; update: string[] }> = {
    attempts: { may: ['SELECT', 'INSERT', 'UPDATE', 'DELETE'], update: ['kind', 'key_hash', 'count', 'window_ends_at'] },
    audit_events: { may: ['SELECT', 'INSERT'], update: [] },
    invitations: { may: ['SELECT', 'INSERT'], update: ['accepted_at', 'withdrawn_at'] },
    materials: {
      may: ['SELECT', 'INSERT'],
      update: ['name', 'group_name', 'density_kg_m3', 'density_spread_kg_m3', 'spread_basis', 'source', 'version', 'archived_at', 'changed_at', 'changed_by'],
    },
    measurements: {
      may: ['SELECT', 'INSERT'],
      update: [
        ...['examined', 'closed', 'oriented', 'outward', 'turned', 'defensible', 'boundary_edges', 'non_manifold_edges', 'non_manifold_vertices', 'degenerate_facets', 'duplicate_facets', 'shells', 'cavities'],
        ...['self_intersections', 'findings', 'volume', 'volume_centre_from_origin', 'volume_second', 'volume_error_bound', 'listed_shells', 'openings', 'facet_doubt'],
      ],
    },
    measuring_runs: {
      may: ['SELECT', 'INSERT', 'DELETE'],
      update: ['state', 'stage', 'progress', 'fence', 'unended_take_ups', 'measurement_id', 'error_code', 'error_message', 'error_byte', 'error_line', 'started_at', 'finished_at'],
    },
    memberships: { may: ['SELECT', 'INSERT', 'DELETE'], update: ['role'] },
    organisations: { may: ['SELECT', 'INSERT'], update: [] },
    outbox: { may: ['SELECT', 'INSERT', 'DELETE'], update: ['due_at', 'handed_out', 'done_at'] },
    part_summaries: {
      may: ['SELECT', 'INSERT', 'UPDATE', 'DELETE'],
      update: [
        ...['part_id', 'organisation_id', 'project_id', 'number', 'name_key', 'file_key', 'material_key', 'search_text', 'state', 'deleted_at', 'changed_at'],
        ...['length_unit_m', 'size_m', 'volume_m3', 'mass_kg', 'moment_1_kg_m2', 'moment_2_kg_m2', 'moment_3_kg_m2'],
      ],
    },
    parts: { may: ['SELECT', 'INSERT', 'DELETE'], update: ['name', 'deleted_at', 'deleted_by'] },
    password_resets: { may: ['SELECT', 'INSERT'], update: ['used_at'] },
    projects: { may: ['SELECT', 'INSERT'], update: ['name', 'next_part_number'] },
    revisions: { may: ['SELECT', 'INSERT', 'DELETE'], update: [] },
    sessions: {
      may: ['SELECT', 'INSERT', 'UPDATE', 'DELETE'],
      update: ['id', 'token_hash', 'user_id', 'organisation_id', 'created_at', 'last_seen_at', 'idle_ends_at', 'absolute_ends_at'],
    },
    settings_change_items: { may: ['SELECT', 'INSERT', 'DELETE'], update: [] },
    settings_changes: { may: ['SELECT', 'INSERT'], update: [] },
    settings: {
      may: ['SELECT', 'INSERT', 'DELETE'],
      update: ['length_unit', 'unit_stated_at', 'unit_stated_by', 'density_kg_m3', 'density_spread_kg_m3', 'material_id', 'material_name', 'weighed_mass_kg', 'weighed_mass_uncertainty_kg', 'axis', 'drive_speed_rad_per_s', 'drive_time_s', 'as_made', 'shell_densities', 'version', 'changed_at', 'changed_by'],
    },
    uploads: { may: ['SELECT', 'INSERT'], update: ['state', 'sha256', 'stored_at'] },
    users: { may: ['SELECT', 'INSERT'], update: ['name', 'password_hash'] },
  };

  it('every table forces row-level security, has a policy, and belongs to the owner who never signs in', async () => {
    const tables = await testDatabase.look<TableRow>(`
      select c.relname as name, c.relrowsecurity as enabled, c.relforcerowsecurity as forced, c.relowner::regrole::text as owner,
             (select count(*)::int from pg_policy where polrelid = c.oid) as policies,
             exists (select 1 from pg_attribute where attrelid = c.oid and attname = 'organisation_id') as has_organisation
      from pg_class c where c.relkind in ('r', 'p') and c.relnamespace = 'public'::regnamespace order by 1`);
    expect(tables.map(({ name }) => name)).toEqual(Object.keys(expected).sort());
    for (const table of tables) {
      expect(table, table.name).toMatchObject({ enabled: true, forced: true, owner: 'masswright_owner' });
      expect(table.policies, table.name).toBeGreaterThan(0);
    }
    const roles = await testDatabase.look(
      `select rolname, rolcanlogin, rolbypassrls, rolsuper from pg_roles where rolname like 'masswright%' order by 1`,
    );
    expect(roles).toEqual([
      { rolname: 'masswright_app', rolcanlogin: true, rolbypassrls: false, rolsuper: false },
      { rolname: 'masswright_migration', rolcanlogin: true, rolbypassrls: true, rolsuper: false },
      { rolname: 'masswright_owner', rolcanlogin: false, rolbypassrls: false, rolsuper: false },
    ]);
  });

  it('the application has exactly the grants that are written down', async () => {
    const found: typeof expected = {};
    for (const name of Object.keys(expected)) {
      const may = await testDatabase.look<{ privilege: (typeof privileges)[number] }>(
        `select privilege from unnest($1::text[]) privilege where has_table_privilege('masswright_app', $2, privilege)`,
        [privileges, name],
      );
      const update = await testDatabase.look<{ attname: string }>(
        `select attname from pg_attribute where attrelid = $1::regclass and attnum > 0 and not attisdropped and has_column_privilege('masswright_app', attrelid, attnum, 'UPDATE') order by attnum`,
        [name],
      );
      found[name] = { may: may.map(({ privilege }) => privilege), update: update.map(({ attname }) => attname) };
    }
    const sorted = Object.fromEntries(Object.entries(expected).map(([name, { may, update }]) => [name, { may, update: [...update].sort() }]));
    expect(Object.fromEntries(Object.entries(found).map(([name, { may, update }]) => [name, { may, update: [...update].sort() }]))).toEqual(sorted);
  });

  it('every key between rows of organisations carries the organisation', async () => {
    const loose = await testDatabase.look<{ conname: string }>(`
      select conname from pg_constraint k
      where contype = 'f' and k.connamespace = 'public'::regnamespace
        and exists (select 1 from pg_attribute where attrelid = k.conrelid and attname = 'organisation_id')
        and exists (select 1 from pg_attribute where attrelid = k.confrelid and attname = 'organisation_id')
        and not exists (select 1 from pg_attribute where attrelid = k.conrelid and attname = 'organisation_id' and attnum = any(k.conkey))`);
    expect(loose).toEqual([]);
  });

  it('the application can’t become anybody else', async () => {
    const client = new pg.Client({ connectionString: testDatabase.applicationUrl });
    await client.connect();
    try {
      for (const role of ['masswright_owner', 'masswright_migration', 'postgres']) {
        expect(await codeOf(client.query(`set role ${role}`))).toBe('42501');
      }
      expect(await codeOf(client.query('alter table projects no force row level security'))).toBe('42501');
      expect(await codeOf(client.query('create table mine (a int)'))).toBe('42501');
    } finally {
      await client.end();
    }
  });
});
