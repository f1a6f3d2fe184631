import { expect, it } from 'vitest';
import { mixLimewater } from '@shared/domain/limewater.ts';
import { holdingMix, type MixBase } from '@/views/water/holding-mix.ts';

const BASE: MixBase = {
  ...{ before: { levelL: 0, alkalinityMeqL: 0 }, waterL: 50, temperatureC: 25, purity: 0.95, acidPercent: 5 },
};
/** A system of 1,000 L that evaporates 20 L a day and takes `demand` meq/L. */
const facts = (demand: number, others = 0) => ({
  demand: {
    enough: true,
    from: 0,
    to: 1,
    readings: 14,
    windowDays: 14,
    demand,
    low: demand / 2,
    high: demand * 1.5,
  } as const,
  carried: { limewater: 0, others, waterChanges: 0 },
  ceiling: { evaporationLPerDay: 20, saturated: 0.8, withVinegar: 0.87, vinegarMlPerL: 5 },
  netVolumeL: 1000,
});

it('holdingMix: brings in a day what the system takes, when what evaporates is topped up with it', () => {
  const mix = holdingMix(facts(0.5), BASE);

  // 0.5 meq/L of 1,000 L by 20 L a day: 25 meq/L; 25 × 50 / 2,000 × 74.092 / 0.95 = 48.7 g, by arithmetic.
  expect(mix).toEqual({ limeG: 49, vinegarMl: 0, holds: true });
});

it('holdingMix: a weak rest in the vessel is made up for, and what else is dosed is left to it', () => {
  const rest = { ...BASE, before: { levelL: 10, alkalinityMeqL: 10 } };

  // 60 L at 25 are 1,500 meq, of which 100 are there: 28 meq/L in 50 L, 54.6 g.
  expect(holdingMix(facts(0.5), rest)?.limeG).toBe(55);
  expect(holdingMix(facts(0.7, 0.2), BASE)?.limeG).toBe(49);
});

it('holdingMix: above what water holds vinegar helps; above that it is as strong as it gets and says so', () => {
  const helped = holdingMix(facts(0.84), BASE);
  const short = holdingMix(facts(1.2), BASE);

  expect(helped).toMatchObject({ vinegarMl: 250, holds: true });
  expect(short).toMatchObject({ vinegarMl: 250, holds: false });
  expect(mixLimewater({ ...BASE, ...(helped ?? { limeG: 0, vinegarMl: 0 }) }).vinegarHelps).toBe(true);
  expect(mixLimewater({ ...BASE, ...(short ?? { limeG: 0, vinegarMl: 0 }) }).saturation).toBeCloseTo(1, 2);
});

it('holdingMix: where demand or evaporation is not known, or nothing is needed, nothing is suggested', () => {
  const unknown = { enough: false, from: 0, to: 1, readings: 1, windowDays: 14, reason: 'too_few_readings' } as const;

  expect(holdingMix({ ...facts(1), demand: unknown }, BASE)).toBeNull();
  expect(holdingMix({ ...facts(1), ceiling: null }, BASE)).toBeNull();
  expect(holdingMix(facts(0.3, 0.4), BASE)).toBeNull();
});
