import { describe, expect, it } from 'vitest';
import type { Reservoir } from '@shared/contracts/reservoirs.ts';
import type { WaterSystem } from '@shared/contracts/water-overview.ts';
import { limeShareOf, movementOf, nextOf, withoutName } from '@/views/water/glance-words.ts';
import type { DemandWords } from '@/views/water/demand-sentence.ts';

const WORDS: DemandWords = {
  rate: (rate) => `${rate.toFixed(2)} dKH`,
  bare: (rate) => rate.toFixed(2),
  rounded: (rate) => Number(rate.toFixed(2)),
  level: (level) => `${level.toFixed(1)} dKH`,
};
const NOW = 1_700_000_000_000;

const ONLINE: Reservoir = {
  ...{ id: 'R', code: 'LW-1', systemId: 'A', systemCode: 'A', systemName: 'Bay', volumeL: 60, state: 'online' },
  ...{ levelL: 40, usableL: 38, belowIntakeL: 2, alkalinityMeqL: 20, readyAt: null, levelAt: NOW, litresPerDay: 6 },
  ...{ emptyAt: null, wholeDoseMeqL: 0.8, heightMm: null, footprintCm2: null, intakeMm: null, covered: true },
  ...{ pumpLPerH: null, replaceDays: null, sludgeWeeks: 6, onlineSince: NOW, dueAt: null, sludgeDueAt: null },
  ...{ lastCheck: null, strengthLow: false, feeds: [], retiredAt: null, version: 1 },
};

/** A tested system that takes 1 a day, with a half width of 0.02. */
function glance({ gets = 1 as number | null, enough = true, online = ONLINE as Reservoir | null } = {}): WaterSystem {
  const basis = { from: 0, to: NOW, readings: 14, windowDays: 28 };
  return {
    system: {
      ...{ id: 'A', code: 'A', name: 'Bay', kind: 'growout', netVolumeL: 1000, surfaceM2: null, note: '' },
      ...{ createdAt: 0, version: 1 },
    },
    latest: [{ parameter: 'alkalinity', value: 8, takenAt: NOW, method: '', band: null, state: 'none' }],
    demand: enough
      ? { enough: true, ...basis, demand: 1, low: 0.98, high: 1.02 }
      : { enough: false, ...basis, reason: 'too_few_readings' },
    carried: { limewater: gets, others: 0, waterChanges: 0 },
    ...{ online, standby: 0, plugs: 0, recent: [], alerts: [] },
  };
}

describe('a system in a few words', () => {
  it('when limewater carries part of the demand, that part is told; where either is not known, it is not', () => {
    expect(limeShareOf(glance({ gets: 0.62 }))).toBeCloseTo(0.62, 12);
    expect(limeShareOf(glance({ gets: null }))).toBeNull();
    expect(limeShareOf(glance({ enough: false }))).toBeNull();
    expect(limeShareOf(glance({ online: null }))).toBeNull();
  });

  it.each([
    ['less is given than taken', { gets: 0.6 }, 'slips 0.40 a day'],
    ['as much is given as taken', { gets: 1 }, 'holds'],
    ['tests are too few', { enough: false }, 'not known yet'],
  ])('when %s, says what alkalinity does', (_, fields, words) => {
    expect(movementOf(glance(fields), WORDS)).toBe(words);
  });

  it('when the reservoir runs dry within the day, says what follows it', () => {
    const online = { ...ONLINE, emptyAt: NOW + 3_600_000 };

    expect(nextOf(glance({ online }), NOW)).toBe('Mix limewater: no other reservoir is ready.');
    expect(nextOf({ ...glance({ online }), standby: 1 }, NOW)).toBe('Put the next reservoir online.');
  });

  it.each([
    ['it holds', {}, 'Nothing to do.'],
    ['it slips', { gets: 0.6 }, 'See the system for the mix that would hold it.'],
    ['tests are too few', { enough: false }, 'Test alkalinity on three days.'],
    ['its limewater is not known', { gets: null }, 'Log the level of its reservoir.'],
  ])('when %s, says what to do next', (_, fields, words) => {
    expect(nextOf(glance(fields), NOW)).toBe(words);
  });

  it('when an alert begins with the name of its system, the name is left out beside it', () => {
    const value = { quantity: 'alkalinity' as const, value: 2.6 };

    expect(withoutName(['A Bay: alkalinity ', value], 'A Bay')).toEqual(['Alkalinity ', value]);
    expect(withoutName(['Reservoir LW-C1 empty'], 'A Bay')).toEqual(['Reservoir LW-C1 empty']);
  });
});
