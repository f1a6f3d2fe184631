import { z } from 'zod';
import { PARAMETER_CODES, type ParameterCode } from '../domain/units.ts';
import { id, idParams, instant } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { parameterCode, TargetBand } from './systems.ts';

const MS_PER_DAY = 86_400_000;
/** The longest stretch that is shown at once. */
export const LONGEST_TIMELINE_DAYS = 1830;

const known = (code: string): code is ParameterCode => PARAMETER_CODES.some((each) => each === code);

/** Parameters in one query value, "alkalinity,calcium". */
const parameterList = z
  .string()
  .max(400)
  .transform((text, context) => {
    const codes = [...new Set(text.split(',').filter((code) => code !== ''))];
    if (codes.every(known)) return codes;
    context.addIssue({ code: 'custom', message: `Choose from ${PARAMETER_CODES.join(', ')}.` });
    return z.NEVER;
  });

export const TimelineQuery = z
  .strictObject({
    /** Ninety days before the end when left out. */
    from: z.coerce.number().pipe(instant).optional(),
    /** Now when left out. */
    to: z.coerce.number().pipe(instant).optional(),
    parameters: parameterList.default(['alkalinity']),
  })
  .superRefine(({ from, to }, context) => {
    if (from === undefined || to === undefined) return;
    if (to <= from) context.addIssue({ code: 'custom', path: ['to'], message: 'The end must be after the start.' });
    if (to - from > LONGEST_TIMELINE_DAYS * MS_PER_DAY) {
      context.addIssue({ code: 'custom', path: ['from'], message: `At most ${LONGEST_TIMELINE_DAYS} days at once.` });
    }
  });
export type TimelineQuery = z.infer<typeof TimelineQuery>;

/** Readings of one parameter in its canonical unit, oldest first. */
export const TimelineSeries = z.object({
  parameter: parameterCode,
  /** Each with half of the 95 % interval of its test. */
  points: z.array(z.object({ id, at: instant, value: z.number(), error: z.number(), method: z.string() })),
  /** Readings in the period; more than points where the server left some out. */
  total: z.int(),
  band: TargetBand.nullable(),
});
export type TimelineSeries = z.infer<typeof TimelineSeries>;

/** What was measured in a system, and what was done to its water, over one stretch of time. */
export const Timeline = z.object({
  systemId: id,
  from: instant,
  to: instant,
  series: z.array(TimelineSeries),
  /** Limewater drawn between two looks at the level, and the alkalinity that it brought, meq/L of the system. */
  limewater: z.array(z.object({ from: instant, to: instant, litres: z.number(), meqL: z.number() })),
  doses: z.array(z.object({ at: instant, name: z.string(), amount: z.number(), unit: z.string(), meqL: z.number() })),
  /** When steady dosing began or ended. */
  rates: z.array(
    z.object({ at: instant, name: z.string(), amountPerDay: z.number(), unit: z.string(), ended: z.boolean() }),
  ),
  waterChanges: z.array(z.object({ at: instant, litres: z.number(), alkalinityMeqL: z.number() })),
  /** When another reservoir was put online, with the strength that stood in it. */
  changeOvers: z.array(z.object({ at: instant, code: z.string(), alkalinityMeqL: z.number() })),
});
export type Timeline = z.infer<typeof Timeline>;

export const timelineEndpoints = {
  show: {
    method: 'get',
    path: '/api/systems/:id/timeline',
    access: 'water.read',
    summary: 'Readings of a system and what was done to its water, for charts',
    params: idParams,
    query: TimelineQuery,
    response: Timeline,
  },
  export: {
    method: 'get',
    path: '/api/systems/:id/timeline/export',
    access: 'water.read',
    summary: 'The same as a CSV file, with every reading',
    params: idParams,
    query: TimelineQuery,
    answer: 'file',
  },
} as const satisfies Record<string, Endpoint>;
