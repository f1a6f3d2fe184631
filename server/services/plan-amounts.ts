import type { AcceptAdvice, SystemPlan } from '../../shared/contracts/plan.ts';
import { hourlyRoom } from '../../shared/domain/dosing-plan/hourly-room.ts';
import { leaves } from '../../shared/domain/dosing-plan/advice-kind.ts';
import { limeGPerLOf, limewaterCeiling, mixLimewater } from '../../shared/domain/limewater.ts';
import { DomainError } from '../../shared/errors.ts';

export interface PlanAmounts {
  isChanged: boolean;
  strengthMeqL: number;
  limeGPerL: number;
  vinegarMlPerL: number;
  litresPerDay: number;
  supplements: { itemId: string; amountPerDay: number }[];
}

/** What so little of a litre's lime stays undissolved is the scale's own error, g. */
const LEFT_OVER_G = 0.02;

/**
 * The amounts of a plan: the advice's, or what the person made of them, which may not pass a limit either.
 *
 * @throws {DomainError} `input.invalid` at the field
 */
export function planAmounts(current: SystemPlan, changes: AcceptAdvice['changes']): PlanAmounts {
  const { limewater } = current.advice;
  const { limeGPerL } = asItIs(current);
  const advised = {
    limeGPerL: limewater?.limeGPerL ?? limeGPerL,
    vinegarMlPerL: limewater?.vinegarMlPerL ?? 0,
    supplements: current.advice.supplements.map(({ itemId, amountPerDay }) => ({ itemId, amountPerDay })),
  };
  const chosen = {
    limeGPerL: changes?.limeGPerL ?? advised.limeGPerL,
    vinegarMlPerL: changes?.vinegarMlPerL ?? advised.vinegarMlPerL,
    supplements: (changes?.supplements ?? advised.supplements).filter(({ amountPerDay }) => amountPerDay > 0),
  };
  const isChanged = changes !== undefined && JSON.stringify(chosen) !== JSON.stringify(advised);
  const litresPerDay = limewater?.litresPerDay ?? current.facts.evaporationLPerDay ?? 0;
  const strengthMeqL = isChanged ? strengthOf(current, chosen) : (limewater?.strengthMeqL ?? 0);
  const amounts = { ...chosen, isChanged, strengthMeqL, litresPerDay };
  if (isChanged) assertRoom(current, amounts);
  return amounts;
}

/** What advice that leaves the dosing as it is stands for: the strength that is online. */
function asItIs({ advice, facts }: SystemPlan): { limeGPerL: number } {
  if (!leaves(advice.kind) || !facts.limewater) return { limeGPerL: 0 };
  return { limeGPerL: limeGPerLOf(facts.limewater.onlineMeqL ?? 0, facts.limewater.purity) };
}

/** Strength of a litre of the mix; what settles of it is refused, since it would only be wasted. */
function strengthOf({ facts }: SystemPlan, { limeGPerL, vinegarMlPerL }: { limeGPerL: number; vinegarMlPerL: number }) {
  if (limeGPerL === 0) return 0;
  if (!facts.limewater) throw invalid('changes.limeGPerL', 'This system has no reservoir for limewater.');
  const { purity, temperatureC, acidPercent } = facts.limewater;
  const acid = acidPercent === null ? {} : { acidPercent };
  const mix = mixLimewater({
    ...{ waterL: 1, limeG: limeGPerL, purity, temperatureC, ...acid },
    vinegarMl: acidPercent === null ? 0 : vinegarMlPerL,
  });
  if (mix.undissolvedG > LEFT_OVER_G) {
    const most = mix.limeToSaturateG.toFixed(2);
    throw invalid('changes.limeGPerL', `At most ${most} g dissolve in a litre of this mix. Enter less.`);
  }
  return mix.alkalinityMeqL;
}

function assertRoom({ facts, rules, advice }: SystemPlan, amounts: PlanAmounts): void {
  const room = hourlyRoom(facts.water, rules);
  const hours = advice.limewater?.hours ?? 24;
  const roomMeqL = room === null ? rules.mostChangePerDayMeqL : room.meqL * hours;
  const bySupplements = amounts.supplements.reduce((sum, { itemId, amountPerDay }, index) => {
    const item = facts.supplements.find((each) => each.itemId === itemId);
    if (!item) throw invalid(`changes.supplements.${index}.itemId`, 'Choose a supplement of the list.');
    return sum + (amountPerDay * item.alkalinityMeq) / facts.netVolumeL;
  }, 0);
  const byLimewater = limewaterCeiling(amounts.litresPerDay, amounts.strengthMeqL, facts.netVolumeL);
  if (byLimewater + bySupplements <= roomMeqL + 1e-9) return;
  const field = bySupplements > byLimewater ? 'changes.supplements' : 'changes.limeGPerL';
  throw invalid(field, 'So much in a day would lift the pH or the saturation above your limits. Enter less.');
}

function invalid(path: string, message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path, message }] });
}
