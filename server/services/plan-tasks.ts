import type { SystemPlan } from '../../shared/contracts/plan.ts';
import { addDays, dayOf } from '../../shared/domain/days.ts';
import { systemTitle } from '../../shared/domain/system-title.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import type { PlanAmounts } from './plan-amounts.ts';
import { createTask } from './task-service.ts';

/** Titles are short, names of supplements may be long. */
const MOST_TITLE = 120;

/** Asks for the work that a plan means: the next mix, and each day of a correction. */
export function askForPlanWork(write: Write, plan: SystemPlan, amounts: PlanAmounts, adviceId: string): void {
  const today = dayOf(write.now, farmOf(write.tx).timeZone);
  const title = systemTitle({ code: plan.systemCode, name: plan.systemName });
  const task = { systemId: plan.systemId, parameter: null, dueMinute: null, assigneeId: null, assigneeRole: null };
  if (amounts.limeGPerL > 0) {
    const vinegar = amounts.vinegarMlPerL > 0 ? ` and ${amounts.vinegarMlPerL.toFixed(1)} mL of vinegar` : '';
    const work = `Mix limewater for ${title}: ${amounts.limeGPerL.toFixed(2)} g of lime${vinegar} a litre`;
    createTask(
      write,
      {
        ...{ ...task, kind: 'refill', title: work.slice(0, MOST_TITLE), reservoirId: plan.mix?.reservoirId ?? null },
        ...{ repeat: null, startsOn: today, note: 'By the dosing plan.' },
      },
      adviceId,
    );
  }
  const correction = plan.advice.correction;
  if (!correction?.supplement) return;
  const { name, unit, amountPerDay } = correction.supplement;
  const work = `Correct ${title}: ${Math.round(amountPerDay)} ${unit} of ${name}`;
  createTask(
    write,
    {
      ...{ ...task, kind: 'other', title: work.slice(0, MOST_TITLE), reservoirId: null, startsOn: today },
      repeat: { every: 'dates', dates: Array.from({ length: correction.days }, (_, index) => addDays(today, index)) },
      note: 'A correction of the dosing plan. Test before each dose, and stop once the level is in its band.',
    },
    adviceId,
  );
}
