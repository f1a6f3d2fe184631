import { z } from 'zod';
import { ALERT_KINDS } from '../domain/alert-rules.ts';
import { done, instant, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

/** What a person hears of by e-mail, and whether a calendar reads their tasks. */
export const NotificationChoices = z.object({
  alertsAtOnce: z.boolean(),
  /** Hour of the farm's day at which the daily mail goes out; null: none. */
  digestHour: z.int().nullable(),
  /** Kinds of alerts that this person is not told of. */
  mutedKinds: z.array(z.enum(ALERT_KINDS)),
  /** Since when the calendar's address holds; null: there is none. */
  calendarSince: instant.nullable(),
  version,
});
export type NotificationChoices = z.infer<typeof NotificationChoices>;

export const EditNotifications = z.strictObject({
  alertsAtOnce: z.boolean('Choose yes or no.').optional(),
  digestHour: z.int('Choose an hour.').min(0).max(23).nullable().optional(),
  mutedKinds: z.array(z.enum(ALERT_KINDS, 'Choose kinds from the list.')).max(ALERT_KINDS.length).optional(),
});
export type EditNotifications = z.infer<typeof EditNotifications>;

export const notificationEndpoints = {
  show: {
    method: 'get',
    path: '/api/account/notifications',
    access: 'water.read',
    summary: 'What you hear of by e-mail',
    response: NotificationChoices,
  },
  edit: {
    method: 'patch',
    path: '/api/account/notifications',
    access: 'water.read',
    summary: 'Choose what you hear of by e-mail',
    body: EditNotifications,
    response: NotificationChoices,
    edits: true,
  },
  renewCalendar: {
    method: 'post',
    path: '/api/account/calendar',
    access: 'water.read',
    summary: 'Make a new address for your calendar; the one before stops working',
    response: z.object({ url: z.string() }),
  },
  endCalendar: {
    method: 'delete',
    path: '/api/account/calendar',
    access: 'water.read',
    summary: 'End the address of your calendar',
    response: done,
  },
  /** Whoever holds the secret in the address may read; calendars can't sign in. */
  calendar: {
    method: 'get',
    path: '/api/calendar/:token.ics',
    access: 'public',
    summary: 'A person’s tasks as an iCalendar file',
    params: z.strictObject({ token: z.string().max(200) }),
    answer: 'file',
  },
} as const satisfies Record<string, Endpoint>;
