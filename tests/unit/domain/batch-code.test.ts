import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { batchCodePrefix, isoWeekOf, nextBatchCode } from '../../../shared/domain/batch-code.ts';
import { addDays } from '../../../shared/domain/days.ts';

describe('codes of batches', () => {
  // ISO 8601-1:2019, 4.3.2.2 and its usual edge cases: week 1 holds the year's first Thursday.
  it.each([
    ['2026-08-19', 2026, 34],
    ['2026-01-01', 2026, 1],
    ['2025-12-29', 2026, 1],
    ['2025-12-28', 2025, 52],
    ['2021-01-03', 2020, 53],
    ['2021-01-04', 2021, 1],
    ['2020-12-31', 2020, 53],
    ['2027-01-03', 2026, 53],
    ['2024-02-29', 2024, 9],
  ])('when the day is %s, the ISO week is %d-%d', (day, year, week) => {
    expect(isoWeekOf(day)).toEqual({ year, week });
  });

  it('when seven days pass, the week is another and the weekday of its start is Monday', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 40_000 }), (offset) => {
        const day = addDays('1990-01-01', offset);
        const { week } = isoWeekOf(day);
        expect(week).toBeGreaterThanOrEqual(1);
        expect(week).toBeLessThanOrEqual(53);
        expect(isoWeekOf(addDays(day, 7))).not.toEqual(isoWeekOf(day));
      }),
    );
  });

  it('when batches of the week exist, counts on from the highest, whatever other lines and weeks have', () => {
    expect(batchCodePrefix('WIG', '2026-08-19')).toBe('WIG-2634-');
    expect(nextBatchCode('WIG', '2026-08-19', [])).toBe('WIG-2634-1');
    expect(nextBatchCode('WIG', '2026-08-19', ['WIG-2634-1', 'WIG-2634-9', 'WIG-2634-10', 'EMB-2634-30'])).toBe(
      'WIG-2634-11',
    );
    expect(nextBatchCode('WIG', '2026-01-05', ['WIG-2601-3'])).toBe('WIG-2602-1');
  });
});
