import { costEndpoints } from '../../shared/contracts/costs.ts';
import type { Write } from '../db/write.ts';
import type { Api } from '../http/api.ts';
import { batchCost } from '../queries/batch-cost.ts';
import { costOverview } from '../queries/cost-overview.ts';
import { farmOf } from '../queries/farm.ts';
import { bringCostsUpToDate } from '../services/cost-shares.ts';
import { costCsv } from './cost-csv.ts';

/** Costs. Each look brings the shares up to date first, so that no figure is from before the last entry. */
export function costRoutes(api: Api): void {
  api.write(costEndpoints.overview, (write) => freshOverview(write));
  api.write(costEndpoints.batch, (write, { params }) => {
    bringCostsUpToDate(write);
    return batchCost(write.tx, params.id);
  });
  api.write(costEndpoints.export, (write, { query }) =>
    costCsv(query.table, freshOverview(write), farmOf(write.tx).currency),
  );
}

function freshOverview(write: Write) {
  bringCostsUpToDate(write);
  return costOverview(write.tx, write.now, farmOf(write.tx).timeZone);
}
