import { MS_PER_DAY } from '../days.ts';
import { trackDemand } from './track-demand.ts';

/** A demand problem in days and any unit of level, free of dates. */
export interface DayDemandInputs {
  /** [day, level]. */
  readings: readonly (readonly [number, number])[];
  /** [from day, to day, supply a day]. */
  supply: readonly (readonly [number, number, number])[];
  /** [day, fraction, level of the new water]. */
  waterChanges: readonly (readonly [number, number, number])[];
  testSd: number;
}

/** Estimates at the days of the readings, in their order of time. */
export interface DayDemand {
  days: number[];
  /** From the data up to each day. */
  level: number[];
  demand: number[];
  demandSd: number[];
  /** From all data. */
  demandSmoothed: number[];
  demandSmoothedSd: number[];
  flagged: boolean[];
}

/**
 * {@link trackDemand} with days for instants and one error for all tests.
 *
 * @throws {DomainError} `domain.out_of_range` for an error that is not above zero, or a value that is no number
 */
export function demandByDay({ readings, supply, waterChanges, testSd }: DayDemandInputs): DayDemand {
  const { points } = trackDemand({
    readings: readings.map(([day, value]) => ({ at: day * MS_PER_DAY, value, sd: testSd })),
    supply: supply.map(([from, to, perDay]) => ({
      ...{ from: from * MS_PER_DAY, to: to * MS_PER_DAY, meqL: perDay * (to - from) },
    })),
    waterChanges: waterChanges.map(([day, fraction, value]) => ({ at: day * MS_PER_DAY, fraction, value })),
  });
  return {
    days: points.map(({ at }) => at / MS_PER_DAY),
    level: points.map(({ level }) => level.value),
    demand: points.map(({ demand }) => demand.value),
    demandSd: points.map(({ demand }) => demand.sd),
    demandSmoothed: points.map(({ smoothedDemand }) => smoothedDemand.value),
    demandSmoothedSd: points.map(({ smoothedDemand }) => smoothedDemand.sd),
    flagged: points.map(({ flagged }) => flagged),
  };
}
