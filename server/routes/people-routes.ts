import { DONE } from '../../shared/contracts/common.ts';
import { peopleEndpoints } from '../../shared/contracts/people.ts';
import type { Api } from '../http/api.ts';
import { listInvitations, listPeople } from '../queries/people.ts';
import { invite, resendInvitation, revokeInvitation } from '../services/invitation-service.ts';
import { changePerson } from '../services/person-service.ts';

/** Who belongs to the farm, and who is invited. */
export function peopleRoutes(api: Api): void {
  api.read(peopleEndpoints.list, (db, { query }) => listPeople(db, query));
  api.write(peopleEndpoints.change, (write, { params, body, ifMatch }) =>
    changePerson(write, params.id, body, ifMatch),
  );
  api.read(peopleEndpoints.invitations, (db, { query }) => listInvitations(db, query, api.deps.clock.now()));
  api.write(peopleEndpoints.invite, (write, { body }) => invite(write, body));
  api.write(peopleEndpoints.resend, (write, { params }) => resendInvitation(write, params.id));
  api.write(peopleEndpoints.revoke, (write, { params }) => {
    revokeInvitation(write, params.id);
    return DONE;
  });
}
