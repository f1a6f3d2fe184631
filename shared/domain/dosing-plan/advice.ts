import { CALCIUM_MG_PER_MEQ } from '../dose-effect.ts';
import { CALCIUM_HYDROXIDE_G_PER_MOL, limewaterCeiling, USUAL_ACID_PERCENT } from '../limewater.ts';
import { saturatedStrength } from '../limewater-ceiling.ts';
import { adviceKind, proposes } from './advice-kind.ts';
import { cheapestMix, type Mix } from './cheapest-mix.ts';
import { correctionUp, fallDown } from './correction.ts';
import type { Advice, AdviceFacts, AdviceKind, AdviceRule, LimewaterAdvice, SupplementAdvice } from './facts.ts';
import { hourlyRoom, type HourlyRoom } from './hourly-room.ts';
import type { LinearSolver } from './linear-programme.ts';
import { meansOf, pricesKnown } from './means.ts';
import type { WaterRules } from './rules.ts';

const DAY_HOURS = 24;
const NIGHT_HOURS = 12;
/** What is within so little of a limit has reached it: the solver's own tolerance with room to spare. */
const REACHED = 1e-5;

/**
 * Advice on a system's dosing from all that is known of it: what to do and, where that is to dose otherwise, the cheapest
 * amounts that hold the level without passing a limit.
 *
 * @param solve what solves linear programmes
 */
export function adviseDosing(facts: AdviceFacts, rules: WaterRules, solve: LinearSolver): Advice {
  const room = hourlyRoom(facts.water, rules);
  const kind = adviceKind(facts, rules, room);
  const ceilingShare = shareOfCeiling(facts);
  const seen: AdviceRule[] = [
    ...(facts.assumed.includes('phNbs') ? (['ph_assumed'] as const) : []),
    ...(room === null ? (['water_doubtful'] as const) : []),
    ...(ceilingShare !== null && ceilingShare >= rules.secondMethodAt ? (['second_method'] as const) : []),
  ];
  const asItIs: Advice = {
    ...{ kind, rules: [...rulesOf(kind, facts, room), ...seen] },
    ...{ targetMeqL: null, limewater: null, supplements: [], correction: null },
    ...{ shortMeqL: 0, calciumDriftMgL: 0, ceilingShare, costPerDayMicro: null },
  };
  return proposes(kind) ? propose(asItIs, facts, rules, room, solve) : asItIs;
}

function propose(
  advice: Advice,
  facts: AdviceFacts,
  rules: WaterRules,
  room: HourlyRoom | null,
  solve: LinearSolver,
): Advice {
  const isNight = facts.water.phNbs >= rules.nightPh && !facts.assumed.includes('phNbs') && facts.limewater !== null;
  const hours = isNight ? NIGHT_HOURS : DAY_HOURS;
  // Where the water's values can't be true, a day's room is what a correction may bring at most.
  const roomMeqL = room === null ? rules.mostChangePerDayMeqL : room.meqL * hours;
  const fall = advice.kind === 'correct_high' ? fallDown(facts, rules) : null;
  const holding = Math.max(0, (facts.demand?.meqLPerDay ?? 0) - facts.given.waterChanges);
  const targetMeqL = Math.max(0, holding + (fall?.changePerDay ?? 0));
  const { means, mostStrength } = meansOf(facts, rules, { kind: advice.kind, roomMeqL });
  const mix = cheapestMix(means, { ...calciumOf(targetMeqL, rules), alkalinityMeqL: targetMeqL }, solve);

  const limewater = limewaterOf(facts, mix, hours);
  const supplements = supplementsOf(facts, mix);
  const brought = targetMeqL - mix.shortMeqL;
  const rise = advice.kind === 'correct_low' ? correctionUp(facts, rules, roomMeqL - brought) : null;
  const reached: AdviceRule[] = [
    ...(limewater && isFull(limewater, facts) ? (['saturation'] as const) : []),
    ...(limewater && mostStrength && limewater.strengthMeqL >= mostStrength.meqL - REACHED ? [mostStrength.rule] : []),
    ...(brought >= roomMeqL - REACHED && room?.stoppedBy === 'ph' ? (['ph_limit'] as const) : []),
    ...(brought >= roomMeqL - REACHED && room?.stoppedBy === 'omega' ? (['omega_limit'] as const) : []),
    ...(isNight ? (['night'] as const) : []),
    ...(facts.limewater !== null && facts.evaporationLPerDay === null ? (['evaporation'] as const) : []),
    ...(mix.calciumOffMgL > REACHED ? (['calcium_drift'] as const) : []),
    ...(mix.shortMeqL > REACHED ? (['short'] as const) : []),
    ...(rise && rise.supplement === null ? (['no_supplement'] as const) : []),
    ...(pricesKnown(facts) ? [] : (['price_unknown'] as const)),
  ];
  return {
    ...advice,
    ...{ rules: [...advice.rules, ...reached], targetMeqL, limewater, supplements, correction: rise ?? fall },
    ...{ shortMeqL: mix.shortMeqL, calciumDriftMgL: mix.calciumOffMgL },
    costPerDayMicro: pricesKnown(facts) ? Math.round(mix.cost) : null,
  };
}

function rulesOf(kind: AdviceKind, facts: AdviceFacts, room: HourlyRoom | null): AdviceRule[] {
  switch (kind) {
    case 'pause':
      return [room?.stoppedBy === 'omega' ? 'omega_limit' : 'ph_limit'];
    case 'correct_low':
    case 'correct_high':
      return ['correct_first'];
    case 'start':
      return ['start_strength'];
    case 'wait_after_change':
      return ['enough_tests'];
    case 'hold':
      return [facts.steady.enough && facts.steady.steady ? 'steady' : 'within_error'];
    default:
      return [];
  }
}

/** Skeleton takes calcium with alkalinity, so that is what must come with it. */
function calciumOf(alkalinityMeqL: number, { calciumDriftMgL }: WaterRules) {
  return { calciumMgL: alkalinityMeqL * CALCIUM_MG_PER_MEQ, calciumToleranceMgL: calciumDriftMgL };
}

function limewaterOf(
  { evaporationLPerDay, limewater, netVolumeL }: AdviceFacts,
  { limeGPerDay, vinegarMlPerDay }: Mix,
  hours: 12 | 24,
): LimewaterAdvice | null {
  if (!limewater || !evaporationLPerDay) return null;
  const strengthMeqL = (limeGPerDay * limewater.purity * 2000) / (CALCIUM_HYDROXIDE_G_PER_MOL * evaporationLPerDay);
  return {
    ...{ litresPerDay: evaporationLPerDay, strengthMeqL, hours },
    limeGPerL: limeGPerDay / evaporationLPerDay,
    vinegarMlPerL: vinegarMlPerDay / evaporationLPerDay,
    bringsMeqL: limewaterCeiling(evaporationLPerDay, strengthMeqL, netVolumeL),
  };
}

function isFull({ strengthMeqL, vinegarMlPerL }: LimewaterAdvice, { limewater }: AdviceFacts): boolean {
  if (!limewater || strengthMeqL === 0) return false;
  const fivePercent = (vinegarMlPerL * (limewater.acidPercent ?? 0)) / USUAL_ACID_PERCENT;
  return strengthMeqL >= saturatedStrength(fivePercent, limewater.temperatureC) - REACHED;
}

function supplementsOf({ supplements, netVolumeL }: AdviceFacts, { amounts }: Mix): SupplementAdvice[] {
  return amounts.flatMap(({ itemId, perDay }) => {
    const found = supplements.find((each) => each.itemId === itemId);
    if (!found) return [];
    const { name, unit, alkalinityMeq } = found;
    return [{ itemId, name, unit, amountPerDay: perDay, bringsMeqL: (perDay * alkalinityMeq) / netVolumeL }];
  });
}

function shareOfCeiling({ demand, given, evaporationLPerDay, limewater, netVolumeL }: AdviceFacts): number | null {
  if (!demand || !limewater || !evaporationLPerDay) return null;
  const strongest = saturatedStrength(0, limewater.temperatureC);
  const ceiling = limewaterCeiling(evaporationLPerDay, strongest, netVolumeL);
  return Math.max(0, demand.meqLPerDay - given.waterChanges) / ceiling;
}
