import { z } from 'zod';
import { ROLES } from '../permissions.ts';
import { done, emailAddress, id, idParams, instant, listQuery, pageOf, shortText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

/** Someone who can sign in, or could until they were disabled. */
export const Person = z.object({
  id,
  name: z.string(),
  email: z.string(),
  role: z.enum(ROLES),
  storeId: id.nullable(),
  storeName: z.string().nullable(),
  createdAt: instant,
  disabledAt: instant.nullable(),
  version,
});
export type Person = z.infer<typeof Person>;

/** Someone invited who has not accepted yet. */
export const Invitation = z.object({
  id,
  email: z.string(),
  role: z.enum(ROLES),
  storeId: id.nullable(),
  storeName: z.string().nullable(),
  createdAt: instant,
  createdBy: z.string(),
  expiresAt: instant,
  expired: z.boolean(),
});
export type Invitation = z.infer<typeof Invitation>;

export const InvitePerson = z.strictObject({
  email: emailAddress,
  role: z.enum(ROLES, 'Choose a role.'),
  /** Buyers, and only they, belong to a store. */
  storeId: id.nullable().optional(),
});
export type InvitePerson = z.infer<typeof InvitePerson>;

export const ChangePerson = z.strictObject({
  name: shortText.optional(),
  role: z.enum(ROLES, 'Choose a role.').optional(),
  storeId: id.nullable().optional(),
  disabled: z.boolean().optional(),
});
export type ChangePerson = z.infer<typeof ChangePerson>;

export const peopleEndpoints = {
  list: {
    method: 'get',
    path: '/api/people',
    access: 'people.manage',
    summary: 'People of the farm and of its stores',
    query: listQuery,
    response: pageOf(Person),
  },
  change: {
    method: 'patch',
    path: '/api/people/:id',
    access: 'people.manage',
    summary: 'Change a role, or disable or enable a person',
    params: idParams,
    body: ChangePerson,
    response: Person,
    edits: true,
  },
  invitations: {
    method: 'get',
    path: '/api/invitations',
    access: 'people.manage',
    summary: 'Invitations that wait for an answer',
    query: listQuery,
    response: pageOf(Invitation),
  },
  invite: {
    method: 'post',
    path: '/api/invitations',
    access: 'people.manage',
    summary: 'Invite someone by e-mail',
    body: InvitePerson,
    response: Invitation,
    creates: true,
  },
  resend: {
    method: 'post',
    path: '/api/invitations/:id/resend',
    access: 'people.manage',
    summary: 'Send an invitation again with a new link',
    params: idParams,
    response: Invitation,
  },
  revoke: {
    method: 'delete',
    path: '/api/invitations/:id',
    access: 'people.manage',
    summary: 'Take an invitation back',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
