import { leaves, proposes } from '../../shared/domain/dosing-plan/advice-kind.ts';
import { limeGPerLOf } from '../../shared/domain/limewater.ts';
import type { Write } from '../db/write.ts';
import { systemPlan } from '../queries/plan.ts';
import { acceptAdvice, dismissAdvice } from '../services/plan-service.ts';
import { HEAT_FROM, HEAT_SYSTEM } from './heat.ts';
import { timeOn, type World } from './world.ts';

/** After the heat the grower follows the advice for that system for some weeks, every few days. */
const LOOKED_AFTER = { first: 2, last: 90, every: 3 } as const;
/** A plan of the grower's own, some weeks ago. */
const AHEAD = { system: 'B', daysAgo: 26 } as const;
const STRONGER = 1.04;
/** Advice that follows an answer at once is let pass. */
const QUIET_LOOKS = 4;

/** Answers to advice while a system's corals suffer and recover: what is advised first is used, the next is dismissed. */
export function planAnswers(world: World): void {
  const ahead = world.systems.find(({ spec }) => spec.code === AHEAD.system);
  const before = world.days.at(-AHEAD.daysAgo);
  if (ahead && before !== undefined && world.days.length > 2 * AHEAD.daysAgo) {
    world.agenda.put(timeOn(before, 9 * 60 + 10), world.staff.grower, (write) => decideOtherwise(write, ahead.id));
  }
  const system = world.systems.find(({ spec }) => spec.code === HEAT_SYSTEM);
  if (!system) return;
  const answers = { given: 0, quiet: 0 };
  for (let after = LOOKED_AFTER.first; after <= LOOKED_AFTER.last; after += LOOKED_AFTER.every) {
    const day = world.days.at(after - HEAT_FROM);
    if (day === undefined || world.days.length < HEAT_FROM) continue;
    world.agenda.put(timeOn(day, 9 * 60 + 20), world.staff.grower, (write) => look(write, system.id, answers));
  }
}

/** Before many frags went into a system, its grower decided on a little more than the advice, which was to leave it. */
function decideOtherwise(write: Write, systemId: string): void {
  const { advice, facts, key } = systemPlan(write.tx, systemId, write.now);
  if (!leaves(advice.kind) || !facts.limewater?.onlineMeqL) return;
  const limeGPerL = Number((STRONGER * limeGPerLOf(facts.limewater.onlineMeqL, facts.limewater.purity)).toFixed(2));
  const reason = 'Many frags go in this week: a little more ahead of them.';
  acceptAdvice(write, systemId, { key, changes: { limeGPerL }, reason });
}

function look(write: Write, systemId: string, answers: { given: number; quiet: number }): void {
  if (answers.given === 2) return;
  if (answers.quiet > 0) {
    answers.quiet -= 1;
    return;
  }
  const { advice, key } = systemPlan(write.tx, systemId, write.now);
  // A correction would ask for doses that the simulated grower does not give.
  if (!proposes(advice.kind) || advice.correction?.supplement) return;
  if (answers.given === 0) acceptAdvice(write, systemId, { key, reason: '' });
  else dismissAdvice(write, systemId, { key, reason: 'The corals still recover from the heat: wait for more tests.' });
  answers.given += 1;
  answers.quiet = QUIET_LOOKS;
}
