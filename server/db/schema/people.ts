import { sql } from 'drizzle-orm';
import { check, index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { ROLES } from '../../../shared/permissions.ts';
import { id, instant, version } from './columns.ts';
import { stores } from './orders.ts';

export const users = sqliteTable(
  'user',
  {
    id: id(),
    email: text('email').notNull().unique(),
    name: text('name').notNull(),
    role: text('role', { enum: ROLES }).notNull(),
    storeId: text('store_id').references(() => stores.id),
    passwordHash: text('password_hash').notNull(),
    demo: integer('demo', { mode: 'boolean' }).notNull().default(false),
    createdAt: instant('created_at').notNull(),
    disabledAt: instant('disabled_at'),
    version: version(),
  },
  (table) => [check('user_buyer_has_store', sql`(${table.role} = 'buyer') = (${table.storeId} IS NOT NULL)`)],
);

/** Server-side sessions; the cookie holds only the signed session id. */
export const sessions = sqliteTable(
  'session',
  {
    sid: text('sid').primaryKey(),
    userId: text('user_id').references(() => users.id),
    data: text('data', { mode: 'json' }).$type<Record<string, unknown>>().notNull(),
    createdAt: instant('created_at').notNull(),
    expiresAt: instant('expires_at').notNull(),
  },
  (table) => [index('session_user').on(table.userId), index('session_expires').on(table.expiresAt)],
);

/** Single-use links by e-mail: invitations and password resets. Only the token's hash is kept. */
export const mailedTokens = sqliteTable(
  'mailed_token',
  {
    id: id(),
    kind: text('kind', { enum: ['invitation', 'password_reset'] }).notNull(),
    tokenHash: text('token_hash').notNull().unique(),
    email: text('email').notNull(),
    userId: text('user_id').references(() => users.id),
    role: text('role', { enum: ROLES }),
    storeId: text('store_id').references(() => stores.id),
    createdAt: instant('created_at').notNull(),
    createdBy: text('created_by'),
    expiresAt: instant('expires_at').notNull(),
    usedAt: instant('used_at'),
  },
  (table) => [index('mailed_token_email').on(table.email)],
);

/** Failed sign-ins by account and by address, for slow-down. */
export const signInFailures = sqliteTable(
  'sign_in_failure',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    subject: text('subject').notNull(),
    at: instant('at').notNull(),
  },
  (table) => [index('sign_in_failure_subject').on(table.subject, table.at)],
);
