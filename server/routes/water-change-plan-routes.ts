import { DONE } from '../../shared/contracts/common.ts';
import { waterChangePlanEndpoints } from '../../shared/contracts/water-change-plans.ts';
import type { Api } from '../http/api.ts';
import { listWaterChangePlans } from '../queries/water-change-plans.ts';
import { clearWaterChangePlan, setWaterChangePlan } from '../services/water-change-plan-service.ts';

export function waterChangePlanRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(waterChangePlanEndpoints.list, (db) => listWaterChangePlans(db, clock.now()));
  api.write(waterChangePlanEndpoints.set, (write, { params, body }) => setWaterChangePlan(write, params.id, body));
  api.write(waterChangePlanEndpoints.clear, (write, { params }) => {
    clearWaterChangePlan(write, params.id);
    return DONE;
  });
}
