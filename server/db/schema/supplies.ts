import { sql } from 'drizzle-orm';
import { check, index, integer, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { ITEM_KINDS, ITEM_UNITS, USE_CAUSES } from '../../../shared/domain/supply-items.ts';
import { day, id, instant, version } from './columns.ts';
import { systems } from './water.ts';

export const suppliers = sqliteTable('supplier', {
  id: id(),
  name: text('name').notNull().unique(),
  email: text('email').notNull().default(''),
  createdAt: instant('created_at').notNull(),
  version: version(),
});

/** Something the farm uses up. `unit` is canonical: g, mL or piece. */
export const items = sqliteTable(
  'item',
  {
    id: id(),
    code: text('code').notNull().unique(),
    name: text('name').notNull(),
    kind: text('kind', { enum: ITEM_KINDS }).notNull(),
    unit: text('unit', { enum: ITEM_UNITS }).notNull(),
    packSize: real('pack_size').notNull(),
    leadTimeDays: integer('lead_time_days').notNull(),
    safetyDays: integer('safety_days').notNull(),
    supplierId: text('supplier_id').references(() => suppliers.id),
    /** Lime: part that is calcium hydroxide. Vinegar: acid, % w/v. Supplement: alkalinity, meq per unit. */
    strength: real('strength'),
    /** What one unit of a supplement brings beside alkalinity, mg. */
    calciumMg: real('calcium_mg'),
    magnesiumMg: real('magnesium_mg'),
    createdAt: instant('created_at').notNull(),
    retiredAt: instant('retired_at'),
    version: version(),
  },
  (table) => [
    check('item_pack', sql`${table.packSize} > 0 AND ${table.leadTimeDays} >= 0 AND ${table.safetyDays} >= 0`),
  ],
);

/** One receipt of an item. `remaining` is what consumption has left of it. */
export const lots = sqliteTable(
  'lot',
  {
    id: id(),
    itemId: text('item_id')
      .notNull()
      .references(() => items.id),
    code: text('code').notNull(),
    receivedOn: day('received_on').notNull(),
    expiresOn: day('expires_on'),
    quantity: real('quantity').notNull(),
    remaining: real('remaining').notNull(),
    costMinor: integer('cost_minor').notNull(),
    /** Cost not yet taken by consumption, in micro-units of the currency's major unit. */
    remainingMicro: integer('remaining_micro').notNull(),
    receivedBy: text('received_by').notNull(),
    createdAt: instant('created_at').notNull(),
  },
  (table) => [
    index('lot_item').on(table.itemId, table.receivedOn),
    check(
      'lot_remaining',
      sql`${table.remaining} >= 0 AND ${table.remaining} <= ${table.quantity} AND ${table.remainingMicro} >= 0`,
    ),
  ],
);

/** An amount taken from a lot, always tied to its cause; `systemId` where the cause stands in one system. */
export const consumptions = sqliteTable(
  'consumption',
  {
    id: id(),
    itemId: text('item_id')
      .notNull()
      .references(() => items.id),
    lotId: text('lot_id')
      .notNull()
      .references(() => lots.id),
    quantity: real('quantity').notNull(),
    costMicro: integer('cost_micro').notNull(),
    cause: text('cause', { enum: USE_CAUSES }).notNull(),
    causeId: text('cause_id').notNull(),
    systemId: text('system_id').references(() => systems.id),
    at: instant('at').notNull(),
    by: text('by').notNull(),
  },
  (table) => [
    index('consumption_item').on(table.itemId, table.at),
    index('consumption_cause').on(table.cause, table.causeId),
    index('consumption_system').on(table.systemId, table.at),
    check('consumption_quantity', sql`${table.quantity} > 0 AND ${table.costMicro} >= 0`),
  ],
);

/** What a person counted of an item, what the books said then, and why they differ. */
export const supplyCounts = sqliteTable(
  'supply_count',
  {
    id: id(),
    itemId: text('item_id')
      .notNull()
      .references(() => items.id),
    counted: real('counted').notNull(),
    expected: real('expected').notNull(),
    reason: text('reason').notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
  },
  (table) => [
    index('supply_count_item').on(table.itemId, table.at),
    check('supply_count_amounts', sql`${table.counted} >= 0 AND ${table.expected} >= 0`),
  ],
);
