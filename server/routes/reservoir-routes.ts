import { DONE } from '../../shared/contracts/common.ts';
import { reservoirEndpoints } from '../../shared/contracts/reservoirs.ts';
import type { Api } from '../http/api.ts';
import { listEvents, listReservoirs, showReservoir } from '../queries/reservoirs.ts';
import { refillReservoir } from '../services/refill-service.ts';
import { changeOver, createReservoir, editReservoir, logLevel, undoLastEvent } from '../services/reservoir-service.ts';

export function reservoirRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(reservoirEndpoints.list, (db, { query }) => ({ items: listReservoirs(db, clock.now(), query.systemId) }));
  api.read(reservoirEndpoints.show, (db, { params }) => showReservoir(db, params.id, clock.now()));
  api.read(reservoirEndpoints.events, (db, { params, query }) => listEvents(db, params.id, query));
  api.write(reservoirEndpoints.create, (write, { body }) => createReservoir(write, body));
  api.write(reservoirEndpoints.edit, (write, { params, body, ifMatch }) =>
    editReservoir(write, params.id, ifMatch, body),
  );
  api.write(reservoirEndpoints.refill, (write, { params, body }) => refillReservoir(write, params.id, body));
  api.write(reservoirEndpoints.logLevel, (write, { params, body }) => logLevel(write, params.id, body));
  api.write(reservoirEndpoints.changeOver, (write, { params, body }) => changeOver(write, params.id, body));
  api.write(reservoirEndpoints.undo, (write, { params, body }) => {
    undoLastEvent(write, params.id, body.eventId);
    return DONE;
  });
}
