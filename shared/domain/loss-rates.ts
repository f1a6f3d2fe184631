/** A stretch of a plug's life, in days since the cut, and whether it was lost at its end. */
export interface Life {
  line: string;
  fromDay: number;
  toDay: number;
  lost: boolean;
}

export interface LossRates {
  /** How many losses a plug of a line has between two ages, on average; its chance to live through is e to the minus this. */
  expected: (line: string, fromDay: number, toDay: number) => number;
}

/** Ages at which losses change most, days since the cut (from memory: half of all losses fall in the first 14 days). */
const AGES = [0, 7, 14, 28, 60, 120];
/** What a farm without records is taken to lose, per plug and day (from memory: about 8 % in half a year). */
const BEFORE_PER_DAY = 0.0005;

interface Tally {
  lost: number;
  days: number;
}

/**
 * How often plugs of each line are lost at each age. A line with few records leans to the farm's own rate as if it had
 * seen one loss at that rate more (a gamma prior on a Poisson rate); the farm leans to what is usual likewise.
 *
 * @see Gelman et al. 2013, Bayesian Data Analysis, section 2.6
 */
export function lossRates(lives: readonly Life[]): LossRates {
  const farm = AGES.map((): Tally => ({ lost: 0, days: 0 }));
  const lines = new Map<string, Tally[]>();
  for (const life of lives) {
    const own = lines.get(life.line) ?? AGES.map((): Tally => ({ lost: 0, days: 0 }));
    lines.set(life.line, own);
    addTo(farm, life);
    addTo(own, life);
  }
  const farmRates = farm.map((tally) => leaned(tally, BEFORE_PER_DAY));
  const rates = new Map(
    [...lines].map(([line, own]) => [line, own.map((tally, index) => leaned(tally, farmRates[index] ?? 0))]),
  );
  return {
    expected: (line, fromDay, toDay) => {
      const perDay = rates.get(line) ?? farmRates;
      return perDay.reduce((sum, rate, index) => sum + rate * daysWithin(index, fromDay, toDay), 0);
    },
  };
}

function addTo(tallies: readonly Tally[], { fromDay, toDay, lost }: Life): void {
  tallies.forEach((tally, index) => {
    tally.days += daysWithin(index, fromDay, toDay);
    if (lost && toDay >= (AGES[index] ?? 0) && toDay < (AGES[index + 1] ?? Infinity)) tally.lost += 1;
  });
}

function daysWithin(index: number, fromDay: number, toDay: number): number {
  const [start = 0, end = Infinity] = [AGES[index], AGES[index + 1]];
  return Math.max(0, Math.min(toDay, end) - Math.max(fromDay, start));
}

function leaned({ lost, days }: Tally, towardsPerDay: number): number {
  return (lost + 1) / (days + 1 / towardsPerDay);
}
