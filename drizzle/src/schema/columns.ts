import { customType, timestamp, uuid } from 'drizzle-orm/pg-core';

/** Raw bytes. */
export const bytea = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => 'bytea' });

export const at = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' });
export const createdAt = () => at('created_at').notNull().defaultNow();
export const primaryId = () => uuid('id').primaryKey().defaultRandom();
/** Every row of an organisation carries its id; keys between such rows are composite with it. */
export const ofOrganisation = () => uuid('organisation_id').notNull();
