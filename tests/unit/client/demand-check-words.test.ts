import { describe, expect, it } from 'vitest';
import type { DemandCheck } from '@shared/contracts/demand.ts';
import { checkText, type CheckWords } from '@/views/water/demand-check-words.ts';

const WORDS: CheckWords = {
  rate: (rate, error) =>
    error === undefined ? `${rate.toFixed(2)} dKH` : `${rate.toFixed(2)} ± ${error.toFixed(2)} dKH`,
  level: (level) => `${level.toFixed(1)} dKH`,
  nitrate: (rise, error) => `${rise.toFixed(1)} ± ${error.toFixed(1)} mg/L`,
  salinity: (salinity) => salinity.toFixed(1),
  day: () => '12 Nov',
};

const say = (check: DemandCheck) => checkText(check, WORDS).text;

describe('what a check found, in words', () => {
  it('when calcium agrees, says both ratios and that it is well', () => {
    const check: DemandCheck = { code: 'calcium_agrees', ratio: 19.42, half: 2.1 };

    expect(say(check)).toBe('Calcium goes with alkalinity: 19 ± 2 mg for each meq, and skeleton takes 20.04.');
    expect(checkText(check, WORDS).tag).toEqual({ word: 'agrees', tone: 'kelp' });
  });

  it('when alkalinity goes without calcium, says how much, and what nitrate has to do with it', () => {
    const check: DemandCheck = { code: 'alkalinity_alone', ratio: 12, half: 3, withoutCalcium: 0.2, nitrate: null };

    expect(say(check)).toBe(
      'Alkalinity goes without calcium: 12 ± 3 mg for each meq instead of 20.04, so 0.20 dKH a day go some other way. Nitrate does not rise enough to explain it: check both tests, and what was given.',
    );
    expect(say({ ...check, nitrate: { risePerDay: 1.2, half: 0.4, takes: 0.02 } })).toContain(
      'Nitrate rises by 1.2 ± 0.4 mg/L a day, and making it takes 0.02 dKH a day of that.',
    );
  });

  it('when chalk may form by itself, says which signs there are and what to look for', () => {
    const check: DemandCheck = { code: 'may_precipitate', before: 0.8, now: 1.3, half: 0.2, ph: 8.5, saturation: 6.4 };

    expect(say(check)).toContain(
      'Demand rose from 0.80 dKH to 1.30 ± 0.20 dKH a day while pH was 8.50 and aragonite stood at 6.4 times saturation',
    );
    expect(say({ ...check, saturation: null })).toContain('while pH was 8.50: part');
  });

  it('when salinity moved, says what it alone does and that demand is free of it', () => {
    expect(say({ code: 'salinity_moved', from: 34, to: 35, half: 0.3, moves: 0.24 })).toBe(
      "Salinity rose from 34.0 to 35.0 in two weeks, which alone lifts alkalinity by 0.2 dKH. Levels are brought to today's salinity, so it is not taken for demand.",
    );
    expect(say({ code: 'salinity_moved', from: 35, to: 34, half: 0.3, moves: -0.24 })).toContain(
      'Salinity fell from 35.0 to 34.0 in two weeks, which alone lowers alkalinity by 0.2 dKH',
    );
  });

  it('when demand changed, says from what to what and since when', () => {
    expect(say({ code: 'changed', direction: 'down', before: 1.3, now: 0.8, expected: 1.3, half: 0.2, since: 0 })).toBe(
      'Demand fell from 1.30 dKH to 0.80 ± 0.20 dKH a day since 12 Nov, by more than tests, stock and growth explain.',
    );
  });

  it('when a step is not explained, asks what was not written down', () => {
    expect(say({ code: 'stepped', at: 0, by: 1.2 })).toContain('Alkalinity rose by 1.2 dKH before the test of 12 Nov');
    expect(say({ code: 'stepped', at: 0, by: -1.2 })).toContain('Alkalinity fell by 1.2 dKH');
  });

  it('when more calcium goes than skeleton takes, sends to the calcium test', () => {
    expect(say({ code: 'calcium_exceeds', ratio: 31, half: 4 })).toContain('31 ± 4 mg for each meq');
  });
});
