import { z } from 'zod';
import { calendarDay, id, instant, listQuery, pageOf } from './common.ts';
import type { Endpoint } from './endpoint.ts';

/** One change: who did what to which record, and the record before and after. */
export const AuditEntry = z.object({
  id: z.int(),
  at: instant,
  /** Null: the product itself. */
  actorId: id.nullable(),
  actorName: z.string(),
  action: z.string(),
  entity: z.string(),
  entityId: z.string(),
  before: z.unknown(),
  after: z.unknown(),
});
export type AuditEntry = z.infer<typeof AuditEntry>;

/** Actor of changes that the product itself makes: jobs and messages of the payment service. */
export const SYSTEM_ACTOR = 'system';

const filter = z.strictObject({
  entity: z.string().max(60).optional(),
  entityId: z.string().max(100).optional(),
  actor: z.union([id, z.literal(SYSTEM_ACTOR)]).optional(),
  from: calendarDay.optional(),
  to: calendarDay.optional(),
});
export type AuditFilter = z.infer<typeof filter>;

export const ListAudit = filter.extend(listQuery.omit({ search: true }).shape);
export type ListAudit = z.infer<typeof ListAudit>;

export const AuditChoices = z.object({
  entities: z.array(z.string()),
  actors: z.array(z.object({ id: z.string(), name: z.string() })),
});
export type AuditChoices = z.infer<typeof AuditChoices>;

export const auditEndpoints = {
  list: {
    method: 'get',
    path: '/api/audit',
    access: 'audit.read',
    summary: 'Changes, newest first',
    query: ListAudit,
    response: pageOf(AuditEntry),
  },
  choices: {
    method: 'get',
    path: '/api/audit/choices',
    access: 'audit.read',
    summary: 'Kinds of record and people to filter changes by',
    response: AuditChoices,
  },
  export: {
    method: 'get',
    path: '/api/audit/export',
    access: 'audit.read',
    summary: 'Changes as a CSV file',
    query: filter,
    answer: 'file',
  },
} as const satisfies Record<string, Endpoint>;
