import type { Carried, Demand, LatestValue, LimeCeiling } from '@shared/contracts/water.ts';
import { CALCIUM_HYDROXIDE_G_PER_MOL } from '@shared/domain/limewater.ts';
import { joinWords } from '@/formatting/plural.ts';

/** A piece of a sentence; `strong` ones are the numbers that the page is about. */
export interface SentencePart {
  text: string;
  strong?: true;
}

export interface DemandFacts {
  demand: Demand;
  carried: Carried;
  ceiling: LimeCeiling | null;
  netVolumeL: number;
  alkalinity: LatestValue | undefined;
  /** Tests that are all but left out, with their instants. */
  flagged?: readonly { at: number }[];
}

/** How amounts are put into words, in the unit that the person chose. */
export interface DemandWords {
  /** A rate with its unit and error, "1.23 ± 0.09 dKH". */
  rate: (meqLPerDay: number, error: number) => string;
  /** A rate without unit, at as many decimals as the error allows. */
  bare: (meqLPerDay: number, error: number) => string;
  level: (meqL: number) => string;
  /** A rate as `bare` shows it, back in meq/L, so that what is shown adds up. */
  rounded: (meqLPerDay: number, error: number) => number;
}

export type Drift = 'unknown' | 'holds' | 'may slip' | 'may rise' | 'slips' | 'rises';

/** Below this part of its error a drift is not worth a word. */
const NOTHING = 0.35;

/** What is known of a system's give and take now. */
export interface GiveAndTake {
  demand: Demand;
  carried: Carried;
}

/** Change a day with what is given now, meq/L; null where demand or limewater is not known. */
export function netOf({ demand, carried }: GiveAndTake): { change: number; error: number } | null {
  if (!demand.enough || carried.limewater === null) return null;
  const given = carried.limewater + carried.others + carried.waterChanges;
  return { change: given - demand.demand, error: halfWidth(demand) };
}

/** Whether alkalinity goes up or down with what is given now, and whether the tests can tell. */
export function driftOf(known: GiveAndTake): Drift {
  const found = netOf(known);
  if (!found) return 'unknown';
  const { change: net, error } = found;
  if (Math.abs(net) <= NOTHING * error) return 'holds';
  if (Math.abs(net) <= error) return net < 0 ? 'may slip' : 'may rise';
  return net < 0 ? 'slips' : 'rises';
}

/** What a system's alkalinity does and what to do about it, in plain words. */
export function demandSentence(facts: DemandFacts, words: DemandWords): SentencePart[] {
  const { demand, carried } = facts;
  const told = demand.enough ? uses({ demand, carried }, words) : [{ text: notEnough(demand) }];
  return [...told, ...bandPart(facts, words), ...advicePart(facts, words), ...flaggedPart(facts)];
}

type KnownDemand = Extract<Demand, { enough: true }>;

function halfWidth({ low, high }: KnownDemand): number {
  return (high - low) / 2;
}

export interface Known {
  demand: KnownDemand;
  carried: Carried;
}

function uses({ demand, carried }: Known, words: DemandWords): SentencePart[] {
  const error = halfWidth(demand);
  const amount: SentencePart = { text: `${words.rate(demand.demand, error)} a day`, strong: true };
  if (demand.low <= 0) return [{ text: 'Uses too little to be told from nothing yet: ' }, amount, { text: '.' }];
  const given = carriers({ demand, carried }, words);
  if (carried.limewater === null) {
    const known = given === '' ? '' : ` and ${given}`;
    return [
      { text: 'Uses ' },
      amount,
      { text: `${known}. What limewater carries is not known: log the level of its reservoir.` },
    ];
  }
  return [
    { text: 'Uses ' },
    amount,
    { text: ` and ${given || 'nothing is dosed'}, ${outcome({ demand, carried }, words)}.` },
  ];
}

/** Who carries how much; what rounds to nothing is not named. */
function carriers({ demand, carried }: Known, words: DemandWords): string {
  const says = (rate: number) => words.bare(Math.abs(rate), halfWidth(demand));
  const counts = (rate: number | null): rate is number => rate !== null && /[1-9]/.test(says(rate));
  const { limewater, others, waterChanges } = carried;
  const first = counts(limewater) ? [`limewater carries ${says(limewater)}`] : [];
  const alone = first.length === 0;
  const second = counts(others)
    ? [alone ? `supplements carry ${says(others)}` : `other supplements ${says(others)}`]
    : [];
  const isFirst = alone && second.length === 0;
  const brought = counts(waterChanges) && waterChanges > 0;
  const third = brought ? [`water changes ${isFirst ? 'bring ' : ''}${says(waterChanges)}`] : [];
  const lost = counts(waterChanges) && waterChanges < 0;
  const fourth = lost ? [`water changes take ${says(waterChanges)}`] : [];
  return joinWords([...first, ...second, ...third, ...fourth]);
}

function outcome({ demand, carried }: Known, words: DemandWords): string {
  const change = words.bare(Math.abs(shownChange({ demand, carried }, words)), halfWidth(demand));
  switch (driftOf({ demand, carried })) {
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

/** The difference of the figures as they are shown. */
export function shownChange({ demand, carried }: Known, words: DemandWords): number {
  const rounded = (rate: number | null) => words.rounded(rate ?? 0, halfWidth(demand));
  const { limewater, others, waterChanges } = carried;
  return rounded(limewater) + rounded(others) + rounded(waterChanges) - rounded(demand.demand);
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

/** Tests of the stretch that demand is told from; older ones matter to the chart alone. */
function flaggedPart({ demand, flagged = [] }: DemandFacts): SentencePart[] {
  const count = flagged.filter(({ at }) => at >= demand.from).length;
  if (count === 0) return [];
  const tests = count === 1 ? 'One test is too far off to count' : `${count} tests are too far off to count`;
  return [{ text: ` ${tests}: look at the checks below.` }];
}

/** The strength of limewater that would hold the level, g of hydroxide in a litre; null where that is not known. */
export function holdingGPerL({ demand, carried, ceiling, netVolumeL }: Omit<DemandFacts, 'alkalinity'>): number | null {
  if (!demand.enough || demand.low <= 0 || !ceiling || ceiling.evaporationLPerDay <= 0) return null;
  const needed = demand.demand - carried.others - carried.waterChanges;
  if (needed <= 0 || needed > ceiling.saturated) return null;
  return (((needed * netVolumeL) / ceiling.evaporationLPerDay) * CALCIUM_HYDROXIDE_G_PER_MOL) / 2000;
}

/** The strength that would hold the level, or that limewater can't. Only where the tests do tell a drift. */
function advicePart(facts: DemandFacts, words: DemandWords): SentencePart[] {
  const { demand, carried, ceiling } = facts;
  const drift = driftOf({ demand, carried });
  if (!demand.enough || !ceiling || (drift !== 'slips' && drift !== 'rises')) return [];
  const needed = demand.demand - carried.others - carried.waterChanges;
  if (needed > ceiling.withVinegar) {
    const short = words.rate(needed - ceiling.withVinegar, 0);
    return [{ text: ` That is more than limewater can carry at today's evaporation, by ${short} a day.` }];
  }
  if (needed > ceiling.saturated) return [{ text: ' Saturated limewater with vinegar would hold it.' }];
  const gramsPerL = holdingGPerL(facts);
  return gramsPerL === null ? [] : [{ text: ` Limewater of ${gramsPerL.toFixed(2)} g/L would hold it.` }];
}
