import { randomBytes } from 'node:crypto';
import type { Request } from 'express';
import { DONE } from '../../shared/contracts/common.ts';
import { type Session, sessionEndpoints } from '../../shared/contracts/session.ts';
import { inWrite } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { networkOf } from '../http/rate-limits.ts';
import { endSession, startSession } from '../http/session.ts';
import { sessionOf } from '../queries/session.ts';
import { signIn, signInAsDemo } from '../services/auth-service.ts';
import { endSessionsOf } from '../services/session-ending.ts';

/** Signing in and out. */
export function sessionRoutes(api: Api): void {
  const { deps } = api;

  api.act(sessionEndpoints.show, ({ request, caller }) =>
    sessionOf(deps.db, deps.config, caller && { userId: caller.userId, csrfToken: request.session.csrfToken ?? '' }),
  );
  api.act(sessionEndpoints.signIn, async ({ request, body }) => {
    const user = await signIn(deps, { ...body, address: networkOf(request) });
    return openSession(deps, request, user.id);
  });
  api.act(sessionEndpoints.demoSignIn, ({ request, body }) =>
    openSession(deps, request, signInAsDemo(deps, body.email).id),
  );
  api.act(sessionEndpoints.signOut, async ({ request }) => {
    await endSession(request);
    return DONE;
  });
  api.act(sessionEndpoints.signOutEverywhere, async ({ request, caller }) => {
    inWrite(deps, caller, (write) => {
      endSessionsOf(write, caller.userId);
      write.audit({ action: 'user.signed_out_everywhere', entity: 'user', entityId: caller.userId });
    });
    await endSession(request);
    return DONE;
  });
}

/** Starts a session under a new id with its own token, and answers with it. */
export async function openSession(deps: Deps, request: Request, userId: string): Promise<Session> {
  const csrfToken = randomBytes(32).toString('base64url');
  await startSession(request, userId, csrfToken, deps.clock.now());
  return sessionOf(deps.db, deps.config, { userId, csrfToken });
}
