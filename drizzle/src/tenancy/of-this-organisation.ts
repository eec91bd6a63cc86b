import { sql, type SQL } from 'drizzle-orm';
import type { PgColumn } from 'drizzle-orm/pg-core';

/**
 * Says in a query what its policies say anyway. Needed for speed, not for safety, on tables that the relay reads across organisations: there two policies
 * are joined by "or", from which no index follows; from this test one does.
 */
export function isOfThisOrganisation(table: { organisationId: PgColumn }): SQL {
  return sql`${table.organisationId} = (select current_organisation_id())`;
}
