import { z } from 'zod';
import { ROLES } from '../permissions.ts';
import { currencyCode, done, emailAddress, id, shortText } from './common.ts';
import type { Endpoint } from './endpoint.ts';

/** Length bounds only: whether a password is weak or breached is the server's answer at the field. */
export const password = z.string().min(10, 'Use at least 10 characters.').max(200, 'At most 200 characters.');

export const SessionUser = z.object({
  id,
  name: z.string(),
  email: z.string(),
  role: z.enum(ROLES),
  storeId: id.nullable(),
  storeName: z.string().nullable(),
});
export type SessionUser = z.infer<typeof SessionUser>;

export const FarmPublic = z.object({
  name: z.string(),
  timeZone: z.string(),
  currency: currencyCode,
});
export type FarmPublic = z.infer<typeof FarmPublic>;

/** What the client asks first: who is signed in, whether the farm must be set up, and the token every write sends back. */
export const Session = z.object({
  user: SessionUser.nullable(),
  farm: FarmPublic.nullable(),
  csrfToken: z.string(),
  needsSetup: z.boolean(),
  /** Only in demo mode: people to sign in as. */
  demoSignIns: z.array(z.object({ name: z.string(), email: z.string(), role: z.enum(ROLES), does: z.string() })),
});
export type Session = z.infer<typeof Session>;

export const SignIn = z.strictObject({
  email: emailAddress,
  password: z.string().min(1, 'Enter your password.').max(200),
});
export type SignIn = z.infer<typeof SignIn>;
export const SetUpFarm = z.strictObject({
  farmName: shortText,
  timeZone: z.string().min(1, 'Choose a time zone.').max(60),
  currency: currencyCode,
  ownerName: shortText,
  email: emailAddress,
  password,
});
export type SetUpFarm = z.infer<typeof SetUpFarm>;
export const RequestReset = z.strictObject({ email: emailAddress });
const token = z.string().min(20, 'This link is not complete.').max(200);
export const ResetPassword = z.strictObject({ token, password });
export type ResetPassword = z.infer<typeof ResetPassword>;
export const AcceptInvitation = z.strictObject({ token, name: shortText, password });
export type AcceptInvitation = z.infer<typeof AcceptInvitation>;
export const InvitationInfo = z.object({
  email: z.string(),
  role: z.enum(ROLES),
  farmName: z.string(),
  storeName: z.string().nullable(),
});
export type InvitationInfo = z.infer<typeof InvitationInfo>;
export const ChangePassword = z.strictObject({ current: z.string().min(1, 'Enter your password.').max(200), password });
export type ChangePassword = z.infer<typeof ChangePassword>;
export const DemoSignIn = z.strictObject({ email: emailAddress });

export const sessionEndpoints = {
  show: { method: 'get', path: '/api/session', access: 'public', summary: 'Who is signed in', response: Session },
  signIn: {
    method: 'post',
    path: '/api/session',
    access: 'public',
    summary: 'Sign in',
    body: SignIn,
    response: Session,
  },
  demoSignIn: {
    method: 'post',
    path: '/api/session/demo',
    access: 'public',
    summary: 'Sign in as a demo person',
    body: DemoSignIn,
    response: Session,
  },
  signOut: { method: 'delete', path: '/api/session', access: 'account.own', summary: 'Sign out', response: done },
  signOutEverywhere: {
    method: 'delete',
    path: '/api/sessions',
    access: 'account.own',
    summary: 'Sign out on every device',
    response: done,
  },
  setUp: {
    method: 'post',
    path: '/api/setup',
    access: 'public',
    summary: 'Set up an empty farm and its owner',
    body: SetUpFarm,
    response: Session,
  },
  requestReset: {
    method: 'post',
    path: '/api/password-resets',
    access: 'public',
    summary: 'Ask for a link to set a new password',
    body: RequestReset,
    response: done,
  },
  resetPassword: {
    method: 'post',
    path: '/api/password-resets/use',
    access: 'public',
    summary: 'Set a new password by link',
    body: ResetPassword,
    response: done,
  },
  invitation: {
    method: 'get',
    path: '/api/invitations/:token',
    access: 'public',
    summary: 'What an invitation is for',
    params: z.strictObject({ token }),
    response: InvitationInfo,
  },
  acceptInvitation: {
    method: 'post',
    path: '/api/invitations/accept',
    access: 'public',
    summary: 'Accept an invitation',
    body: AcceptInvitation,
    response: Session,
  },
  changePassword: {
    method: 'post',
    path: '/api/account/password',
    access: 'account.own',
    summary: 'Change your password',
    body: ChangePassword,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
