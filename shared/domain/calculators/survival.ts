import { z } from 'zod';
import { survivalCurve } from '../survival.ts';
import { amount, calculator, optional } from './calculator.ts';

const MOST_ROWS = 100_000;
const list = <Item extends z.ZodType>(item: Item) => z.array(item, 'must be a list').max(MOST_ROWS);

const inputs = z
  .strictObject({
    times: list(amount),
    /** 1: lost at that time; 0: left alive or still followed. */
    events: list(z.union([z.literal(0), z.literal(1)], 'must be 0 or 1')),
    counts: optional(list(z.int('must be a whole number').min(0, 'must be zero or more'))),
  })
  .refine(
    ({ times, events, counts }) => events.length === times.length && (counts ?? times).length === times.length,
    'times, events and counts must be of one length',
  );

export const survivalCalculator = calculator(
  'survivors’ curve by Kaplan and Meier with Greenwood’s standard error, a step for each time with a loss',
  inputs,
  ({ times, events, counts }) => {
    const steps = survivalCurve(
      times.map((day, index) => ({ day, lost: events[index] === 1, count: counts?.[index] ?? 1 })),
    );
    return {
      time: steps.map(({ day }) => day),
      at_risk: steps.map(({ atRisk }) => atRisk),
      lost: steps.map(({ lost }) => lost),
      survival: steps.map(({ survival }) => survival),
      se: steps.map(({ standardError }) => standardError),
    };
  },
);
