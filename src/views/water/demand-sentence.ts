import type { Demand, LatestValue, LimeCeiling } from '@shared/contracts/water.ts';
import { CALCIUM_HYDROXIDE_G_PER_MOL } from '@shared/domain/limewater.ts';

/** A piece of a sentence; `strong` ones are the numbers that the page is about. */
export interface SentencePart {
  text: string;
  strong?: true;
}

export interface DemandFacts {
  demand: Demand;
  ceiling: LimeCeiling | null;
  netVolumeL: number;
  alkalinity: LatestValue | undefined;
}

/** How amounts are put into words, in the unit that the person chose. */
export interface DemandWords {
  /** A rate with its unit and error, "1.23 ± 0.09 dKH". */
  rate: (meqLPerDay: number, error: number) => string;
  /** A rate without unit, at as many decimals as the error allows. */
  bare: (meqLPerDay: number, error: number) => string;
  level: (meqL: number) => string;
}

export type Drift = 'unknown' | 'holds' | 'may slip' | 'may rise' | 'slips' | 'rises';

/** Below this part of its error a drift is not worth a word. */
const NOTHING = 0.35;

/** Whether alkalinity goes up or down with what is added now, and whether the tests can tell. */
export function driftOf(demand: Demand): Drift {
  if (!demand.enough) return 'unknown';
  const net = demand.supply - demand.demand;
  const error = halfWidth(demand);
  if (Math.abs(net) <= NOTHING * error) return 'holds';
  if (Math.abs(net) <= error) return net < 0 ? 'may slip' : 'may rise';
  return net < 0 ? 'slips' : 'rises';
}

/** What a system's alkalinity does and what to do about it, in plain words. */
export function demandSentence(facts: DemandFacts, words: DemandWords): SentencePart[] {
  const { demand } = facts;
  const told = demand.enough ? uses(demand, words) : [{ text: notEnough(demand) }];
  return [...told, ...bandPart(facts, words), ...advicePart(facts, words)];
}

type KnownDemand = Extract<Demand, { enough: true }>;

function halfWidth({ low, high }: KnownDemand): number {
  return (high - low) / 2;
}

function uses(demand: KnownDemand, words: DemandWords): SentencePart[] {
  const error = halfWidth(demand);
  const amount: SentencePart = { text: `${words.rate(demand.demand, error)} a day`, strong: true };
  if (demand.low <= 0) return [{ text: 'Uses too little to be told from nothing yet: ' }, amount, { text: '.' }];
  return [{ text: 'Uses ' }, amount, { text: `${carried(demand, words)}, ${outcome(demand, words)}.` }];
}

function carried(demand: KnownDemand, words: DemandWords): string {
  const error = halfWidth(demand);
  const limewater = words.bare(demand.limewater, error);
  const others = words.bare(demand.others, error);
  if (demand.limewater > 0 && demand.others > 0) {
    return ` and limewater carries ${limewater}, other supplements ${others}`;
  }
  if (demand.others > 0) return ` and supplements carry ${others}`;
  return demand.limewater > 0 ? ` and limewater carries ${limewater}` : ' and nothing is dosed';
}

function outcome(demand: KnownDemand, words: DemandWords): string {
  const error = halfWidth(demand);
  const change = words.bare(Math.abs(demand.supply - demand.demand), error);
  switch (driftOf(demand)) {
    case 'slips':
      return `so alkalinity slips ${change} a day`;
    case 'rises':
      return `so alkalinity rises ${change} a day`;
    case 'may slip':
      return `so alkalinity may slip ${change} a day, within the error of the tests`;
    case 'may rise':
      return `so alkalinity may rise ${change} a day, within the error of the tests`;
    default:
      return 'so alkalinity holds';
  }
}

function notEnough({ readings, windowDays }: Demand): string {
  const tests = readings === 0 ? 'no alkalinity test' : readings === 1 ? 'one alkalinity test' : `${readings} tests`;
  return `Not enough data yet to tell what it uses: ${tests} in the last ${windowDays} days, and three over at least two days are needed.`;
}

function bandPart({ alkalinity }: DemandFacts, words: DemandWords): SentencePart[] {
  if (!alkalinity?.band || (alkalinity.state !== 'below' && alkalinity.state !== 'above')) return [];
  const { value, state, band } = alkalinity;
  const end = state === 'below' ? band.low : band.high;
  return [
    {
      text: ` At ${words.level(value)} it is ${state} its band, which ${state === 'below' ? 'starts' : 'ends'} at ${words.level(end)}.`,
    },
  ];
}

/** The strength that would hold the level, or that limewater can't. Only where the tests do tell a drift. */
function advicePart({ demand, ceiling, netVolumeL }: DemandFacts, words: DemandWords): SentencePart[] {
  const drift = driftOf(demand);
  if (!demand.enough || !ceiling || (drift !== 'slips' && drift !== 'rises')) return [];
  const needed = demand.demand - demand.others;
  if (needed > ceiling.withVinegar) {
    const short = words.rate(needed - ceiling.withVinegar, 0);
    return [{ text: ` That is more than limewater can carry at today's evaporation, by ${short} a day.` }];
  }
  if (needed > ceiling.saturated) return [{ text: ' Saturated limewater with vinegar would hold it.' }];
  if (needed <= 0 || ceiling.evaporationLPerDay <= 0) return [];
  const gramsPerL = (((needed * netVolumeL) / ceiling.evaporationLPerDay) * CALCIUM_HYDROXIDE_G_PER_MOL) / 2000;
  return [{ text: ` Limewater of ${gramsPerL.toFixed(2)} g/L would hold it.` }];
}
