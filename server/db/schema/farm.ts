import { sql } from 'drizzle-orm';
import { check, index, integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { id, instant, version } from './columns.ts';

/** The one farm of this database. Its settings by name live in `settings` as JSON. */
export const farms = sqliteTable(
  'farm',
  {
    id: integer('id').primaryKey(),
    name: text('name').notNull(),
    timeZone: text('time_zone').notNull(),
    currency: text('currency').notNull(),
    address: text('address').notNull().default(''),
    email: text('email').notNull().default(''),
    phone: text('phone').notNull().default(''),
    taxPercent: integer('tax_percent_hundredths').notNull().default(0),
    settings: text('settings', { mode: 'json' }).$type<Record<string, unknown>>().notNull().default({}),
    demo: integer('demo', { mode: 'boolean' }).notNull().default(false),
    createdAt: instant('created_at').notNull(),
    version: version(),
  },
  (table) => [check('farm_is_one', sql`${table.id} = 1`)],
);

/** Every change, written in the transaction that makes it. Rows are never edited (guarded by triggers). */
export const auditLog = sqliteTable(
  'audit_log',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    at: instant('at').notNull(),
    actorId: text('actor_id'),
    actorName: text('actor_name').notNull(),
    action: text('action').notNull(),
    entity: text('entity').notNull(),
    entityId: text('entity_id').notNull(),
    before: text('before', { mode: 'json' }).$type<unknown>(),
    after: text('after', { mode: 'json' }).$type<unknown>(),
  },
  (table) => [index('audit_log_entity').on(table.entity, table.entityId), index('audit_log_at').on(table.at)],
);

/** Answers already given to creating requests, so that a repeat gets the same one. */
export const idempotencyKeys = sqliteTable(
  'idempotency_key',
  {
    key: text('key').notNull(),
    callerId: text('caller_id').notNull(),
    route: text('route').notNull(),
    requestHash: text('request_hash').notNull(),
    status: integer('status').notNull(),
    answer: text('answer', { mode: 'json' }).$type<unknown>(),
    at: instant('at').notNull(),
  },
  (table) => [primaryKey({ columns: [table.callerId, table.key] }), index('idempotency_key_at').on(table.at)],
);

/** Mail to send, queued in the transaction that causes it and sent by a job. */
export const outboxMails = sqliteTable(
  'outbox_mail',
  {
    id: id(),
    template: text('template').notNull(),
    toAddress: text('to_address').notNull(),
    data: text('data', { mode: 'json' }).$type<Record<string, unknown>>().notNull(),
    createdAt: instant('created_at').notNull(),
    sentAt: instant('sent_at'),
    attempts: integer('attempts').notNull().default(0),
    nextAttemptAt: instant('next_attempt_at').notNull(),
    lastError: text('last_error'),
  },
  (table) => [index('outbox_mail_due').on(table.sentAt, table.nextAttemptAt)],
);
