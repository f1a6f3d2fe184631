import { describe, expect, it } from 'vitest';
import type { Carried, Demand, LatestValue, LimeCeiling } from '@shared/contracts/water.ts';
import { demandSentence, type DemandFacts, type DemandWords, driftOf } from '@/views/water/demand-sentence.ts';

/** Amounts in meq/L are said as dKH of 1 each, so that the figures of a test are those of its sentence. */
const WORDS: DemandWords = {
  rate: (rate, error) => (error > 0 ? `${rate.toFixed(2)} ± ${error.toFixed(2)} dKH` : `${rate.toFixed(2)} dKH`),
  bare: (rate) => rate.toFixed(2),
  rounded: (rate) => Number(rate.toFixed(2)),
  level: (level) => `${level.toFixed(1)} dKH`,
};

type Given = { demand: Demand; carried: Carried };

function aDemand(demand: number, limewater: number | null, { error = 0.01, others = 0, waterChanges = 0 } = {}): Given {
  return {
    demand: {
      ...{ enough: true, from: 0, to: 1, readings: 14, windowDays: 14 },
      ...{ demand, low: demand - error, high: demand + error },
    },
    carried: { limewater, others, waterChanges },
  };
}

const ceiling: LimeCeiling = {
  ...{ evaporationLPerDay: 20, saturated: 1.48, withVinegar: 1.6, vinegarMlPerL: 5 },
};

function say(facts: Partial<DemandFacts>): string {
  return demandSentence(
    { ...aDemand(1.23, 1.18), ceiling: null, netVolumeL: 1000, alkalinity: undefined, ...facts },
    WORDS,
  )
    .map(({ text }) => text)
    .join('');
}

function alkalinityAt(value: number, state: LatestValue['state']): LatestValue {
  const band = { parameter: 'alkalinity', low: 7.9, high: 8.7 } as const;
  return { parameter: 'alkalinity', value, takenAt: 0, method: '', band, state };
}

describe('demandSentence', () => {
  it('when less is carried than taken, says that alkalinity slips and by how much', () => {
    expect(say({})).toBe('Uses 1.23 ± 0.01 dKH a day and limewater carries 1.18, so alkalinity slips 0.05 a day.');
  });

  it('when figures are rounded, what is shown adds up', () => {
    expect(say(aDemand(1.147, 0.814, { waterChanges: 0.003 }))).toContain('Uses 1.15');
    expect(say(aDemand(1.147, 0.814, { waterChanges: 0.003 }))).toContain(
      'carries 0.81, so alkalinity slips 0.34 a day',
    );
  });

  it('when the difference is smaller than the error of the tests, does not claim more than a chance', () => {
    expect(say(aDemand(1.23, 1.18, { error: 0.09 }))).toContain(
      'so alkalinity may slip 0.05 a day, within the error of the tests',
    );
  });

  it('when both agree, says that alkalinity holds', () => {
    expect(say(aDemand(1.2, 1.18, { error: 0.09 }))).toMatch(/carries 1\.18, so alkalinity holds\.$/);
  });

  it('when more is carried than taken, says that it rises', () => {
    expect(say(aDemand(1, 1.18))).toMatch(/so alkalinity rises 0\.18 a day\.$/);
  });

  it('when other supplements help, names their part', () => {
    const demand = aDemand(1.5, 1.18, { others: 0.3, error: 0.2 });
    expect(say(demand)).toContain('limewater carries 1.18 and other supplements 0.30, so alkalinity holds');
    expect(say(aDemand(0.3, 0, { others: 0.3 }))).toContain('supplements carry 0.30');
    expect(say(aDemand(0.3, 0))).toContain('nothing is dosed, so alkalinity slips 0.30 a day');
  });

  it('when water changes move the level, names their part and counts it', () => {
    expect(say(aDemand(1.5, 1.18, { others: 0.2, waterChanges: 0.12 }))).toMatch(
      / and limewater carries 1\.18, other supplements 0\.20 and water changes 0\.12, so alkalinity holds\.$/,
    );
    expect(say(aDemand(0.12, 0, { waterChanges: 0.12 }))).toContain(
      ' and water changes bring 0.12, so alkalinity holds',
    );
    expect(say(aDemand(1.18, 1.18, { waterChanges: -0.1 }))).toContain(
      'limewater carries 1.18 and water changes take 0.10, so alkalinity slips 0.10 a day',
    );
    expect(say(aDemand(1.18, 1.18, { waterChanges: 0.001 }))).not.toContain('water changes');
  });

  it('when levels do not tell what limewater carries, asks for one and claims no drift', () => {
    expect(say(aDemand(1.23, null))).toBe(
      'Uses 1.23 ± 0.01 dKH a day. What limewater carries is not known: log the level of its reservoir.',
    );
  });

  it('when tests are missing, says how many there are and how many it takes, and no number', () => {
    const demand: Demand = {
      ...{ enough: false, reason: 'too_few_readings', from: 0, to: 1, readings: 1, windowDays: 14 },
    };
    expect(say({ demand })).toBe(
      'Not enough data yet to tell what it uses: one alkalinity test in the last 14 days, and three over at least two days are needed.',
    );
  });

  it('when demand can not be told from nothing, says so', () => {
    expect(say(aDemand(0.05, 0, { error: 0.1 }))).toBe(
      'Uses too little to be told from nothing yet: 0.05 ± 0.10 dKH a day.',
    );
  });

  it('when the last value is out of its band, says so after the demand', () => {
    expect(say({ alkalinity: alkalinityAt(7.6, 'below') })).toMatch(
      / At 7\.6 dKH it is below its band, which starts at 7\.9 dKH\.$/,
    );
    expect(say({ alkalinity: alkalinityAt(9, 'above') })).toMatch(/ it is above its band, which ends at 8\.7 dKH\.$/);
    expect(say({ alkalinity: alkalinityAt(8.2, 'in') })).not.toContain('band');
  });

  it('when it slips and stronger limewater can hold it, names the strength', () => {
    // 1.23 meq/L a day × 1,000 L ÷ 20 L × 74.092 g ÷ 2,000 meq = 2.28 g/L, by arithmetic.
    expect(say({ ceiling })).toMatch(/ Limewater of 2\.28 g\/L would hold it\.$/);
  });

  it('when even saturated limewater falls short, points to vinegar, and beyond that to the amount that is missing', () => {
    expect(say({ ...aDemand(1.55, 1.18), ceiling })).toMatch(/Saturated limewater with vinegar would hold it/);
    expect(say({ ...aDemand(2, 1.18), ceiling })).toMatch(/more than limewater can carry .* by 0\.40 dKH a day/);
  });

  it('when the drift is within the error, gives no advice', () => {
    expect(say({ ...aDemand(1.23, 1.18, { error: 0.09 }), ceiling })).not.toContain('would hold');
  });

  it('when a test of these weeks is too far off to count, sends to the checks; older ones are not told of', () => {
    expect(say({ flagged: [{ at: 0.5 }] })).toContain(' One test is too far off to count: look at the checks below.');
    expect(say({ flagged: [{ at: 0.5 }, { at: 0.7 }] })).toContain(' 2 tests are too far off to count');
    expect(say({ flagged: [{ at: -1 }] })).not.toContain('too far off');
  });

  it('marks only the amount as the number that matters', () => {
    const parts = demandSentence(
      { ...aDemand(1.23, 1.18), ceiling: null, netVolumeL: 1000, alkalinity: undefined },
      WORDS,
    );
    expect(parts.filter(({ strong }) => strong).map(({ text }) => text)).toEqual(['1.23 ± 0.01 dKH a day']);
  });
});

it.each([
  [1.23, 1.23, 0.1, 'holds'],
  [1.23, 1.17, 0.1, 'may slip'],
  [1.23, 1.29, 0.1, 'may rise'],
  [1.23, 1.1, 0.1, 'slips'],
  [1.23, 1.36, 0.1, 'rises'],
] as const)('driftOf: takes %f, carries %f, error %f: %s', (demand, supply, error, drift) => {
  expect(driftOf(aDemand(demand, supply, { error }))).toBe(drift);
});
