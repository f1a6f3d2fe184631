import { systemPlan } from '../../../server/queries/plan.ts';
import { logOverfill } from '../../../server/services/overfill-service.ts';
import { acceptAdvice } from '../../../server/services/plan-service.ts';
import { givenDosedSystem, givenMeans } from '../given-plans.ts';
import type { TestFarm } from '../start-farm.ts';

/** A system with advice to answer, one whose advice was answered, and one with an overfill; values by path. */
export function givenPlans(farm: TestFarm) {
  const { limeId } = givenMeans(farm);
  const [open, answered, spilt] = [1, 2, 3].map(() => givenDosedSystem(farm, { limeItemId: limeId }).systemId);
  const keyOf = (systemId = '') => systemPlan(farm.db, systemId, farm.deps.clock.now()).key;
  const answer = farm.write((write) => acceptAdvice(write, answered ?? '', { key: keyOf(answered), reason: '' }));
  const overfillId = farm.write((write) => logOverfill(write, spilt ?? '', { litres: 5, note: '' })).id;
  return {
    '/api/systems/:id/advice/': { id: open, key: keyOf(open) },
    '/api/advice': { id: answer.plan?.adviceId },
    '/api/systems/:id/overfills': { id: answered },
    '/api/overfills': { id: overfillId },
  };
}
