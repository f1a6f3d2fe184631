import { DONE } from '../../shared/contracts/common.ts';
import { sessionEndpoints } from '../../shared/contracts/session.ts';
import type { Api } from '../http/api.ts';
import { networkOf } from '../http/rate-limits.ts';
import { startSession } from '../http/session.ts';
import { acceptInvitation, invitationInfo } from '../services/invitation-service.ts';
import { changePassword, requestReset, resetPassword } from '../services/password-service.ts';
import { setUpFarm } from '../services/set-up-service.ts';
import { openSession } from './session-routes.ts';

/** How people come by an account and a password. */
export function accountRoutes(api: Api): void {
  const { deps } = api;

  api.act(sessionEndpoints.setUp, async ({ request, body }) => openSession(deps, request, await setUpFarm(deps, body)));
  api.act(sessionEndpoints.requestReset, ({ body }) => {
    requestReset(deps, body.email);
    return DONE;
  });
  api.act(sessionEndpoints.resetPassword, async ({ request, body }) => {
    await resetPassword(deps, body, networkOf(request));
    return DONE;
  });
  api.read(sessionEndpoints.invitation, (db, { params }) => invitationInfo(db, params.token, deps.clock.now()));
  api.act(sessionEndpoints.acceptInvitation, async ({ request, body }) =>
    openSession(deps, request, await acceptInvitation(deps, body)),
  );
  api.act(sessionEndpoints.changePassword, async ({ request, caller, body }) => {
    const csrfToken = request.session.csrfToken ?? '';
    await changePassword(deps, caller, body, networkOf(request));
    // All sessions ended with the old password; the device in hand gets a new one and keeps its page's token.
    await startSession(request, caller.userId, csrfToken, deps.clock.now());
    return DONE;
  });
}
