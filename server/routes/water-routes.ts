import { waterOverviewEndpoints } from '../../shared/contracts/water-overview.ts';
import { waterEndpoints } from '../../shared/contracts/water.ts';
import type { Api } from '../http/api.ts';
import { systemDemand } from '../queries/demand.ts';
import { listWaterItems } from '../queries/water-items.ts';
import { systemGlance } from '../queries/water.ts';
import { waterOverview } from '../queries/water-overview.ts';

export function waterRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(waterOverviewEndpoints.show, (db) => waterOverview(db, clock.now()));
  api.read(waterEndpoints.glance, (db, { params }) => systemGlance(db, params.id, clock.now()));
  api.read(waterEndpoints.demand, (db, { params, query }) =>
    systemDemand(db, params.id, clock.now(), { historyDays: query.days, parameter: query.parameter }),
  );
  api.read(waterEndpoints.items, (db) => ({ items: listWaterItems(db) }));
}
