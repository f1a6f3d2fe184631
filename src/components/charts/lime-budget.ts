/** What a system can be given a day, in one unit of alkalinity per day. Each figure reaches from zero. */
export interface LimeBudgetFigures {
  /** What limewater carries now. */
  now: number;
  /** What it would carry saturated, at the same evaporation. */
  fullStrength: number;
  /** With the planned vinegar too. */
  withVinegar: number;
  /** What other supplements give on top. */
  other: number;
  demand: { value: number; error: number } | null;
}

export type BudgetPart = 'now' | 'possible' | 'vinegar' | 'other';

export interface BudgetSegment {
  part: BudgetPart;
  from: number;
  to: number;
}

/** The parts that exist, one after another; a part that adds nothing is left out. */
export function budgetSegments({ now, fullStrength, withVinegar, other }: LimeBudgetFigures): BudgetSegment[] {
  const reach = Math.max(now, fullStrength);
  const carried = Math.max(reach, withVinegar);
  const parts: BudgetSegment[] = [
    { part: 'now', from: 0, to: now },
    { part: 'possible', from: now, to: reach },
    { part: 'vinegar', from: reach, to: carried },
    { part: 'other', from: carried, to: carried + other },
  ];
  return parts.filter(({ from, to }) => to > from);
}

/** The end of the scale: everything that is drawn fits, the uncertainty of the demand too. */
export function budgetReach(figures: LimeBudgetFigures): number {
  const demand = figures.demand ? figures.demand.value + figures.demand.error : 0;
  const supply = budgetSegments(figures).at(-1)?.to ?? 0;
  return Math.max(supply, demand * 1.04, 0.1);
}
