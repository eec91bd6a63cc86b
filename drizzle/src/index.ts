export * as schema from './schema';
export * from './repositories';
export * from './tenancy/database';
export * from './tenancy/listener';
export * from './migration/migrate';
export * from './migration/roles';
