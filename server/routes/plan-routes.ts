import { DONE } from '../../shared/contracts/common.ts';
import { overfillEndpoints } from '../../shared/contracts/overfills.ts';
import { planEndpoints } from '../../shared/contracts/plan.ts';
import { waterRuleEndpoints } from '../../shared/contracts/water-rules.ts';
import type { Api } from '../http/api.ts';
import { farmOf } from '../queries/farm.ts';
import { overfillOf } from '../queries/overfill.ts';
import { listPlans, systemPlan } from '../queries/plan.ts';
import { listAnswers } from '../queries/plan-rows.ts';
import { waterRules } from '../queries/water-rules.ts';
import { logOverfill, undoOverfill } from '../services/overfill-service.ts';
import { acceptAdvice, dismissAdvice, takeAnswerBack } from '../services/plan-service.ts';
import { changeWaterRules } from '../services/water-rules-service.ts';

export function planRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(planEndpoints.list, (db) => ({ items: listPlans(db, clock.now()) }));
  api.read(planEndpoints.show, (db, { params }) => systemPlan(db, params.id, clock.now()));
  api.read(planEndpoints.history, (db, { params, query }) => listAnswers(db, params.id, query));
  api.write(planEndpoints.accept, (write, { params, body }) => acceptAdvice(write, params.id, body));
  api.write(planEndpoints.dismiss, (write, { params, body }) => dismissAdvice(write, params.id, body));
  api.write(planEndpoints.takeBack, (write, { params }) => {
    takeAnswerBack(write, params.id);
    return DONE;
  });
  api.read(overfillEndpoints.ask, (db, { params, query }) => overfillOf(db, params.id, clock.now(), query));
  api.write(overfillEndpoints.log, (write, { params, body }) => logOverfill(write, params.id, body));
  api.write(overfillEndpoints.undo, (write, { params }) => {
    undoOverfill(write, params.id);
    return DONE;
  });
  api.read(waterRuleEndpoints.show, (db) => waterRules(farmOf(db)));
  api.write(waterRuleEndpoints.change, (write, { body, ifMatch }) => changeWaterRules(write, ifMatch, body));
}
