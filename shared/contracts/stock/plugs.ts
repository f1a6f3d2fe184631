import { z } from 'zod';
import { calendarDay, instant } from '../common.ts';
import type { Endpoint } from '../endpoint.ts';
import { Measurement, StockAct } from './batches.ts';
import { LineRef, plugCodeText, RackRef, SizeOutlook } from './values.ts';

/** What a plug is just now. 'gone' ones carry how in `gone`. */
export const PLUG_STATES = [
  'bench',
  'healing',
  'growing',
  'saleable',
  'withheld',
  'quarantine',
  'picked',
  'gone',
] as const;

/** A stretch of a plug's life in one place; `to` null: until now. */
export const LifeSegment = z.object({
  kind: z.enum(['healing', 'growout', 'broodstock', 'quarantine', 'bench', 'picked']),
  label: z.string(),
  from: instant,
  to: instant.nullable(),
});
export const LifePin = z.object({ kind: z.string(), label: z.string(), at: instant });

/** A mean of readings of the system it stands in, since it came there. */
export const WaterLived = z.object({
  parameter: z.string(),
  mean: z.number(),
  sd: z.number().nullable(),
  readings: z.int(),
});

export const PlugPage = z.object({
  code: z.string(),
  number: z.int(),
  state: z.enum(PLUG_STATES),
  gone: z.object({ kind: z.string(), detail: z.string(), at: instant }).nullable(),
  line: LineRef,
  batch: z.object({ id: z.string(), code: z.string(), pieces: z.int(), alive: z.int(), cutOn: calendarDay }),
  mother: z.object({ id: z.string(), code: z.string() }),
  rack: RackRef.nullable(),
  position: z.string().nullable(),
  size: SizeOutlook,
  measurements: z.array(Measurement),
  life: z.object({ segments: z.array(LifeSegment), pins: z.array(LifePin) }),
  water: z.array(WaterLived),
  withholds: z.array(z.object({ id: z.string(), reason: z.string(), scope: z.string(), startedAt: instant })),
  /** Number of the order that it is picked for, or that pieces of its batch are promised to. */
  heldFor: z.object({ orderNumber: z.int().nullable(), batchHeld: z.int() }),
  acts: z.array(StockAct),
});
export type PlugPage = z.infer<typeof PlugPage>;

export const plugEndpoints = {
  showPlug: {
    method: 'get',
    path: '/api/plugs/:code',
    access: 'stock.read',
    summary: 'One plug: life, place, size, water',
    params: z.strictObject({ code: plugCodeText }),
    response: PlugPage,
  },
} as const satisfies Record<string, Endpoint>;
