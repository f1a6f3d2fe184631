import { sql } from 'drizzle-orm';
import { check, index, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { id, instant } from './columns.ts';
import { reservoirs } from './reservoirs.ts';
import { systems } from './water.ts';

/** Advice on dosing that a person answered, with all that it was based on. Never edited, but for being taken back. */
export const dosingAdvice = sqliteTable(
  'dosing_advice',
  {
    id: id(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    kind: text('kind').notNull(),
    rules: text('rules', { mode: 'json' }).$type<string[]>().notNull(),
    text: text('text').notNull(),
    inputs: text('inputs', { mode: 'json' }).$type<unknown>().notNull(),
    advice: text('advice', { mode: 'json' }).$type<unknown>().notNull(),
    outcome: text('outcome', { enum: ['accepted', 'changed', 'dismissed'] }).notNull(),
    /** Why it was dismissed, or changed. */
    reason: text('reason').notNull().default(''),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    takenBackAt: instant('taken_back_at'),
  },
  (table) => [index('dosing_advice_system').on(table.systemId, table.at)],
);

/** What the farm has decided to dose from an instant until the next plan. One runs in each system at a time. */
export const dosingPlans = sqliteTable(
  'dosing_plan',
  {
    id: id(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    adviceId: text('advice_id')
      .notNull()
      .references(() => dosingAdvice.id),
    fromAt: instant('from_at').notNull(),
    toAt: instant('to_at'),
    /** Strength to mix, once acetate is used up, and how it is made. */
    strengthMeqL: real('strength_meq_l').notNull(),
    limeGPerL: real('lime_g_per_l').notNull(),
    vinegarMlPerL: real('vinegar_ml_per_l').notNull(),
    litresPerDay: real('litres_per_day').notNull(),
    supplements: text('supplements', { mode: 'json' }).$type<{ itemId: string; amountPerDay: number }[]>().notNull(),
    by: text('by').notNull(),
  },
  (table) => [
    index('dosing_plan_system').on(table.systemId, table.fromAt),
    index('dosing_plan_advice').on(table.adviceId),
    uniqueIndex('dosing_plan_running')
      .on(table.systemId)
      .where(sql`${table.toAt} IS NULL`),
    check(
      'dosing_plan_amounts',
      sql`${table.strengthMeqL} >= 0 AND ${table.limeGPerL} >= 0 AND ${table.vinegarMlPerL} >= 0 AND ${table.litresPerDay} >= 0`,
    ),
    check('dosing_plan_span', sql`${table.toAt} IS NULL OR ${table.toAt} >= ${table.fromAt}`),
  ],
);

/**
 * Limewater that ran into a system all at once. Its litres are two levels of the reservoir, `beforeEventId` and
 * `eventId`; where those are taken back, the overfill is too.
 */
export const overfills = sqliteTable(
  'overfill',
  {
    id: id(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    reservoirId: text('reservoir_id')
      .notNull()
      .references(() => reservoirs.id),
    beforeEventId: text('before_event_id'),
    eventId: text('event_id').notNull(),
    litres: real('litres').notNull(),
    alkalinityMeqL: real('alkalinity_meq_l').notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    note: text('note').notNull().default(''),
  },
  (table) => [
    index('overfill_system').on(table.systemId, table.at),
    index('overfill_reservoir').on(table.reservoirId),
    check('overfill_litres', sql`${table.litres} > 0 AND ${table.alkalinityMeqL} >= 0`),
  ],
);
