import pg from 'pg';

const quote = (name: string) => pg.escapeIdentifier(name);
const literal = (text: string) => pg.escapeLiteral(text);

function credentials(url: string): { role: string; password: string; database: string } {
  const parsed = new URL(url);
  return {
    role: decodeURIComponent(parsed.username),
    password: decodeURIComponent(parsed.password),
    database: decodeURIComponent(parsed.pathname.slice(1)),
  };
}

/** Owns every table and is never signed in as. */
export const ownerRole = 'masswright_owner';
export const applicationRole = 'masswright_app';
export const migrationRole = 'masswright_migration';

/**
 * Creates the three roles and the database where they are missing, and sets the passwords that the URLs carry. Needs a superuser.
 * FORCE ROW LEVEL SECURITY binds the owner too, so migration and backup have a role that may look past it, and the application has not.
 */
export async function createRolesAndDatabase(urls: { admin: string; migration: string; application: string }): Promise<void> {
  const migration = credentials(urls.migration);
  const application = credentials(urls.application);
  if (migration.role !== migrationRole || application.role !== applicationRole) {
    throw new Error(`DATABASE_MIGRATION_URL signs in as ${migrationRole} and DATABASE_URL as ${applicationRole}; these two names are fixed.`);
  }
  const client = new pg.Client({ connectionString: urls.admin });
  await client.connect();
  try {
    await client.query(`select pg_advisory_lock(hashtext('masswright.roles'))`);
    const has = async (query: string, name: string) => ((await client.query(query, [name])).rowCount ?? 0) > 0;
    const hasRole = (name: string) => has('select 1 from pg_roles where rolname = $1', name);
    if (!(await hasRole(ownerRole))) await client.query(`create role ${quote(ownerRole)} nologin nobypassrls`);
    for (const [login, rights] of [
      [migration, 'bypassrls'],
      [application, 'nobypassrls'],
    ] as const) {
      const verb = (await hasRole(login.role)) ? 'alter' : 'create';
      await client.query(`${verb} role ${quote(login.role)} login ${rights} nosuperuser nocreatedb nocreaterole password ${literal(login.password)}`);
    }
    await client.query(`grant ${quote(ownerRole)} to ${quote(migration.role)}`);
    if (!(await has('select 1 from pg_database where datname = $1', migration.database))) {
      await client.query(`create database ${quote(migration.database)} owner ${quote(ownerRole)}`);
    }
  } finally {
    await client.end();
  }
}
