import { z } from 'zod';
import { ALERT_KINDS } from '../domain/alert-rules.ts';
import { id, idParams, instant, listQuery, pageOf } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { TODAY_GROUPS, TodayText } from './today.ts';

/** Something about a system that needs a look, in words, from when it began until what ended it. */
export const Alert = z.object({
  id,
  kind: z.enum(ALERT_KINDS),
  systemId: id,
  systemCode: z.string(),
  reservoirId: id.nullable(),
  urgency: z.enum(TODAY_GROUPS),
  title: TodayText,
  detail: TodayText,
  openedAt: instant,
  acknowledgedAt: instant.nullable(),
  acknowledgedBy: z.string().nullable(),
  /** When it is told of again in spite of that. */
  quietUntil: TodayText,
  closedAt: instant.nullable(),
  /** What ended it. */
  ending: TodayText,
});
export type Alert = z.infer<typeof Alert>;

export const ALERT_STATES = ['open', 'closed'] as const;

export const alertEndpoints = {
  list: {
    method: 'get',
    path: '/api/alerts',
    access: 'water.read',
    summary: 'Alerts, the newest first',
    query: z.strictObject({
      ...listQuery.pick({ cursor: true, limit: true }).shape,
      state: z.enum(ALERT_STATES).default('open'),
      systemId: id.optional(),
    }),
    response: pageOf(Alert),
  },
  acknowledge: {
    method: 'post',
    path: '/api/alerts/:id/acknowledgement',
    access: 'water.log',
    summary: 'Say that you know: the alert is quiet until it is worse',
    params: idParams,
    response: Alert,
  },
  unacknowledge: {
    method: 'delete',
    path: '/api/alerts/:id/acknowledgement',
    access: 'water.log',
    summary: 'Take that back',
    params: idParams,
    response: Alert,
  },
} as const satisfies Record<string, Endpoint>;
