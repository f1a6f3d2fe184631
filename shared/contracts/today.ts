import { z } from 'zod';
import { UNITS, type Quantity } from '../domain/units.ts';
import { calendarDay, id, instant, nothing } from './common.ts';
import type { Endpoint } from './endpoint.ts';

const quantities = Object.keys(UNITS) as [Quantity, ...Quantity[]]; // the table has at least one quantity

/** Words with what each reader sees in their own unit, or named by its nearness: values, clock times and days. */
export const TodayText = z.array(
  z.union([
    z.string(),
    z.object({ quantity: z.enum(quantities), value: z.number(), difference: z.boolean().optional() }),
    z.object({ clock: instant }),
    z.object({ day: calendarDay }),
  ]),
);
export type TodayText = z.infer<typeof TodayText>;

/** In the order of their urgency. */
export const TODAY_TONES = ['brick', 'ochre', 'slate', 'kelp'] as const;
export const TODAY_GROUPS = ['now', 'today', 'soon'] as const;
export type TodayGroup = (typeof TODAY_GROUPS)[number];

/** One thing to do, or to know. */
export const TodayEntry = z.object({
  /** The same as long as it is about the same thing. */
  id: z.string(),
  tone: z.enum(TODAY_TONES),
  group: z.enum(TODAY_GROUPS),
  title: TodayText,
  detail: TodayText,
  act: z.object({ label: z.string(), to: z.string() }),
  /** The alert behind it, for who may say that they know. */
  alertId: id.optional(),
  /** The task behind it, for who may say that it is done; not a test, which is done with its reading. */
  task: z.object({ id, dueOn: calendarDay }).optional(),
});
export type TodayEntry = z.infer<typeof TodayEntry>;

export const Today = z.object({
  day: calendarDay,
  entries: z.array(TodayEntry),
  frags: z.object({ saleable: z.int(), held: z.int() }),
  /** Packed orders that wait for their carrier; null for who may not see orders. */
  boxesToShip: z.int().nullable(),
  /** Alerts that somebody knows of: they wait on their own page. */
  quietAlerts: z.int(),
});
export type Today = z.infer<typeof Today>;

export const todayEndpoints = {
  show: {
    method: 'get',
    path: '/api/today',
    access: 'today.read',
    summary: 'What needs doing now, today and soon',
    query: nothing,
    response: Today,
  },
} as const satisfies Record<string, Endpoint>;
