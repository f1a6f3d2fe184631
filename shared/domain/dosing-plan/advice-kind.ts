import type { AdviceFacts, AdviceKind } from './facts.ts';
import type { HourlyRoom } from './hourly-room.ts';
import type { WaterRules } from './rules.ts';

/**
 * What kind of advice a system needs, the most pressing first: water over a limit, then a level out of its band, then what
 * is missing to go by, then what was decided already, and only then whether the dosing itself should change.
 *
 * @param room what the water takes in an hour; null where its values can't all be true
 */
export function adviceKind(facts: AdviceFacts, rules: WaterRules, room: HourlyRoom | null): AdviceKind {
  if (room?.meqL === 0 && !facts.assumed.includes('phNbs')) return 'pause';
  return outOfBand(facts) ?? missing(facts) ?? settled(facts, rules);
}

/** The kinds that name amounts, which can be taken as a plan. */
export function proposes(kind: AdviceKind): boolean {
  return kind === 'start' || kind === 'change' || kind === 'correct_low' || kind === 'correct_high';
}

/** The kinds that leave the dosing as it is, where a person may decide otherwise all the same. */
export function leaves(kind: AdviceKind): boolean {
  return kind === 'hold' || kind === 'wait_after_change' || kind === 'mix_plan';
}

/** Only where the tests leave no doubt: a level that may as well be inside needs no correction. */
function outOfBand({ band, level }: AdviceFacts): AdviceKind | null {
  if (!band || !level) return null;
  if (level.meqL + level.error < band.low) return 'correct_low';
  return level.meqL - level.error > band.high ? 'correct_high' : null;
}

function missing({ demand, plan, limewater, given }: AdviceFacts): AdviceKind | null {
  if (!demand) return 'wait_for_tests';
  if (plan && !plan.mixed) return 'mix_plan';
  const isOnline = limewater !== null && limewater.onlineMeqL !== null;
  return isOnline && given.limewater === null ? 'wait_for_levels' : null;
}

function settled({ demand, given, limewater, steady, testsSinceChange }: AdviceFacts, rules: WaterRules): AdviceKind {
  if (!demand) return 'wait_for_tests';
  const supplied = (given.limewater ?? 0) + given.others + given.waterChanges;
  const isNew = limewater !== null && limewater.onlineMeqL === null && given.others === 0;
  if (isNew && demand.low > given.waterChanges) return 'start';
  if (steady.enough && steady.steady) return 'hold';
  if (testsSinceChange < rules.testsBeforeChange) return 'wait_after_change';
  return supplied >= demand.low && supplied <= demand.high ? 'hold' : 'change';
}
