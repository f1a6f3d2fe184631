import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { solveLinear } from '../../../../server/outside/linear-solver.ts';
import { adviseDosing } from '../../../../shared/domain/dosing-plan/advice.ts';
import type { Advice, AdviceFacts } from '../../../../shared/domain/dosing-plan/facts.ts';
import { hourlyRoom } from '../../../../shared/domain/dosing-plan/hourly-room.ts';
import { USUAL_WATER_RULES } from '../../../../shared/domain/dosing-plan/rules.ts';
import { saturatedStrength } from '../../../../shared/domain/limewater-ceiling.ts';
import { MEQ_PER_DKH } from '../../../../shared/domain/units.ts';
import { adviceFacts, BICARBONATE, CALCIUM_CHLORIDE } from '../../../support/advice-facts.ts';

/** Many programmes are solved, on a busy machine slowly. */
vi.setConfig({ testTimeout: 60_000 });

const rules = USUAL_WATER_RULES;
const advise = (changes: Parameters<typeof adviceFacts>[0] = {}, own = rules): Advice =>
  adviseDosing(adviceFacts(changes), own, solveLinear);
const saturated = saturatedStrength(0, 25);
const water = adviceFacts().water;

describe('correct first, then hold', () => {
  const low = { level: { meqL: 6.5 * MEQ_PER_DKH, error: 0.1 } };

  it('when the level is surely below its band, raises it with a supplement, not with limewater', () => {
    const { kind, rules: followed, correction, limewater } = advise(low);
    expect(kind).toBe('correct_low');
    expect(followed).toContain('correct_first');
    // From 6.5 to the middle, 8.25 dKH, at 1.4 a day at most: two days.
    expect(correction).toMatchObject({ days: 2, supplement: { itemId: 'alk' } });
    expect(correction?.changePerDay).toBeCloseTo((1.75 / 2) * MEQ_PER_DKH, 6);
    expect(correction?.supplement?.total).toBeCloseTo(1.75 * MEQ_PER_DKH * 2000, 3);
    expect(limewater?.strengthMeqL).toBeLessThanOrEqual(30 + rules.strengthStep * saturated + 1e-6);
  });

  it('when the test may as well be inside the band, corrects nothing', () => {
    expect(advise({ level: { meqL: 7.4 * MEQ_PER_DKH, error: 0.1 } }).kind).not.toBe('correct_low');
  });

  it('when the list has no supplement for it, says so', () => {
    const found = advise({ ...low, supplements: [CALCIUM_CHLORIDE] });
    expect(found.rules).toContain('no_supplement');
    expect(found.correction?.supplement).toBeNull();
  });

  it('when there are two, takes the cheaper one', () => {
    const dear = { ...BICARBONATE, itemId: 'dear', cost: 1e6 };
    expect(advise({ ...low, supplements: [dear, BICARBONATE] }).correction?.supplement?.itemId).toBe('alk');
  });

  it('when the level is surely above, lets it fall within the limit a day', () => {
    const { kind, correction, targetMeqL, limewater } = advise({ level: { meqL: 10 * MEQ_PER_DKH, error: 0.1 } });
    expect(kind).toBe('correct_high');
    expect(correction?.changePerDay).toBeLessThan(0);
    expect(-(correction?.changePerDay ?? 0)).toBeLessThanOrEqual(rules.mostChangePerDayMeqL);
    expect(targetMeqL).toBeCloseTo(0.4 + (correction?.changePerDay ?? 0), 9);
    expect(limewater?.bringsMeqL).toBeCloseTo(targetMeqL ?? NaN, 5);
  });
});

describe('start at half strength', () => {
  it('when nothing was ever online, starts at half of saturation at most', () => {
    const found = advise({ limewater: { onlineMeqL: null }, given: { limewater: 0, others: 0, waterChanges: 0 } });
    expect(found.kind).toBe('start');
    expect(found.limewater?.strengthMeqL).toBeCloseTo(saturated / 2, 4);
    expect(found.rules).toContain('start_strength');
    // What half strength can't carry, the supplements do.
    expect(found.supplements.map(({ itemId }) => itemId)).toEqual(['alk', 'cal']);
  });

  it('when half strength is more than is needed, starts with what is needed', () => {
    const demand = { meqLPerDay: 0.1, low: 0.08, high: 0.12 };
    const found = advise({
      ...{ demand, limewater: { onlineMeqL: null } },
      given: { limewater: 0, others: 0, waterChanges: 0 },
    });
    expect(found.limewater?.bringsMeqL).toBeCloseTo(0.1, 5);
  });
});

describe('small steps, after enough tests', () => {
  it('when demand is far above, rises by one step and lets supplements carry the rest', () => {
    const found = advise({ demand: { meqLPerDay: 0.45, low: 0.4, high: 0.5 }, limewater: { onlineMeqL: 20 } });
    expect(found.kind).toBe('change');
    expect(found.limewater?.strengthMeqL).toBeCloseTo(20 + rules.strengthStep * saturated, 4);
    expect(found.rules).toContain('small_step');
    expect(found.supplements).not.toEqual([]);
  });

  it('when demand is far below, falls at once', () => {
    const found = advise({ demand: { meqLPerDay: 0.1, low: 0.06, high: 0.14 } });
    expect(found.kind).toBe('change');
    expect(found.limewater?.strengthMeqL).toBeCloseTo(10, 4);
  });

  it('when there are too few tests since the last change, waits', () => {
    expect(advise({ testsSinceChange: 3 })).toMatchObject({
      kind: 'wait_after_change',
      rules: expect.arrayContaining(['enough_tests']),
    });
    expect(advise({ testsSinceChange: 4 }).kind).toBe('change');
  });

  it('when a plan is not mixed yet, says to mix it rather than something new', () => {
    expect(advise({ plan: { strengthMeqL: 35, mixed: false } }).kind).toBe('mix_plan');
    expect(advise({ plan: { strengthMeqL: 35, mixed: true } }).kind).toBe('change');
  });
});

describe('hold', () => {
  const steady: AdviceFacts['steady'] = {
    ...{ enough: true, steady: true, tests: 21, days: 20 },
    ...{ slopePerDay: 0.001, low: -0.004, high: 0.006, change: 0.02 },
  };

  it('when three weeks of tests show no trend, leaves it as it is, whatever the estimate of demand says', () => {
    expect(advise({ steady })).toMatchObject({
      kind: 'hold',
      rules: expect.arrayContaining(['steady']),
      limewater: null,
      supplements: [],
    });
  });

  it('when what goes in is demand within its error, leaves it', () => {
    const given = { limewater: 0.37, others: 0, waterChanges: 0 };
    expect(advise({ given })).toMatchObject({ kind: 'hold', rules: expect.arrayContaining(['within_error']) });
  });
});

describe('limits of the water', () => {
  it('when the pH is above the limit, dosing pauses before all else', () => {
    const over = { water: { ...water, phNbs: 8.6 }, level: { meqL: 6 * MEQ_PER_DKH, error: 0.1 } };
    expect(advise(over)).toMatchObject({ kind: 'pause', rules: expect.arrayContaining(['ph_limit']), limewater: null });
  });

  it('when chalk is about to drop out, dosing pauses too', () => {
    const over = { water: { ...water, alkalinityMeqL: 4.5, phNbs: 8.45, calciumMgL: 480 } };
    expect(advise(over)).toMatchObject({ kind: 'pause', rules: expect.arrayContaining(['omega_limit']) });
  });

  it('when the pH is only assumed, it never stops dosing, but is asked for', () => {
    const found = advise({ water: { ...water, phNbs: 8.6 }, assumed: ['phNbs'] });
    expect(found.kind).toBe('change');
    expect(found.rules).toContain('ph_assumed');
  });

  it('when the pH is high, doses at night', () => {
    const found = advise({ water: { ...water, phNbs: 8.4 } });
    expect(found.limewater?.hours).toBe(12);
    expect(found.rules).toContain('night');
    expect(advise().limewater?.hours).toBe(24);
  });

  it('when the water can’t be as its tests say, a day brings no more than the largest correction', () => {
    const found = advise({ water: { ...water, salinity: 3 }, demand: { meqLPerDay: 1.5, low: 1.4, high: 1.6 } });
    expect(found.rules).toContain('water_doubtful');
    expect((found.targetMeqL ?? 0) - found.shortMeqL).toBeLessThanOrEqual(rules.mostChangePerDayMeqL + 1e-5);
  });
});

describe('the ceiling of limewater', () => {
  it('when demand nears what evaporation can carry, says to plan a second method', () => {
    // 20 L of 40.3 meq/L into 2,000 L carry 0.403 a day.
    expect(advise({ demand: { meqLPerDay: 0.37, low: 0.34, high: 0.4 } }).rules).toContain('second_method');
    expect(advise({ demand: { meqLPerDay: 0.35, low: 0.32, high: 0.38 } }).rules).not.toContain('second_method');
  });

  it('when it is saturated, says that more lime would only settle, and what is missing', () => {
    const found = advise({
      ...{ demand: { meqLPerDay: 0.6, low: 0.55, high: 0.65 }, supplements: [] },
      limewater: { onlineMeqL: 40, acidPercent: null },
    });
    expect(found.rules).toEqual(expect.arrayContaining(['saturation', 'short', 'second_method']));
    expect(found.shortMeqL).toBeCloseTo(0.6 - (20 * saturated) / 2000, 4);
  });

  it('when evaporation is not known, leaves limewater out and says why', () => {
    const found = advise({ evaporationLPerDay: null });
    expect(found.limewater).toBeNull();
    expect(found.rules).toContain('evaporation');
  });
});

describe('what is missing to go by', () => {
  it('when demand is not known, asks for tests', () => {
    expect(advise({ demand: null }).kind).toBe('wait_for_tests');
  });

  it('when the use of what is online is not known, asks for levels', () => {
    expect(advise({ given: { limewater: null, others: 0, waterChanges: 0 } }).kind).toBe('wait_for_levels');
  });

  it('when a price is not known, tells no cost and takes the item last', () => {
    const free = { ...BICARBONATE, itemId: 'unpriced', cost: null };
    const found = advise({ supplements: [free, BICARBONATE, CALCIUM_CHLORIDE], limewater: { onlineMeqL: 20 } });
    expect(found.costPerDayMicro).toBeNull();
    expect(found.rules).toContain('price_unknown');
    expect(found.supplements.map(({ itemId }) => itemId)).not.toContain('unpriced');
  });
});

describe('laws of advice', () => {
  const rate = fc.double({ min: 0, max: 2.5, noNaN: true });
  const anyFacts = fc.record({
    netVolumeL: fc.double({ min: 50, max: 50_000, noNaN: true }),
    demand: rate,
    online: fc.option(fc.double({ min: 0, max: 45, noNaN: true })),
    evaporation: fc.option(fc.double({ min: 0, max: 500, noNaN: true })),
    level: fc.double({ min: 0.5, max: 6, noNaN: true }),
    ph: fc.double({ min: 7.5, max: 8.8, noNaN: true }),
    acid: fc.constantFrom(null, 5, 12),
    withSupplements: fc.boolean(),
    given: rate,
  });

  it('never passes a limit and never doses less than nothing, whatever the farm', () => {
    fc.assert(
      fc.property(anyFacts, (any) => {
        const facts = adviceFacts({
          ...{ netVolumeL: any.netVolumeL, evaporationLPerDay: any.evaporation },
          demand: { meqLPerDay: any.demand, low: any.demand * 0.9, high: any.demand * 1.1 },
          given: { limewater: any.given, others: 0, waterChanges: 0 },
          level: { meqL: any.level, error: 0.1 },
          water: { ...water, alkalinityMeqL: any.level, phNbs: any.ph },
          limewater: { onlineMeqL: any.online, acidPercent: any.acid },
          ...(any.withSupplements ? {} : { supplements: [] }),
        });
        const found = adviseDosing(facts, rules, solveLinear);
        const { limewater, supplements, correction } = found;
        const room = hourlyRoom(facts.water, rules)?.meqL ?? 0;
        const brought =
          (limewater?.bringsMeqL ?? 0) +
          supplements.reduce((sum, { bringsMeqL }) => sum + bringsMeqL, 0) +
          (correction?.supplement?.bringsMeqL ?? 0);
        expect(brought).toBeLessThanOrEqual(room * (limewater?.hours ?? 24) + 1e-4);
        if (limewater) {
          const fivePercent = (limewater.vinegarMlPerL * (any.acid ?? 0)) / 5;
          expect(limewater.strengthMeqL).toBeLessThanOrEqual(saturatedStrength(fivePercent) + 1e-3);
          expect(fivePercent).toBeLessThanOrEqual(rules.mostVinegarMlPerL + 1e-4);
          expect(limewater.strengthMeqL).toBeLessThanOrEqual(
            (any.online ?? (rules.startStrength - rules.strengthStep) * saturated) +
              rules.strengthStep * saturated +
              1e-3,
          );
        }
        expect(correction === null || Math.abs(correction.changePerDay) <= rules.mostChangePerDayMeqL + 1e-9).toBe(
          true,
        );
        for (const { amountPerDay } of supplements) expect(amountPerDay).toBeGreaterThan(0);
      }),
      { numRuns: 80 },
    );
  });
});
