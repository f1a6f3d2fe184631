import { describe, expect, it } from 'vitest';
import type { LatestValue, SystemGlance } from '@shared/contracts/water.ts';
import type { DemandWords } from '@/views/water/demand-sentence.ts';
import { overviewSentence } from '@/views/water/overview-sentence.ts';

const WORDS: DemandWords = {
  rate: (rate) => `${rate.toFixed(2)} dKH`,
  bare: (rate) => rate.toFixed(2),
  rounded: (rate) => Number(rate.toFixed(2)),
  level: (level) => `${level.toFixed(1)} dKH`,
};

/** A system with a band of 7.5 to 9, in units of one dKH. */
function glance(code: string, level: number, { takes = 1, gets = 1 as number | null } = {}): SystemGlance {
  const state: LatestValue['state'] = level < 7.5 ? 'below' : level > 9 ? 'above' : 'in';
  const band = { parameter: 'alkalinity', low: 7.5, high: 9 } as const;
  return {
    system: {
      id: code,
      code,
      name: `Bay ${code}`,
      kind: 'growout',
      netVolumeL: 1000,
      surfaceM2: null,
      note: '',
      createdAt: 0,
      version: 1,
    },
    latest: [{ parameter: 'alkalinity', value: level, takenAt: 0, method: '', band, state }],
    demand: {
      ...{ enough: true, from: 0, to: 1, readings: 14, windowDays: 14 },
      ...{ demand: takes, low: takes - 0.02, high: takes + 0.02 },
    },
    carried: { limewater: gets, others: 0, waterChanges: 0 },
    ...{ online: null, standby: 0, plugs: 0 },
  };
}

describe('overviewSentence', () => {
  it('when one is out of its band and slips, it comes first with both numbers', () => {
    expect(
      overviewSentence([glance('A', 8.5, { gets: 1.03 }), glance('D', 7.3, { takes: 1.15, gets: 0.81 })], WORDS),
    ).toBe('D Bay D is below its band at 7.3 dKH and slips 0.34 a day. A Bay A rises 0.03 a day.');
  });

  it('when several move, the one that leaves its band first is named first', () => {
    const soon = glance('B', 7.6, { takes: 1.05 });
    const late = glance('A', 8.9, { takes: 1.3 });
    expect(overviewSentence([late, soon], WORDS)).toMatch(/^B Bay B slips 0\.05 a day\. A Bay A slips 0\.30 a day\.$/);
  });

  it('when many move, three are named and the rest counted', () => {
    const all = ['A', 'B', 'C', 'D', 'E'].map((code) => glance(code, 8, { takes: 1.3 }));
    expect(overviewSentence(all, WORDS)).toMatch(/C Bay C slips 0\.30 a day\. 2 more systems move\.$/);
  });

  it('when all hold, says so for those that are known and names those that are not', () => {
    expect(overviewSentence([glance('A', 8), glance('B', 8)], WORDS)).toBe(
      'Alkalinity is where it should be in 2 systems.',
    );
    expect(overviewSentence([glance('A', 8), glance('B', 8, { gets: null })], WORDS)).toBe(
      'Alkalinity is where it should be in 1 system. What alkalinity does is not known yet in B Bay B.',
    );
  });
});
