import { z } from 'zod';
import { itemProblems, ITEM_KINDS, ITEM_UNITS, SUPPLY_STATES, USE_CAUSES } from '../domain/supply-items.ts';
import {
  calendarDay,
  done,
  id,
  idParams,
  instant,
  labelCode,
  listQuery,
  minorAmount,
  pageOf,
  price,
  shortText,
  version,
} from './common.ts';
import type { Endpoint } from './endpoint.ts';

const quantity = z.number().min(0, 'Enter zero or more.').max(100_000_000, 'At most 100,000,000.');
const amount = quantity.refine((value) => value > 0, 'Enter more than zero.');
const days = z.int('Enter whole days.').min(0, 'Enter zero or more days.').max(365, 'At most 365 days.');
/** Nullable in answers, optional in what is sent. */
const strength = z.number().max(1000).nullable();
const milligrams = z.number().max(1000, 'At most 1,000 mg.').nullable();

/** How fast an item goes, and what that was made from. Amounts in the item's unit. */
export const SupplyUse = z.object({
  /** Null: not enough is known yet. */
  perDay: z.number().nullable(),
  sdPerDay: z.number(),
  basis: z.enum(['limewater', 'consumption', 'none']),
  windowDays: z.int(),
  /** What left the lots in the window, and in how many takes. */
  taken: z.number(),
  takes: z.int(),
  /** Limewater that each system takes and how much of this item is in a litre of it. */
  systems: z.array(
    z.object({
      systemCode: z.string(),
      litresPerDay: z.number(),
      perLitre: z.number(),
      perDay: z.number(),
    }),
  ),
  /** Lime only: powder that would bring all the alkalinity that the corals take; null where their demand is not known. */
  demandPerDay: z.number().nullable(),
});
export type SupplyUse = z.infer<typeof SupplyUse>;

export const SupplyAdvice = z.object({
  daysLeft: z.number().nullable(),
  outDay: calendarDay.nullable(),
  orderByDay: calendarDay.nullable(),
  orderPacks: z.int(),
  orderQuantity: z.number(),
  reorderPoint: z.number(),
});

export const Item = z.object({
  id,
  code: z.string(),
  name: z.string(),
  kind: z.enum(ITEM_KINDS),
  unit: z.enum(ITEM_UNITS),
  packSize: z.number(),
  leadTimeDays: z.int(),
  safetyDays: z.int(),
  supplierId: id.nullable(),
  supplierName: z.string().nullable(),
  strength,
  /** What one unit of a supplement brings beside alkalinity, mg. */
  calciumMg: milligrams,
  magnesiumMg: milligrams,
  retired: z.boolean(),
  version,
  onHand: z.number(),
  onHandMicro: z.int(),
  /** First day on which something of it on hand expires. */
  nextExpiry: calendarDay.nullable(),
  state: z.enum(SUPPLY_STATES),
  advice: SupplyAdvice,
  use: SupplyUse,
});
export type Item = z.infer<typeof Item>;

export const Lot = z.object({
  id,
  itemId: id,
  itemCode: z.string(),
  itemName: z.string(),
  unit: z.enum(ITEM_UNITS),
  code: z.string(),
  receivedOn: calendarDay,
  expiresOn: calendarDay.nullable(),
  quantity: z.number(),
  remaining: z.number(),
  costMinor: minorAmount,
  remainingMicro: z.int(),
  receivedBy: z.string(),
});
export type Lot = z.infer<typeof Lot>;

export const Use = z.object({
  id,
  itemId: id,
  itemCode: z.string(),
  itemName: z.string(),
  unit: z.enum(ITEM_UNITS),
  lotCode: z.string(),
  quantity: z.number(),
  costMicro: z.int(),
  cause: z.enum(USE_CAUSES),
  causeId: id,
  systemCode: z.string().nullable(),
  at: instant,
  by: z.string(),
});
export type Use = z.infer<typeof Use>;

export const Count = z.object({
  id,
  itemId: id,
  counted: z.number(),
  expected: z.number(),
  reason: z.string(),
  at: instant,
  by: z.string(),
});
export type Count = z.infer<typeof Count>;

const itemFields = z.strictObject({
  code: labelCode,
  name: shortText,
  kind: z.enum(ITEM_KINDS),
  unit: z.enum(ITEM_UNITS),
  packSize: amount,
  leadTimeDays: days,
  safetyDays: days,
  supplierId: id.nullable().optional(),
  strength: strength.optional(),
  calciumMg: milligrams.optional(),
  magnesiumMg: milligrams.optional(),
});
export const CreateItem = itemFields.superRefine((item, context) => {
  const { strength = null, calciumMg = null, magnesiumMg = null } = item;
  for (const { path, message } of itemProblems({ ...item, strength, calciumMg, magnesiumMg })) {
    context.addIssue({ code: 'custom', path: [path], message });
  }
});
export type CreateItem = z.infer<typeof CreateItem>;
export const EditItem = itemFields.partial().extend({ retired: z.boolean().optional() });
export type EditItem = z.infer<typeof EditItem>;

export const Receive = z.strictObject({
  itemId: id,
  code: z
    .string()
    .trim()
    .min(1, 'Enter the lot code of the pack, or one of your own.')
    .max(40, 'At most 40 characters.'),
  quantity: amount,
  /** What all of it cost, in minor units of the farm's currency. */
  costMinor: price,
  receivedOn: calendarDay.optional(),
  expiresOn: calendarDay.nullable().optional(),
});
export type Receive = z.infer<typeof Receive>;

export const CountItem = z.strictObject({
  itemId: id,
  counted: quantity,
  reason: z.string().trim().min(1, 'Say why the count differs.').max(200, 'At most 200 characters.'),
});
export type CountItem = z.infer<typeof CountItem>;

export const ListItems = z.strictObject({
  search: z.string().trim().max(100).optional(),
  kind: z.enum(ITEM_KINDS).optional(),
  retired: z.enum(['yes', 'no']).default('no'),
});
export type ListItems = z.infer<typeof ListItems>;
export const ListLots = listQuery.omit({ search: true }).extend({
  itemId: id.optional(),
  open: z.enum(['yes', 'all']).default('all'),
});
export type ListLots = z.infer<typeof ListLots>;
export const ListUses = listQuery.omit({ search: true }).extend({
  itemId: id.optional(),
  cause: z.enum(USE_CAUSES).optional(),
});
export type ListUses = z.infer<typeof ListUses>;

export const SUPPLY_TABLES = ['items', 'lots', 'uses'] as const;

export const supplyEndpoints = {
  items: {
    method: 'get',
    path: '/api/supplies/items',
    access: 'supplies.read',
    summary: 'All supplies with what is left, most urgent first',
    query: ListItems,
    response: z.object({ items: z.array(Item) }),
  },
  item: {
    method: 'get',
    path: '/api/supplies/items/:id',
    access: 'supplies.read',
    summary: 'One supply',
    params: idParams,
    response: Item,
  },
  createItem: {
    method: 'post',
    path: '/api/supplies/items',
    access: 'supplies.work',
    summary: 'Add a supply',
    body: CreateItem,
    response: Item,
    creates: true,
  },
  editItem: {
    method: 'patch',
    path: '/api/supplies/items/:id',
    access: 'supplies.work',
    summary: 'Change a supply, or retire it',
    params: idParams,
    body: EditItem,
    response: Item,
    edits: true,
  },
  receive: {
    method: 'post',
    path: '/api/supplies/receipts',
    access: 'supplies.work',
    summary: 'Receive a delivery as a lot',
    body: Receive,
    response: Lot,
    creates: true,
  },
  undoReceipt: {
    method: 'delete',
    path: '/api/supplies/receipts/:id',
    access: 'supplies.work',
    summary: 'Take back a receipt of which nothing was used',
    params: idParams,
    response: done,
  },
  count: {
    method: 'post',
    path: '/api/supplies/counts',
    access: 'supplies.work',
    summary: 'Correct what is on hand by a count',
    body: CountItem,
    response: Count,
    creates: true,
  },
  lots: {
    method: 'get',
    path: '/api/supplies/lots',
    access: 'supplies.read',
    summary: 'Lots, newest first',
    query: ListLots,
    response: pageOf(Lot),
  },
  uses: {
    method: 'get',
    path: '/api/supplies/uses',
    access: 'supplies.read',
    summary: 'What was taken from lots and why, newest first',
    query: ListUses,
    response: pageOf(Use),
  },
  export: {
    method: 'get',
    path: '/api/supplies/export',
    access: 'supplies.read',
    summary: 'Supplies, lots or uses as CSV',
    query: z.strictObject({ table: z.enum(SUPPLY_TABLES) }),
    answer: 'file',
  },
} as const satisfies Record<string, Endpoint>;
