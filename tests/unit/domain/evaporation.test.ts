import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { MS_PER_DAY } from '../../../shared/domain/days.ts';
import {
  checkEvaporation,
  evaporationFromSalinity,
  evaporationFromUse,
  EVAPORATION_BY_AIR,
} from '../../../shared/domain/evaporation.ts';
import { litresPerDay } from '../../../shared/domain/reservoir-use.ts';

const day = (count: number) => count * MS_PER_DAY;
const use = (litres: readonly number[]) =>
  litres.map((amount, index) => ({ from: day(index), to: day(index + 1), litres: amount, alkalinityMeq: 40 * amount }));

describe('by what topped it up', () => {
  // Worked by hand: mean 10, s² = (4 + 0 + 4) / 2 = 4, standard error √(4 / 3) = 1.1547, t(2) = 4.302653.
  it('is the mean use with an interval from how the stretches differ', () => {
    const found = evaporationFromUse(use([8, 10, 12]), day(3), { days: 7 });

    expect(found).toMatchObject({ litresPerDay: 10, days: 3, stretches: 3 });
    expect((found?.high ?? 0) - 10).toBeCloseTo(4.302653 * Math.sqrt(4 / 3), 5);
    expect(10 - (found?.low ?? 0)).toBeCloseTo(4.302653 * Math.sqrt(4 / 3), 5);
  });

  it('when stretches agree, the interval is that of the first and the last look', () => {
    const found = evaporationFromUse(use([10, 10, 10, 10]), day(4), { days: 7, levelSdL: 0.5 });

    expect((found?.high ?? 0) - 10).toBeCloseTo((1.96 * Math.SQRT2 * 0.5) / 4, 9);
  });

  it('when there are only two stretches, tells no spread; without any, nothing', () => {
    expect(evaporationFromUse(use([8, 10]), day(2), { days: 7 })).toMatchObject({ low: null, high: null });
    expect(evaporationFromUse([], day(2), { days: 7 })).toBeNull();
  });

  it('is the mean use of the window, and lies within its interval, which never goes below nothing', () => {
    const amounts = fc.array(fc.double({ min: 0, max: 60, noNaN: true }), { minLength: 3, maxLength: 12 });
    fc.assert(
      fc.property(amounts, (litres) => {
        const now = day(litres.length);
        const found = evaporationFromUse(use(litres), now, { days: 7 });
        expect(found?.litresPerDay).toBe(litresPerDay(use(litres), now, 7));
        expect(found?.low).toBeGreaterThanOrEqual(0);
        expect(found?.low).toBeLessThanOrEqual(found?.litresPerDay ?? -1);
        expect(found?.high).toBeGreaterThanOrEqual(found?.litresPerDay ?? Infinity);
      }),
    );
  });
});

describe('by the salt that stays behind', () => {
  const at = (days: number, salinity: number, sd = 0.1) => ({ at: day(days), salinity, sd });

  // By arithmetic: 5 % of the water lost takes 35 to 36.84.
  it('when top-off was missed, the rise tells what went', () => {
    const found = evaporationFromSalinity(at(0, 35), at(5, 35 / 0.95), { netVolumeL: 1000, toppedUpL: 0 });

    expect(found?.litresPerDay).toBeCloseTo(10, 9);
  });

  it('when salinity stands still, it is what was topped up', () => {
    const found = evaporationFromSalinity(at(0, 35), at(4, 35), { netVolumeL: 1000, toppedUpL: 48 });

    expect(found?.litresPerDay).toBeCloseTo(12, 12);
  });

  it('the error of two readings of ±0.2 makes it wide over days, narrower over weeks', () => {
    const over = (days: number) =>
      evaporationFromSalinity(at(0, 35), at(days, 35), { netVolumeL: 1000, toppedUpL: 10 * days });
    const width = (days: number) => (over(days)?.high ?? 0) - (over(days)?.low ?? 0);

    expect(width(14)).toBeCloseTo((2 * 1.96 * 1000 * Math.SQRT2 * (0.1 / 35)) / 14, 6);
    expect(width(2)).toBeCloseTo(7 * width(14), 6);
  });

  it('when the readings are hours apart, nothing is told; a salinity of nothing is refused', () => {
    const water = { netVolumeL: 1000, toppedUpL: 0 };

    expect(evaporationFromSalinity(at(0, 35), at(0.2, 36), water)).toBeNull();
    expect(() => evaporationFromSalinity(at(0, 0), at(3, 35), water)).toThrow('above zero');
  });
});

describe('beside the open water', () => {
  it.each([
    [2, 'usual'],
    [5, 'usual'],
    [7.9, 'usual'],
    [1.2, 'low'],
    [9, 'high'],
  ])('%d L a square metre is %s', (perM2, check) => {
    expect(checkEvaporation(perM2 * 4, 4)).toMatchObject({ perM2, check });
  });

  it('the table goes from a humid shed to a heated winter', () => {
    expect(EVAPORATION_BY_AIR.every(({ least, most }) => least < most)).toBe(true);
    expect(EVAPORATION_BY_AIR.map(({ least }) => least)).toEqual([2, 2.1, 3.5, 4.7, 5.8]);
  });
});
