import { describe, expect, it } from 'vitest';
import { salinityFactor, salinityThrough } from '../../../../shared/domain/demand/salinity-correction.ts';
import { day } from '../../../support/demand-data.ts';

const test = (at: number, value: number, sd = 0.2) => ({ at: day(at), value, sd });

describe('salinity through time', () => {
  it('before the first test is not known', () => {
    expect(salinityThrough([test(5, 35)])(day(4))).toBeNull();
    expect(salinityThrough([])(day(4))).toBeNull();
  });

  it('at the first test is that test, and less sure from day to day after it', () => {
    const at = salinityThrough([test(5, 35)]);

    expect(at(day(5))).toEqual({ value: 35, sd: 0.2 });
    expect(at(day(9))?.value).toBe(35);
    expect(at(day(9))?.sd).toBeCloseTo(Math.hypot(0.2, 0.16), 9);
  });

  it('with many tests is surer than one, and knows none that comes later', () => {
    const steady = [0, 2, 4, 6, 8].map((each) => test(each, 35));
    const at = salinityThrough(steady);

    expect(at(day(8))?.sd).toBeLessThan(0.14);
    expect(salinityThrough([...steady, test(10, 33)])(day(8))).toEqual(at(day(8)));
  });
});

describe('the factor that brings a level to another salinity', () => {
  it('is their ratio, and as unsure as the earlier one', () => {
    const factor = salinityFactor({ value: 34, sd: 0.17 }, { value: 35, sd: 0.1 });

    expect(factor.value).toBeCloseTo(35 / 34, 12);
    expect(factor.sd).toBeCloseTo((35 / 34) * 0.005, 9);
  });
});
