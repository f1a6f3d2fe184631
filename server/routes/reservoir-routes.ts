import { DONE } from '../../shared/contracts/common.ts';
import { evaporationEndpoints } from '../../shared/contracts/evaporation.ts';
import { limewaterHabitsEndpoints } from '../../shared/contracts/limewater-habits.ts';
import { reservoirEndpoints } from '../../shared/contracts/reservoirs.ts';
import type { Write } from '../db/write.ts';
import type { Api } from '../http/api.ts';
import { systemEvaporation } from '../queries/evaporation.ts';
import { farmOf } from '../queries/farm.ts';
import { limewaterHabits } from '../queries/limewater-habits.ts';
import { fedSystems } from '../queries/reservoir-feeds.ts';
import { listEvents, listReservoirs, reservoirRow, showReservoir } from '../queries/reservoirs.ts';
import { evaluateAlerts } from '../services/alert-service.ts';
import { changeLimewaterHabits } from '../services/limewater-habits-service.ts';
import { mixingCardFile } from '../services/papers/mixing-card.ts';
import { refillReservoir } from '../services/refill-service.ts';
import { changeOver, undoLastEvent } from '../services/reservoir-changeover.ts';
import {
  checkStrength,
  cleanReservoir,
  logLevel,
  markSpent,
  removeSludge,
  topUp,
} from '../services/reservoir-service.ts';
import { createReservoir, editReservoir, shareReservoir } from '../services/reservoir-set-up.ts';

/** Reservoirs of limewater, what is done with them, and what evaporates. */
export function reservoirRoutes(api: Api): void {
  readRoutes(api);
  setUpRoutes(api);
  const { refill, logLevel: level, changeOver: change, undo } = reservoirEndpoints;
  api.write(refill, (write, { params, body }) => told(write, params, refillReservoir(write, params.id, body)));
  api.write(level, (write, { params, body }) => told(write, params, logLevel(write, params.id, body)));
  api.write(change, (write, { params, body }) => told(write, params, changeOver(write, params.id, body)));
  const { topUp: top, checkStrength: check, removeSludge: sludge, markSpent: spent, clean } = reservoirEndpoints;
  api.write(top, (write, { params, body }) => told(write, params, topUp(write, params.id, body)));
  api.write(check, (write, { params, body }) => told(write, params, checkStrength(write, params.id, body)));
  api.write(sludge, (write, { params, body }) => told(write, params, removeSludge(write, params.id, body)));
  api.write(spent, (write, { params, body }) => told(write, params, markSpent(write, params.id, body)));
  api.write(clean, (write, { params, body }) => told(write, params, cleanReservoir(write, params.id, body)));
  api.write(undo, (write, { params, body }) => {
    undoLastEvent(write, params.id, body.eventId);
    return told(write, params, DONE);
  });
}

/** The answer, once the alerts of the systems that the reservoir feeds are up to date. */
function told<T>(write: Write, { id }: { id: string }, answer: T): T {
  const reservoir = reservoirRow(write.tx, id);
  for (const systemId of fedSystems(write.tx, reservoir, write.now)) evaluateAlerts(write, systemId);
  return answer;
}

function readRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(reservoirEndpoints.list, (db, { query }) => ({
    items: listReservoirs(db, clock.now(), query.systemId, query.retired),
  }));
  api.read(reservoirEndpoints.show, (db, { params }) => showReservoir(db, params.id, clock.now()));
  api.read(reservoirEndpoints.events, (db, { params, query }) => listEvents(db, params.id, query));
  api.read(evaporationEndpoints.show, (db, { params }) => systemEvaporation(db, params.id, clock.now()));
  api.act(reservoirEndpoints.mixingCard, ({ params, query }) =>
    mixingCardFile(api.deps.db, params.id, query, clock.now()),
  );
}

function setUpRoutes(api: Api): void {
  api.write(reservoirEndpoints.create, (write, { body }) => createReservoir(write, body));
  api.write(reservoirEndpoints.edit, (write, { params, body, ifMatch }) =>
    editReservoir(write, params.id, ifMatch, body),
  );
  api.write(reservoirEndpoints.share, (write, { params, body, ifMatch }) =>
    shareReservoir(write, params.id, ifMatch, body),
  );
  api.read(limewaterHabitsEndpoints.show, (db) => limewaterHabits(farmOf(db)));
  api.write(limewaterHabitsEndpoints.change, (write, { body }) => changeLimewaterHabits(write, body));
}
