import { sql } from 'drizzle-orm';
import { and, eq, inArray } from 'drizzle-orm';
import type { PartFilter } from '@masswright/contracts';
import { parts, partSummaries } from '../schema';
import type { Transaction } from '../tenancy/database';
import { matchesText, readStates } from './part-list';

/** The ids of a project's parts that a filter leaves but some, by number; one more than `limit` says that there are more. */
export async function findFilteredPartIds(
  tx: Transaction,
  projectId: string,
  { filter, except, limit }: { filter: PartFilter; except: readonly string[]; limit: number },
): Promise<string[]> {
  const rows = await tx
    .select({ partId: partSummaries.partId })
    .from(partSummaries)
    .where(
      and(
        matchesText(projectId, filter),
        sql`${partSummaries.state} = any(${sql.param([...readStates(filter)])}::text[])`,
        except.length === 0 ? undefined : sql`${partSummaries.partId} <> all(${sql.param([...except])}::uuid[])`,
      ),
    )
    .orderBy(partSummaries.number)
    .limit(limit + 1);
  return rows.map(({ partId }) => partId);
}

export interface HeldPart {
  id: string;
  projectId: string;
  number: number;
  name: string;
  deletedAt: Date | null;
}

/**
 * Holds parts for the rest of the transaction, so that whoever changes one of them at the same time comes before or after; those that are gone are left
 * out. Everybody takes them in the order of their ids, so that two who want the same ones wait and don't block each other.
 */
export async function holdParts(tx: Transaction, partIds: readonly string[]): Promise<HeldPart[]> {
  if (partIds.length === 0) return [];
  return tx
    .select({ id: parts.id, projectId: parts.projectId, number: parts.number, name: parts.name, deletedAt: parts.deletedAt })
    .from(parts)
    .where(sql`${parts.id} = any(${sql.param([...partIds])}::uuid[])`)
    .orderBy(parts.id)
    .for('no key update');
}

/** The parts of a project among some ids, deleted or not. */
export async function findPartIdsOfProject(tx: Transaction, projectId: string, partIds: readonly string[]): Promise<string[]> {
  const rows = await tx.select({ id: parts.id }).from(parts).where(and(eq(parts.projectId, projectId), inArray(parts.id, [...partIds])));
  return rows.map(({ id }) => id);
}
