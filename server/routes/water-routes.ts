import { DONE } from '../../shared/contracts/common.ts';
import { waterEndpoints } from '../../shared/contracts/water.ts';
import type { Api } from '../http/api.ts';
import { listAdditions } from '../queries/additions.ts';
import { systemDemand } from '../queries/demand.ts';
import { listWaterItems } from '../queries/water-items.ts';
import { systemGlance, waterOverview } from '../queries/water.ts';
import { logDose, logWaterChange, undoDose, undoWaterChange } from '../services/addition-service.ts';

export function waterRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(waterEndpoints.overview, (db) => ({ items: waterOverview(db, clock.now()) }));
  api.read(waterEndpoints.glance, (db, { params }) => systemGlance(db, params.id, clock.now()));
  api.read(waterEndpoints.demand, (db, { params, query }) => systemDemand(db, params.id, clock.now(), query.days));
  api.read(waterEndpoints.items, (db) => ({ items: listWaterItems(db) }));
  api.read(waterEndpoints.additions, (db, { params }) => ({ items: listAdditions(db, params.id) }));
  api.write(waterEndpoints.logWaterChange, (write, { body }) => logWaterChange(write, body));
  api.write(waterEndpoints.undoWaterChange, (write, { params }) => {
    undoWaterChange(write, params.id);
    return DONE;
  });
  api.write(waterEndpoints.logDose, (write, { body }) => logDose(write, body));
  api.write(waterEndpoints.undoDose, (write, { params }) => {
    undoDose(write, params.id);
    return DONE;
  });
}
