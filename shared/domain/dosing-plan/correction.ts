import { correctionDose } from '../correction-dose.ts';
import type { AdviceFacts, CorrectionAdvice, SupplementFact } from './facts.ts';
import type { WaterRules } from './rules.ts';

/** A day's correction below this is not worth a dose, meq/L. */
const LEAST_PER_DAY = 0.02;
/** What would take longer is not a correction: something else is wrong. */
const MOST_DAYS = 180;

/**
 * What brings a level that is too low back to the middle of its band: the cheapest supplement that raises alkalinity, on
 * top of what holds it. Limewater holds a level; it is too slow to raise one and can't do so apart from calcium.
 *
 * @param roomMeqL what may go in a day beside what holds the level, meq/L
 * @returns null where the level needs none, or where the water has no room for one
 */
export function correctionUp(
  { band, level, netVolumeL, supplements }: AdviceFacts,
  rules: WaterRules,
  roomMeqL: number,
): CorrectionAdvice | null {
  if (!band || !level) return null;
  const to = (band.low + band.high) / 2;
  const maxPerDay = Math.min(rules.mostChangePerDayMeqL, roomMeqL);
  if (to <= level.meqL || maxPerDay < LEAST_PER_DAY || to - level.meqL > MOST_DAYS * maxPerDay) return null;
  const supplement = cheapestAlkalinity(supplements);
  const from = level.meqL;
  const perUnit = supplement?.alkalinityMeq ?? 1;
  const { days, total, amountPerDay, risePerDay } = correctionDose({ from, to, maxPerDay, netVolumeL, perUnit });
  return {
    ...{ from, to, days, changePerDay: risePerDay },
    supplement: supplement
      ? {
          ...{ itemId: supplement.itemId, name: supplement.name, unit: supplement.unit },
          ...{ amountPerDay, total, bringsMeqL: risePerDay },
        }
      : null,
  };
}

/** A level that is too high is left to fall to the middle of its band: less goes in than the corals take. */
export function fallDown({ band, level, demand }: AdviceFacts, rules: WaterRules): CorrectionAdvice | null {
  if (!band || !level) return null;
  const to = (band.low + band.high) / 2;
  const fastest = Math.min(rules.mostChangePerDayMeqL, Math.max(0, demand?.meqLPerDay ?? 0));
  if (fastest < LEAST_PER_DAY || level.meqL <= to) return null;
  const days = Math.max(1, Math.ceil((level.meqL - to) / fastest - 1e-9));
  return { from: level.meqL, to, days, changePerDay: (to - level.meqL) / days, supplement: null };
}

/** Those that bring calcium too come last: a level that fell alone is raised alone. */
function cheapestAlkalinity(supplements: readonly SupplementFact[]): SupplementFact | null {
  const [first] = supplements
    .filter(({ alkalinityMeq }) => alkalinityMeq > 0)
    .sort((a, b) => Number(a.calciumMg > 0) - Number(b.calciumMg > 0) || costPerMeq(a) - costPerMeq(b));
  return first ?? null;
}

function costPerMeq({ cost, alkalinityMeq }: SupplementFact): number {
  return cost === null ? Infinity : cost / alkalinityMeq;
}
