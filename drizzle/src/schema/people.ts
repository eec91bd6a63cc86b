import { sql } from 'drizzle-orm';
import { check, foreignKey, index, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import type { Role } from '@masswright/contracts';
import { at, bytea, createdAt, ofOrganisation, primaryId } from './columns';

export const organisations = pgTable('organisations', {
  id: primaryId(),
  name: text('name').notNull(),
  createdAt: createdAt(),
});

export const users = pgTable(
  'users',
  {
    id: primaryId(),
    email: text('email').notNull(),
    name: text('name').notNull(),
    passwordHash: text('password_hash').notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    uniqueIndex('users_email_key').on(table.email),
    check('users_email_is_lower_case', sql`${table.email} = lower(${table.email})`),
  ],
);

export const memberships = pgTable(
  'memberships',
  {
    organisationId: ofOrganisation().references(() => organisations.id),
    userId: uuid('user_id').notNull().references(() => users.id),
    role: text('role').$type<Role>().notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.userId] }),
    index('memberships_user_id_index').on(table.userId),
    check('memberships_role_is_known', sql`${table.role} in ('administrator', 'engineer', 'reviewer', 'reader')`),
  ],
);

/** Signed-in browsers. The token itself is only in the cookie; removing a membership removes its sessions with it. */
export const sessions = pgTable(
  'sessions',
  {
    id: primaryId(),
    tokenHash: bytea('token_hash').notNull(),
    userId: uuid('user_id').notNull(),
    organisationId: ofOrganisation(),
    createdAt: createdAt(),
    lastSeenAt: at('last_seen_at').notNull().defaultNow(),
    idleEndsAt: at('idle_ends_at').notNull(),
    absoluteEndsAt: at('absolute_ends_at').notNull(),
  },
  (table) => [
    uniqueIndex('sessions_token_hash_key').on(table.tokenHash),
    index('sessions_membership_index').on(table.organisationId, table.userId),
    index('sessions_user_id_index').on(table.userId),
    foreignKey({
      name: 'sessions_membership_fkey',
      columns: [table.organisationId, table.userId],
      foreignColumns: [memberships.organisationId, memberships.userId],
    }).onDelete('cascade'),
  ],
);

export const invitations = pgTable(
  'invitations',
  {
    id: primaryId(),
    organisationId: ofOrganisation().references(() => organisations.id),
    email: text('email').notNull(),
    role: text('role').$type<Role>().notNull(),
    tokenHash: bytea('token_hash').notNull(),
    invitedBy: uuid('invited_by').notNull().references(() => users.id),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
    acceptedAt: at('accepted_at'),
    withdrawnAt: at('withdrawn_at'),
  },
  (table) => [
    uniqueIndex('invitations_token_hash_key').on(table.tokenHash),
    uniqueIndex('invitations_open_email_key')
      .on(table.organisationId, table.email)
      .where(sql`accepted_at is null and withdrawn_at is null`),
    check('invitations_role_is_known', sql`${table.role} in ('administrator', 'engineer', 'reviewer', 'reader')`),
  ],
);

export const passwordResets = pgTable(
  'password_resets',
  {
    id: primaryId(),
    userId: uuid('user_id').notNull().references(() => users.id),
    tokenHash: bytea('token_hash').notNull(),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
    usedAt: at('used_at'),
  },
  (table) => [
    uniqueIndex('password_resets_token_hash_key').on(table.tokenHash),
    index('password_resets_user_id_index').on(table.userId),
  ],
);
