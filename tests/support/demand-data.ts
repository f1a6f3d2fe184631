import { MS_PER_DAY } from '../../shared/domain/days.ts';
import type { AlkalinityReading, DemandEstimate, DemandInputs } from '../../shared/domain/demand.ts';
import type { SupplyInterval } from '../../shared/domain/reservoir-use.ts';

/** The instant a number of days after the start. */
export const day = (count: number) => count * MS_PER_DAY;

export const reading = (at: number, meqL: number, sd = 0.05): AlkalinityReading => ({ at: day(at), meqL, sd });

/** An even supply between two days, meq/L a day. */
export const steady = (from: number, to: number, perDay: number): SupplyInterval => ({
  ...{ from: day(from), to: day(to), meqL: perDay * (to - from) },
});

export const inputs = (changes: Partial<DemandInputs>): DemandInputs => ({
  ...{ readings: [], supply: [], waterChanges: [] },
  ...changes,
});

/** The estimate, where there is one; fails the test where there is none. */
export function known(estimate: DemandEstimate): Extract<DemandEstimate, { enough: true }> {
  if (!estimate.enough) throw new Error(`Expected an estimate, but: ${estimate.reason}`);
  return estimate;
}
