import { eq } from 'drizzle-orm';
import type { AcceptAdvice, DismissAdvice, SystemPlan } from '../../shared/contracts/plan.ts';
import { leaves, proposes } from '../../shared/domain/dosing-plan/advice-kind.ts';
import { DomainError } from '../../shared/errors.ts';
import { dosingAdvice, dosingPlans } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { isSameAdvice, systemPlan } from '../queries/plan.ts';
import { adviceRow, type AdviceRow, lastAnswer, planBefore, runningPlan } from '../queries/plan-rows.ts';
import { adviceAsText } from './plan-text.ts';
import { askForPlanWork } from './plan-tasks.ts';
import { planAmounts, type PlanAmounts } from './plan-amounts.ts';
import { endTasksOf } from './task-service.ts';

/**
 * Takes the advice as it stands, or what the person made of it, as the plan from now on, and asks for the work that it
 * means.
 *
 * @throws {DomainError} `rule.refused` where the advice is another one by now, names nothing to dose, or where what was
 *   changed passes a limit
 */
export function acceptAdvice(write: Write, systemId: string, input: AcceptAdvice): SystemPlan {
  const current = currentAdvice(write, systemId, input.key);
  const { kind } = current.advice;
  const amounts = planAmounts(current, input.changes);
  if (!proposes(kind) && !(leaves(kind) && amounts.isChanged)) {
    throw new DomainError('rule.refused', 'This advice names nothing to dose, so there is no plan to take.');
  }
  const outcome = amounts.isChanged ? 'changed' : 'accepted';
  if (amounts.isChanged && input.reason === '') {
    const message = 'Say why, so that the next person understands it.';
    throw new DomainError('input.invalid', message, { fields: [{ path: 'reason', message }] });
  }
  const answer = keep(write, current, outcome, input.reason);
  startPlan(write, answer, amounts);
  askForPlanWork(write, current, amounts, answer.id);
  return systemPlan(write.tx, systemId, write.now);
}

/** Leaves things as they are; the same advice comes again in a week where it still holds. */
export function dismissAdvice(write: Write, systemId: string, { key, reason }: DismissAdvice): SystemPlan {
  const current = currentAdvice(write, systemId, key);
  if (!proposes(current.advice.kind) && current.advice.kind !== 'pause') {
    throw new DomainError('rule.refused', 'This advice asks for no change, so there is nothing to dismiss.');
  }
  keep(write, current, 'dismissed', reason);
  return systemPlan(write.tx, systemId, write.now);
}

/** Takes the last answer back: the plan before it runs again, and the work that it asked for is off. */
export function takeAnswerBack(write: Write, adviceId: string): void {
  const answer = adviceRow(write.tx, adviceId);
  if (lastAnswer(write.tx, answer.systemId)?.id !== adviceId) {
    throw new DomainError('rule.refused', 'Only the last answer can be taken back.');
  }
  const plan = runningPlan(write.tx, answer.systemId);
  if (plan?.adviceId === adviceId) {
    const former = planBefore(write.tx, plan);
    write.tx.delete(dosingPlans).where(eq(dosingPlans.id, plan.id)).run();
    if (former) write.tx.update(dosingPlans).set({ toAt: null }).where(eq(dosingPlans.id, former.id)).run();
  }
  endTasksOf(write, adviceId);
  write.tx.update(dosingAdvice).set({ takenBackAt: write.now }).where(eq(dosingAdvice.id, adviceId)).run();
  write.audit({ action: 'advice.taken_back', entity: 'advice', entityId: adviceId, before: answer });
}

/** The advice of now, which must be the one that was read. */
function currentAdvice(write: Write, systemId: string, key: string): SystemPlan {
  const current = systemPlan(write.tx, systemId, write.now);
  if (isSameAdvice(key, current.key)) return current;
  throw new DomainError('rule.refused', 'The advice has changed since you opened it. Read it again.', {
    details: { key: current.key },
  });
}

function keep(write: Write, current: SystemPlan, outcome: AdviceRow['outcome'], reason: string): AdviceRow {
  const { systemId, advice, facts } = current;
  const row = write.tx
    .insert(dosingAdvice)
    .values({
      ...{ id: write.newId(), systemId, kind: advice.kind, rules: advice.rules, text: adviceAsText(current) },
      ...{ inputs: facts, advice, outcome, reason, at: write.now, by: write.actor.name },
    })
    .returning()
    .get();
  const { inputs: _, advice: __, ...after } = row;
  write.audit({ action: `advice.${outcome}`, entity: 'advice', entityId: row.id, after });
  return row;
}

function startPlan(write: Write, { id: adviceId, systemId }: AdviceRow, amounts: PlanAmounts): void {
  const former = runningPlan(write.tx, systemId);
  if (former) {
    write.tx.update(dosingPlans).set({ toAt: write.now }).where(eq(dosingPlans.id, former.id)).run();
  }
  const { strengthMeqL, limeGPerL, vinegarMlPerL, litresPerDay, supplements } = amounts;
  const plan = write.tx
    .insert(dosingPlans)
    .values({
      ...{ id: write.newId(), systemId, adviceId, fromAt: write.now, by: write.actor.name },
      ...{ strengthMeqL, limeGPerL, vinegarMlPerL, litresPerDay, supplements },
    })
    .returning()
    .get();
  write.audit({ action: 'dosing_plan.started', entity: 'dosing_plan', entityId: plan.id, after: plan });
}
