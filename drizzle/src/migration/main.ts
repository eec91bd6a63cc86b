import { parseMigrationEnvironment, readEnvironmentOrExit } from '@masswright/config';
import { migrateSchema } from './migrate';
import { createRolesAndDatabase } from './roles';

const environment = readEnvironmentOrExit(parseMigrationEnvironment);
if (environment.DATABASE_ADMIN_URL !== undefined) {
  await createRolesAndDatabase({
    admin: environment.DATABASE_ADMIN_URL,
    migration: environment.DATABASE_MIGRATION_URL,
    application: environment.DATABASE_URL,
  });
}
await migrateSchema(environment.DATABASE_MIGRATION_URL);
