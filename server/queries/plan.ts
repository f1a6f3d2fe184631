import { asc, isNull } from 'drizzle-orm';
import type { SystemPlan } from '../../shared/contracts/plan.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { adviseDosing } from '../../shared/domain/dosing-plan/advice.ts';
import type { Advice, AdviceFacts } from '../../shared/domain/dosing-plan/facts.ts';
import type { Db } from '../db/client.ts';
import { systems } from '../db/schema/index.ts';
import { solveLinear } from '../outside/linear-solver.ts';
import { farmOf } from './farm.ts';
import { planFacts } from './plan-facts.ts';
import { lastAnswer, type PlanRow, runningPlan, toPlan } from './plan-rows.ts';
import { listReservoirs } from './reservoirs.ts';
import { systemRow, type SystemRow } from './systems.ts';
import { waterRules } from './water-rules.ts';

/** Dismissed advice comes again after so long where it still holds. */
const QUIET_DAYS = 7;
/** Less room than this part of a reservoir is no refill. */
const WORTH_FILLING = 0.2;

/** Advice on the dosing of every system in use. */
export function listPlans(db: Db, now: number): SystemPlan[] {
  return db
    .select()
    .from(systems)
    .where(isNull(systems.retiredAt))
    .orderBy(asc(systems.code))
    .all()
    .map((row) => planOf(db, row, now));
}

/** @throws {DomainError} `record.not_found` */
export function systemPlan(db: Db, systemId: string, now: number): SystemPlan {
  return planOf(db, systemRow(db, systemId), now);
}

function planOf(db: Db, system: SystemRow, now: number): SystemPlan {
  const rules = waterRules(farmOf(db));
  const facts = planFacts(db, system, rules, now);
  const advice = adviseDosing(facts, rules, solveLinear);
  const plan = runningPlan(db, system.id);
  return {
    ...{ systemId: system.id, systemCode: system.code, systemName: system.name, asOf: now },
    ...{ key: keyOf(advice), advice, facts, rules, plan: plan ? toPlan(db, plan) : null },
    dismissed: dismissalOf(db, system.id, advice, now),
    mix: mixFor(db, system.id, now, { advice, facts, plan }),
  };
}

/** What of an advice a person reads: its kind and its amounts. */
function keyOf({ kind, limewater, supplements, correction }: Advice): string {
  const amounts = [
    ...(limewater ? [limewater.limeGPerL, limewater.vinegarMlPerL] : []),
    ...supplements.map(({ amountPerDay }) => amountPerDay),
    ...(correction?.supplement ? [correction.supplement.amountPerDay] : []),
  ];
  return [kind, ...amounts.map((amount) => amount.toPrecision(4))].join(' ');
}

/** Amounts drift by a little from hour to hour, as demand is told anew: so much of them is the same advice. */
const SAME_PART = 0.05;
const SAME_AMOUNT = 0.02;

/** Whether what was read is what is advised now, but for what nobody would measure. */
export function isSameAdvice(readKey: string, currentKey: string): boolean {
  const [readKind, ...read] = readKey.split(' ');
  const [kind, ...current] = currentKey.split(' ');
  if (readKind !== kind || read.length !== current.length) return false;
  return current.every((text, index) => {
    const [now, then] = [Number(text), Number(read[index])];
    return Math.abs(now - then) <= Math.max(SAME_AMOUNT, SAME_PART * now);
  });
}

function dismissalOf(db: Db, systemId: string, { kind }: Advice, now: number): SystemPlan['dismissed'] {
  const answer = lastAnswer(db, systemId);
  if (answer?.outcome !== 'dismissed' || answer.kind !== kind) return null;
  const { id, at, by, reason } = answer;
  const until = at + QUIET_DAYS * MS_PER_DAY;
  return until > now ? { id, at, by, reason, until } : null;
}

/** The mix for the reservoir that should be filled next: what stands beside the one that is online, the emptiest first. */
function mixFor(
  db: Db,
  systemId: string,
  now: number,
  { advice, facts, plan }: { advice: Advice; facts: AdviceFacts; plan: PlanRow | undefined },
): SystemPlan['mix'] {
  const wanted = advice.kind === 'mix_plan' && plan ? plan : advice.limewater;
  if (!wanted || wanted.limeGPerL === 0 || !facts.limewater) return null;
  const [next] = listReservoirs(db, now, systemId)
    .filter(({ state, levelL, volumeL }) => state !== 'online' && volumeL - levelL > WORTH_FILLING * volumeL)
    .sort((a, b) => a.levelL / a.volumeL - b.levelL / b.volumeL);
  if (!next) return null;
  const waterL = next.volumeL - next.levelL;
  const { limeGPerL, vinegarMlPerL } = wanted;
  return {
    ...{ reservoirId: next.id, code: next.code, waterL },
    ...{ limeG: limeGPerL * waterL, vinegarMl: vinegarMlPerL * waterL },
  };
}
