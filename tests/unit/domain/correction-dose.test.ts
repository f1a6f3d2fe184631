import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { correctionDose } from '../../../shared/domain/correction-dose.ts';
import { powderBrings } from '../../../shared/domain/stock-solutions.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const dkh = (value: number) => value * MEQ_PER_DKH;
const usual = { from: dkh(7.2), to: dkh(8.2), maxPerDay: dkh(0.5), netVolumeL: 1000 };

describe('a correction', () => {
  // Computed from molar masses: 1 dKH in 1,000 L takes 30.0 g of sodium bicarbonate.
  it('from 7.2 to 8.2 dKH in 1,000 L at half a dKH a day takes two days of 15 g of bicarbonate', () => {
    const dose = correctionDose({ ...usual, perUnit: powderBrings('sodium_bicarbonate').alkalinityMeq });

    expect(dose.days).toBe(2);
    expect(dose.total).toBeCloseTo(29.96, 2);
    expect(dose.amountPerDay).toBeCloseTo(14.98, 2);
    expect(dose.levels.map((level) => level / MEQ_PER_DKH)).toEqual([expect.closeTo(7.7, 9), expect.closeTo(8.2, 9)]);
  });

  // Holmes-Farley 2006 recipe: 191 mL of 1,870 meq/L for each dKH and 1,000 L.
  it('takes 191 mL of the published two-part solution', () => {
    expect(correctionDose({ ...usual, perUnit: 1.87 }).total).toBeCloseTo(191, 0);
  });

  it('when the rise is just the limit, takes one day', () => {
    expect(correctionDose({ ...usual, maxPerDay: dkh(1), perUnit: 1 }).days).toBe(1);
  });

  it.each([
    ['there', dkh(8.2)],
    ['above', dkh(9)],
  ])('when the level is %s already, takes nothing', (_where, from) => {
    expect(correctionDose({ ...usual, from, perUnit: 1 })).toEqual({
      ...{ days: 0, total: 0, amountPerDay: 0, risePerDay: 0, levels: [] },
    });
  });

  it('never rises by more than the limit a day, ends where it was wanted, and brings what it should', () => {
    fc.assert(
      fc.property(
        fc.record({
          from: fc.double({ min: 0, max: 3, noNaN: true }),
          to: fc.double({ min: 3.001, max: 6, noNaN: true }),
          maxPerDay: fc.double({ min: 0.02, max: 5, noNaN: true }),
          netVolumeL: fc.double({ min: 10, max: 1e5, noNaN: true }),
          perUnit: fc.double({ min: 0.01, max: 50, noNaN: true }),
        }),
        (input) => {
          const { days, total, risePerDay, amountPerDay, levels } = correctionDose(input);
          expect(risePerDay).toBeLessThanOrEqual(input.maxPerDay * (1 + 1e-6));
          expect(levels).toHaveLength(days);
          expect(levels.at(-1)).toBeCloseTo(input.to, 9);
          expect(((amountPerDay * days * input.perUnit) / input.netVolumeL + input.from) / input.to).toBeCloseTo(1, 9);
          expect(total).toBeCloseTo(amountPerDay * days, 4);
        },
      ),
    );
  });

  it.each([
    ['a limit of nothing', { maxPerDay: 0 }],
    ['a supplement of nothing', { perUnit: 0 }],
    ['no water', { netVolumeL: 0 }],
    ['a level that is none', { from: Number.NaN }],
    ['more than a year to go', { maxPerDay: 1e-6 }],
  ])('when it has %s, is refused', (_name, changes) => {
    expect(domainErrorOf(() => correctionDose({ ...usual, perUnit: 1, ...changes })).code).toBe('domain.out_of_range');
  });
});
