import { MS_PER_DAY } from '../../shared/domain/days.ts';
import type { DemandInputs, LevelReading } from '../../shared/domain/demand/inputs.ts';
import type { SupplyInterval } from '../../shared/domain/reservoir-use.ts';

/** The instant a number of days after the start. */
export const day = (count: number) => count * MS_PER_DAY;

export const reading = (at: number, value: number, sd = 0.05): LevelReading => ({ at: day(at), value, sd });

/** An even supply between two days, so much a day. */
export const steady = (from: number, to: number, perDay: number): SupplyInterval => ({
  ...{ from: day(from), to: day(to), meqL: perDay * (to - from) },
});

export const inputs = (changes: Partial<DemandInputs>): DemandInputs => ({
  ...{ readings: [], supply: [], waterChanges: [] },
  ...changes,
});
