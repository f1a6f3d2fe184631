import { z } from 'zod';
import { id, idParams, instant } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { TodayText } from './today.ts';

/** What a log may be narrowed to. */
export const LOG_SUBJECTS = ['readings', 'doses', 'limewater', 'work'] as const;
export type LogSubject = (typeof LOG_SUBJECTS)[number];

/** Something that happened in a system, in words. */
export const LogEntry = z.object({
  id: z.string(),
  subject: z.enum(LOG_SUBJECTS),
  at: instant,
  by: z.string(),
  title: TodayText,
  note: z.string(),
  /** The reservoir that it is about. */
  reservoirId: id.nullable(),
});
export type LogEntry = z.infer<typeof LogEntry>;

export const systemLogEndpoints = {
  list: {
    method: 'get',
    path: '/api/systems/:id/log',
    access: 'water.read',
    summary: 'Everything that happened in a system, newest first',
    params: idParams,
    query: z.strictObject({
      subject: z.enum(LOG_SUBJECTS).optional(),
      /** Entries before this instant: `nextBefore` of the page before. */
      before: z.coerce.number().pipe(instant).optional(),
      limit: z.coerce.number().int().min(1).max(100).default(20),
    }),
    response: z.object({ items: z.array(LogEntry), nextBefore: instant.nullable() }),
  },
} as const satisfies Record<string, Endpoint>;
