import { z } from 'zod';
import { id, idParams, instant } from '../common.ts';
import type { Endpoint } from '../endpoint.ts';
import { ITEM_UNITS } from '../../domain/supply-items.ts';
import { grade, plugCodeText } from '../stock/values.ts';
import { OrderPage } from './staff.ts';
import { OrderLine, orderState } from './values.ts';

/** A plug scanned for an order. */
export const Pick = z.object({
  id,
  code: z.string(),
  orderLineId: id,
  lineCode: z.string(),
  batchCode: z.string(),
  at: instant,
  by: z.string(),
});
export type Pick = z.infer<typeof Pick>;

/** What to fetch at one rack. Promised plugs are not named one by one: any of the batch there will do. */
export const PickStop = z.object({
  rackCode: z.string(),
  tankName: z.string(),
  systemCode: z.string(),
  items: z.array(
    z.object({
      lineCode: z.string(),
      tradeName: z.string(),
      grade,
      batchCode: z.string(),
      pieces: z.int(),
      /** Where pieces of the batch stand on the rack; empty where they have no position. */
      positions: z.array(z.string()),
    }),
  ),
});
export type PickStop = z.infer<typeof PickStop>;

export const PickPlan = z.object({
  id,
  number: z.int(),
  state: orderState,
  storeName: z.string(),
  lines: z.array(OrderLine),
  /** Racks in walking order. */
  stops: z.array(PickStop),
  /** Newest first. */
  picks: z.array(Pick),
  wanted: z.int(),
  picked: z.int(),
});
export type PickPlan = z.infer<typeof PickPlan>;

export const PickPlug = z.strictObject({ code: plugCodeText });
export const PickDone = z.object({ pick: Pick, line: OrderLine, picked: z.int(), wanted: z.int() });
export type PickDone = z.infer<typeof PickDone>;

/** A packing supply, and how much of it the last packed order took for each box; null where it took none. */
export const PackingSupply = z.object({
  itemId: id,
  name: z.string(),
  unit: z.enum(ITEM_UNITS),
  onHand: z.number(),
  lastPerBox: z.number().nullable(),
});
export type PackingSupply = z.infer<typeof PackingSupply>;

export const PackOrder = z.strictObject({
  boxes: z.int('Enter a whole number.').min(1, 'At least one box.').max(999),
  /** What could not be picked is left out and paid back. */
  acceptMissing: z.boolean().default(false),
  /** Boxes, heat packs and the like that this order takes; each in the item's own unit. */
  supplies: z
    .array(
      z.strictObject({
        itemId: id,
        quantity: z.number('Enter a number.').positive('Enter more than 0, or leave it out.').max(1_000_000),
      }),
    )
    .max(20)
    .default([]),
});
export type PackOrder = z.infer<typeof PackOrder>;

export const ShipOrder = z.strictObject({
  carrier: z.string().trim().min(1, 'Say who carries it.').max(60),
  tracking: z.string().trim().max(80).default(''),
});
export type ShipOrder = z.infer<typeof ShipOrder>;

export const packingEndpoints = {
  plan: {
    method: 'get',
    path: '/api/orders/:id/picking',
    access: 'orders.work',
    summary: 'What to fetch for an order, rack by rack',
    params: idParams,
    response: PickPlan,
  },
  pick: {
    method: 'post',
    path: '/api/orders/:id/picks',
    access: 'orders.work',
    summary: 'Take a scanned plug for an order',
    params: idParams,
    body: PickPlug,
    response: PickDone,
    creates: true,
  },
  undoPick: {
    method: 'post',
    path: '/api/orders/:id/picks/:pickId/undo',
    access: 'orders.work',
    summary: 'Put a picked plug back',
    params: z.strictObject({ id, pickId: id }),
    response: PickPlan,
  },
  supplies: {
    method: 'get',
    path: '/api/packing-supplies',
    access: 'orders.work',
    summary: 'Packing supplies on hand, with what the last order took',
    response: z.object({ items: z.array(PackingSupply) }),
  },
  pack: {
    method: 'post',
    path: '/api/orders/:id/pack',
    access: 'orders.work',
    summary: 'Close the boxes of an order',
    params: idParams,
    body: PackOrder,
    response: OrderPage,
  },
  ship: {
    method: 'post',
    path: '/api/orders/:id/ship',
    access: 'orders.work',
    summary: 'Hand an order to the carrier and issue its invoice',
    params: idParams,
    body: ShipOrder,
    response: OrderPage,
  },
  packingList: {
    method: 'get',
    path: '/api/orders/:id/packing-list.pdf',
    access: 'orders.read',
    summary: 'The packing list as a PDF',
    params: idParams,
    answer: 'file',
  },
} as const satisfies Record<string, Endpoint>;
