import { randomUUID } from 'node:crypto';
import pg from 'pg';
import { environment } from './environment';

export interface TestDatabase {
  /** Signs in as the application, which the policies bind. */
  applicationUrl: string;
  /** Signs in as migration and backup, which sees every row. */
  migrationUrl: string;
  adminUrl: string;
  name: string;
  /** Runs SQL past the policies, to look at what really is there. */
  look: <Row extends pg.QueryResultRow>(sql: string, values?: unknown[]) => Promise<Row[]>;
  drop: () => Promise<void>;
}

function inDatabase(url: string, name: string): string {
  const changed = new URL(url);
  changed.pathname = `/${name}`;
  return changed.href;
}

async function asAdmin(sql: string): Promise<void> {
  const client = new pg.Client({ connectionString: environment.adminUrl });
  await client.connect();
  try {
    await client.query(sql);
  } finally {
    await client.end();
  }
}

/** A database of this test file's own, cloned from the migrated template. */
export async function createTestDatabase(): Promise<TestDatabase> {
  const name = `test_${randomUUID().replaceAll('-', '')}`;
  await asAdmin(`create database ${name} template ${environment.template}`);
  const adminUrl = inDatabase(environment.adminUrl, name);
  const pool = new pg.Pool({ connectionString: adminUrl, max: 2 });
  pool.on('error', () => undefined);
  return {
    name,
    migrationUrl: inDatabase(environment.migrationUrl, name),
    applicationUrl: inDatabase(environment.applicationUrl, name),
    adminUrl,
    look: async <Row extends pg.QueryResultRow>(sql: string, values: unknown[] = []) => (await pool.query<Row>(sql, values)).rows,
    drop: async () => {
      await pool.end();
      await asAdmin(`drop database if exists ${name} with (force)`);
    },
  };
}
