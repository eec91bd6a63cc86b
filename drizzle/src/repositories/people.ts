import { sql } from 'drizzle-orm';
import { and, asc, count, eq, gt, isNull, or } from 'drizzle-orm';
import type { Role } from '@masswright/contracts';
import { invitations, memberships, organisations, passwordResets, users } from '../schema';
import type { Transaction } from '../tenancy/database';

export interface User {
  id: string;
  email: string;
  name: string;
  passwordHash: string;
}

export async function findUserByEmail(tx: Transaction, email: string): Promise<User | undefined> {
  const rows = await tx.select().from(users).where(eq(users.email, email));
  return rows[0];
}

export async function findUser(tx: Transaction, userId: string): Promise<User | undefined> {
  const rows = await tx.select().from(users).where(eq(users.id, userId));
  return rows[0];
}

export async function insertUser(tx: Transaction, user: User): Promise<void> {
  await tx.insert(users).values(user);
}

export async function setPasswordHash(tx: Transaction, userId: string, passwordHash: string): Promise<void> {
  await tx.update(users).set({ passwordHash }).where(eq(users.id, userId));
}

export async function insertOrganisation(tx: Transaction, organisation: { id: string; name: string }): Promise<void> {
  await tx.insert(organisations).values(organisation);
}

export interface Membership {
  organisationId: string;
  organisationName: string;
  role: Role;
}

/** The organisations that a person is in, by name. Needs the person's scope. */
export async function listMemberships(tx: Transaction, userId: string): Promise<Membership[]> {
  return tx
    .select({ organisationId: memberships.organisationId, organisationName: organisations.name, role: memberships.role })
    .from(memberships)
    .innerJoin(organisations, eq(organisations.id, memberships.organisationId))
    .where(eq(memberships.userId, userId))
    .orderBy(asc(sql`lower(${organisations.name})`), asc(memberships.organisationId));
}

export async function insertMembership(tx: Transaction, membership: { organisationId: string; userId: string; role: Role }): Promise<void> {
  await tx.insert(memberships).values(membership);
}

export interface MemberRow {
  userId: string;
  name: string;
  email: string;
  role: Role;
  createdAt: Date;
}

const memberColumns = {
  userId: memberships.userId,
  name: users.name,
  email: users.email,
  role: memberships.role,
  createdAt: memberships.createdAt,
};

/** A page of an organisation's people by e-mail address. */
export async function listMembers(tx: Transaction, page: { afterEmail: string | undefined; limit: number }): Promise<MemberRow[]> {
  return tx
    .select(memberColumns)
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(
      and(
        sql`${memberships.organisationId} = current_organisation_id()`,
        page.afterEmail === undefined ? undefined : gt(users.email, page.afterEmail),
      ),
    )
    .orderBy(asc(users.email))
    .limit(page.limit);
}

export async function findMember(tx: Transaction, organisationId: string, userId: string): Promise<MemberRow | undefined> {
  const rows = await tx
    .select(memberColumns)
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(and(eq(memberships.organisationId, organisationId), eq(memberships.userId, userId)));
  return rows[0];
}

/** Holds every administrator's row until the transaction ends, so that two who remove each other can't both succeed. Gives how many there are. */
export async function lockAdministrators(tx: Transaction, organisationId: string): Promise<number> {
  const rows = await tx
    .select({ userId: memberships.userId })
    .from(memberships)
    .where(and(eq(memberships.organisationId, organisationId), eq(memberships.role, 'administrator')))
    .orderBy(asc(memberships.userId))
    .for('update');
  return rows.length;
}

export async function countAdministrators(tx: Transaction, organisationId: string): Promise<number> {
  const rows = await tx
    .select({ administrators: count() })
    .from(memberships)
    .where(and(eq(memberships.organisationId, organisationId), eq(memberships.role, 'administrator')));
  return rows[0]?.administrators ?? 0;
}

export async function setRole(tx: Transaction, organisationId: string, userId: string, role: Role): Promise<void> {
  await tx
    .update(memberships)
    .set({ role })
    .where(and(eq(memberships.organisationId, organisationId), eq(memberships.userId, userId)));
}

/** Removes a person from an organisation; their sessions in it go with the row. */
export async function deleteMembership(tx: Transaction, organisationId: string, userId: string): Promise<void> {
  await tx.delete(memberships).where(and(eq(memberships.organisationId, organisationId), eq(memberships.userId, userId)));
}

export interface InvitationRow {
  id: string;
  organisationId: string;
  email: string;
  role: Role;
  invitedByName: string;
  createdAt: Date;
  expiresAt: Date;
}

export async function insertInvitation(
  tx: Transaction,
  invitation: { id: string; organisationId: string; email: string; role: Role; tokenHash: Buffer; invitedBy: string; expiresAt: Date },
): Promise<void> {
  await tx.insert(invitations).values(invitation);
}

const isOpen = and(isNull(invitations.acceptedAt), isNull(invitations.withdrawnAt));
const invitationColumns = {
  id: invitations.id,
  organisationId: invitations.organisationId,
  email: invitations.email,
  role: invitations.role,
  invitedByName: sql<string>`coalesce(${users.name}, '')`,
  createdAt: invitations.createdAt,
  expiresAt: invitations.expiresAt,
};

/** A page of an organisation's open invitations by e-mail address, expired ones among them. */
export async function listInvitations(
  tx: Transaction,
  page: { after: { email: string; id: string } | undefined; limit: number },
): Promise<InvitationRow[]> {
  return tx
    .select(invitationColumns)
    .from(invitations)
    .leftJoin(users, eq(users.id, invitations.invitedBy))
    .where(
      and(
        isOpen,
        page.after === undefined
          ? undefined
          : or(gt(invitations.email, page.after.email), and(eq(invitations.email, page.after.email), gt(invitations.id, page.after.id))),
      ),
    )
    .orderBy(asc(invitations.email), asc(invitations.id))
    .limit(page.limit);
}

export async function findOpenInvitation(tx: Transaction, invitationId: string): Promise<InvitationRow | undefined> {
  const rows = await tx
    .select(invitationColumns)
    .from(invitations)
    .leftJoin(users, eq(users.id, invitations.invitedBy))
    .where(and(eq(invitations.id, invitationId), isOpen));
  return rows[0];
}

/** The invitation whose link this is, if it still stands. Needs the scope of the link's token. */
export async function findInvitationByToken(tx: Transaction, tokenHash: Buffer): Promise<Omit<InvitationRow, 'invitedByName'> | undefined> {
  const rows = await tx
    .select({
      id: invitations.id,
      organisationId: invitations.organisationId,
      email: invitations.email,
      role: invitations.role,
      createdAt: invitations.createdAt,
      expiresAt: invitations.expiresAt,
    })
    .from(invitations)
    .where(and(eq(invitations.tokenHash, tokenHash), isOpen, gt(invitations.expiresAt, sql`now()`)));
  return rows[0];
}

/** Marks an open invitation accepted; false when another request was first. */
export async function markInvitationAccepted(tx: Transaction, invitationId: string): Promise<boolean> {
  const rows = await tx
    .update(invitations)
    .set({ acceptedAt: sql`now()` })
    .where(and(eq(invitations.id, invitationId), isOpen, gt(invitations.expiresAt, sql`now()`)))
    .returning({ id: invitations.id });
  return rows.length > 0;
}

/** Withdraws open invitations: to an address, by a person, or one by id. Gives the ids withdrawn. */
export async function withdrawInvitations(tx: Transaction, which: { email: string } | { invitedBy: string } | { id: string }): Promise<string[]> {
  const chosen = 'email' in which ? eq(invitations.email, which.email) : 'invitedBy' in which ? eq(invitations.invitedBy, which.invitedBy) : eq(invitations.id, which.id);
  const rows = await tx
    .update(invitations)
    .set({ withdrawnAt: sql`now()` })
    .where(and(isOpen, chosen))
    .returning({ id: invitations.id });
  return rows.map((row) => row.id);
}

/** The name of the organisation of the scope. */
export async function findOrganisationName(tx: Transaction, organisationId: string): Promise<string | undefined> {
  const rows = await tx.select({ name: organisations.name }).from(organisations).where(eq(organisations.id, organisationId));
  return rows[0]?.name;
}

/** Keeps a reset; false when it was there already. */
export async function insertPasswordReset(
  tx: Transaction,
  reset: { id: string; userId: string; tokenHash: Buffer; expiresAt: Date },
): Promise<boolean> {
  const rows = await tx.insert(passwordResets).values(reset).onConflictDoNothing({ target: passwordResets.id }).returning({ id: passwordResets.id });
  return rows.length > 0;
}

export async function findPasswordReset(tx: Transaction, resetId: string): Promise<{ id: string; userId: string; expiresAt: Date } | undefined> {
  const rows = await tx
    .select({ id: passwordResets.id, userId: passwordResets.userId, expiresAt: passwordResets.expiresAt })
    .from(passwordResets)
    .where(and(eq(passwordResets.id, resetId), isNull(passwordResets.usedAt)));
  return rows[0];
}

/** Needs the scope of the link's token. */
export async function findPasswordResetByToken(tx: Transaction, tokenHash: Buffer): Promise<{ id: string; userId: string } | undefined> {
  const rows = await tx
    .select({ id: passwordResets.id, userId: passwordResets.userId })
    .from(passwordResets)
    .where(and(eq(passwordResets.tokenHash, tokenHash), isNull(passwordResets.usedAt), gt(passwordResets.expiresAt, sql`now()`)));
  return rows[0];
}

/** Uses up a reset and with it every other open one of the person; false when another request was first. */
export async function usePasswordReset(tx: Transaction, reset: { id: string; userId: string }): Promise<boolean> {
  const rows = await tx
    .update(passwordResets)
    .set({ usedAt: sql`now()` })
    .where(and(eq(passwordResets.userId, reset.userId), isNull(passwordResets.usedAt)))
    .returning({ id: passwordResets.id });
  return rows.some((row) => row.id === reset.id);
}
