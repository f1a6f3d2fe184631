import { z } from 'zod';
import { demandByDay } from '../demand/demand-by-day.ts';
import { amount, anyNumber, calculator } from './calculator.ts';

/** A test a day for a hundred years. */
const MOST_ROWS = 36_500;
const rows = <Row extends z.ZodType>(row: Row) => z.array(row, 'must be a list').max(MOST_ROWS);
const fraction = z.number('must be a number').min(0, 'must be 0 to 1').max(1, 'must be 0 to 1');

const inputs = z.strictObject({
  /** [day, meq/L]. */
  readings: rows(z.tuple([anyNumber, anyNumber], 'must be [day, meq_L]')),
  supply: rows(
    z
      .tuple([anyNumber, anyNumber, anyNumber], 'must be [from_day, to_day, meq_L_per_day]')
      .refine(([from, to]) => from <= to, 'must end after it begins'),
  ),
  water_changes: rows(z.tuple([anyNumber, fraction, amount], 'must be [day, fraction, meq_L]')),
  test_sd_meq_L: z.number('must be a number').positive('must be above zero'),
});

export const demandCalculator = calculator(
  'what a system’s corals take a day, from its tests, what was given and its water changes',
  inputs,
  ({ readings, supply, water_changes, test_sd_meq_L }) => {
    const found = demandByDay({ readings, supply, waterChanges: water_changes, testSd: test_sd_meq_L });
    return {
      ...{ days: found.days, level: found.level, demand: found.demand, demand_sd: found.demandSd },
      ...{ demand_smoothed: found.demandSmoothed, demand_smoothed_sd: found.demandSmoothedSd },
      flagged: found.flagged,
    };
  },
);
