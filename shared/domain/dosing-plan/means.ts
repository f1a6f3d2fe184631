import { USUAL_ACID_PERCENT } from '../limewater.ts';
import { saturatedStrength } from '../limewater-ceiling.ts';
import type { Means } from './cheapest-mix.ts';
import type { AdviceFacts, AdviceKind, AdviceRule } from './facts.ts';
import type { WaterRules } from './rules.ts';

/** Above what any water and vinegar hold: no limit but solubility. */
const NO_LIMIT_MEQ_L = 1000;

/** What has no price counts so many times the dearest known one, so that it comes last. */
const UNPRICED = 10;

export interface MeansFound {
  means: Means;
  /** The strength that limewater may not pass, and the rule that says so; null without limewater. */
  mostStrength: { meqL: number; rule: AdviceRule } | null;
}

/** What the system may be given under the rules. Without known evaporation limewater can't be reckoned with. */
export function meansOf(
  facts: AdviceFacts,
  rules: WaterRules,
  { kind, roomMeqL }: { kind: AdviceKind; roomMeqL: number },
): MeansFound {
  const { limewater, evaporationLPerDay, netVolumeL } = facts;
  const price = priceList(facts);
  const supplements = facts.supplements
    .filter(({ alkalinityMeq, calciumMg }) => alkalinityMeq > 0 || calciumMg > 0)
    .map(({ itemId, alkalinityMeq, calciumMg, cost }) => ({
      ...{ itemId, alkalinityMeq, calciumMg },
      cost: cost ?? price.unknown(alkalinityMeq + calciumMg / 20),
    }));
  if (!limewater || !evaporationLPerDay) {
    return { means: { netVolumeL, limewater: null, supplements, roomMeqL }, mostStrength: null };
  }
  const { temperatureC, purity, acidPercent } = limewater;
  const mostStrength = strengthLimit(facts, rules, kind);
  return {
    mostStrength,
    means: {
      ...{ netVolumeL, supplements, roomMeqL },
      limewater: {
        ...{ litresPerDay: evaporationLPerDay, temperatureC, purity, acidPercent },
        // The rule is told for 5 % vinegar; a stronger one needs less of it.
        mostVinegarMlPerL: (rules.mostVinegarMlPerL * USUAL_ACID_PERCENT) / (acidPercent ?? USUAL_ACID_PERCENT),
        mostStrengthMeqL: mostStrength?.meqL ?? NO_LIMIT_MEQ_L,
        limeCost: limewater.limeCost ?? price.unknown(25),
        vinegarCost: limewater.vinegarCost ?? price.unknown(1),
      },
    },
  };
}

/** Whether a cost a day can be told. */
export function pricesKnown({ limewater, supplements }: AdviceFacts): boolean {
  const limePrice = limewater === null ? 0 : limewater.limeCost;
  const vinegarPrice = limewater?.acidPercent == null ? 0 : limewater.vinegarCost;
  return [limePrice, vinegarPrice, ...supplements.map(({ cost }) => cost)].every((cost) => cost !== null);
}

/** Strength rises in small steps from what is online, and starts low where nothing was; it may fall at once. */
function strengthLimit({ limewater }: AdviceFacts, rules: WaterRules, kind: AdviceKind): MeansFound['mostStrength'] {
  if (!limewater) return null;
  const saturated = saturatedStrength(0, limewater.temperatureC);
  const online = limewater.onlineMeqL;
  if (kind === 'start' || online === null) return { meqL: rules.startStrength * saturated, rule: 'start_strength' };
  return { meqL: online + rules.strengthStep * saturated, rule: 'small_step' };
}

/** A price for what has none, so that it is taken only where what has one can't do. */
function priceList({ limewater, supplements }: AdviceFacts): { unknown: (meq: number) => number } {
  const perMeq = [
    ...supplements.flatMap(({ cost, alkalinityMeq, calciumMg }) => {
      const meq = alkalinityMeq + calciumMg / 20;
      return cost !== null && meq > 0 ? [cost / meq] : [];
    }),
    ...(limewater?.limeCost ? [limewater.limeCost / 25] : []),
  ];
  const dearest = perMeq.length > 0 ? Math.max(...perMeq) : 1;
  return { unknown: (meq) => UNPRICED * dearest * meq };
}
