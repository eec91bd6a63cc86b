import { existsSync } from 'node:fs';
import path from 'node:path';
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import pg from 'pg';
import { ownerRole } from './roles';

/** The built program has the SQL files beside it; run from the sources they are two folders up. */
function migrationsFolder(): string {
  const here = import.meta.dirname;
  const candidates = [here, path.join(here, '../../migrations')];
  const found = candidates.find((folder) => existsSync(path.join(folder, 'meta/_journal.json')));
  if (found === undefined) throw new Error(`No migrations found beside ${here}.`);
  return found;
}

/**
 * Brings the schema forward; there is no way back, a mistake is mended by a further migration. Two that start at once take turns
 * by an advisory lock. Tables are made as their owner.
 */
export async function migrateSchema(migrationUrl: string): Promise<void> {
  const client = new pg.Client({ connectionString: migrationUrl });
  await client.connect();
  try {
    await client.query(`select pg_advisory_lock(hashtext('masswright.migration'))`);
    await client.query(`set role ${ownerRole}`);
    await migrate(drizzle({ client }), { migrationsFolder: migrationsFolder() });
  } finally {
    await client.end();
  }
}
