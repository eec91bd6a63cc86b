import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Database, DatabaseUnavailableError, insertMembership, insertOrganisation, insertProject, insertUser, schema } from '@masswright/drizzle';
import { startStack, type Stack } from './stack';

let stack: Stack;
let database: Database;

beforeAll(async () => {
  stack = await startStack();
  database = new Database({ url: stack.databaseUrl, poolSize: 4, applicationName: 'restart-test', connectionTimeoutMs: 1_000 });
});
afterAll(async () => {
  await database.close();
  await stack.stop();
});

describe('PostgreSQL restarted under load', () => {
  it.each(['SIGKILL', 'SIGINT'] as const)('by %s: no transaction sees another organisation, none hangs, and the pool is whole afterwards', async (signal) => {
    const tenants = await Promise.all(
      Array.from({ length: 4 }, async (_, index) => {
        const tenant = { organisationId: randomUUID(), userId: randomUUID(), name: `Tenant ${index}` };
        await database.transaction({ ...tenant, email: `${tenant.userId}@halyard.example` }, async (tx) => {
          await insertUser(tx, { id: tenant.userId, email: `${tenant.userId}@halyard.example`, name: 'N', passwordHash: 'none' });
          await insertOrganisation(tx, { id: tenant.organisationId, name: tenant.name });
          await insertMembership(tx, { organisationId: tenant.organisationId, userId: tenant.userId, role: 'engineer' });
          await insertProject(tx, { id: randomUUID(), organisationId: tenant.organisationId, name: tenant.name, createdBy: tenant.userId });
        });
        return tenant;
      }),
    );
    const seen = { right: 0, wrong: 0, lost: 0, other: [] as unknown[] };
    const end = Date.now() + 6_000;
    const load = tenants.flatMap((tenant) => [tenant, tenant, tenant]).map(async (tenant) => {
      while (Date.now() < end) {
        try {
          const rows = await database.transaction(tenant, (tx) => tx.select({ name: schema.projects.name }).from(schema.projects));
          if (rows.length === 1 && rows[0]?.name === tenant.name) seen.right += 1;
          else seen.wrong += 1;
        } catch (error) {
          if (error instanceof DatabaseUnavailableError) seen.lost += 1;
          else seen.other.push(error);
          await new Promise((resolve) => setTimeout(resolve, 20));
        }
      }
    });
    await new Promise((resolve) => setTimeout(resolve, 1_500));
    stack.postgres.kill(signal);
    await Promise.all(load);
    expect(seen.wrong).toBe(0);
    expect(seen.other).toEqual([]);
    expect(seen.lost).toBeGreaterThan(0);
    expect(seen.right).toBeGreaterThan(100);
    // Each of the pool's connections works: as many transactions at once as it has.
    const together = await Promise.all(tenants.map((tenant) => database.transaction(tenant, (tx) => tx.select().from(schema.projects))));
    expect(together.map((rows) => rows.length)).toEqual([1, 1, 1, 1]);
  });
});
