import { describe, expect, it } from 'vitest';
import type { DosingRate } from '@shared/contracts/dosing.ts';
import type { WaterChangePlan, WaterChangePlans } from '@shared/contracts/water-change-plans.ts';
import { dosingSentence } from '@/views/water/dosing-sentence.ts';
import { bringsADay, clockWords, minuteOf, windowWords } from '@/views/water/dosing-words.ts';
import { changesSentence, habitWords } from '@/views/water/water-change-words.ts';

const DAY = 86_400_000;
const NOW = Date.parse('2026-03-02T09:00:00Z');

function aRate(fields: Partial<DosingRate> = {}): DosingRate {
  return {
    ...{ id: 'r', systemId: 's', systemCode: 'A', itemId: 'i', itemName: 'Alkalinity part', unit: 'mL' },
    ...{ pumpId: null, pumpCode: null, amountPerDay: 50, givenPerDay: 50, window: null, fromAt: NOW, toAt: null },
    ...{ by: 'A person', endedBy: null, note: '', unbooked: 0, lastsUntil: NOW + 3 * DAY },
    brings: { alkalinityMeqL: 0.1, calciumMgL: 0, magnesiumMgL: 0 },
    ...fields,
  };
}

function aPlan(code: string, fields: Partial<WaterChangePlan> = {}): WaterChangePlan {
  return {
    ...{ systemId: code, systemCode: code, systemName: code, netVolumeL: 1000, last: null, nextOn: '2026-03-05' },
    plan: { everyDays: 14, fraction: 0.06, startOn: '2026-03-01', litres: 60, by: 'A person' },
    daysLate: 0,
    levels: { alkalinity: null, calcium: null, magnesium: null, nitrate: null, salinity: null },
    ...fields,
  };
}

function plansOf(items: WaterChangePlan[], coming: WaterChangePlans['coming'] = []): WaterChangePlans {
  return { items, coming, horizonDays: 28, salinity: 35, readyL: 0, saltOnHandG: 20_000 };
}

const words = ({ before, number, after }: { before: string; number: string; after: string }) => before + number + after;
const day = (at: number) => new Date(at).toISOString().slice(0, 10);
const litres = (value: number) => `${value} L`;

describe('what is said of dosing', () => {
  it('when nothing runs, says where to begin', () => {
    expect(words(dosingSentence({ rates: [], pumps: [], solutions: [] }, day, NOW))).toBe(
      'Nothing is dosed steadily. Write a recipe, make a batch, and start a dose on a system’s page.',
    );
  });

  it('when a bottle runs dry within a week, names it and what to do', () => {
    const rates = [aRate(), aRate({ itemName: 'Calcium part', lastsUntil: NOW + 40 * DAY })];
    expect(words(dosingSentence({ rates, pumps: [], solutions: [] }, day, NOW))).toBe(
      '2 doses run. Alkalinity part lasts until 2026-03-05. Order it before then.',
    );
  });

  it('when nothing is told of how long it lasts, says only what runs', () => {
    const rates = [aRate({ lastsUntil: null })];
    expect(words(dosingSentence({ rates, pumps: [], solutions: [] }, day, NOW))).toBe('1 dose runs.');
  });

  it('names what a dose brings and when it runs', () => {
    const both = aRate({ brings: { alkalinityMeqL: 0.1, calciumMgL: 2, magnesiumMgL: 0 } });
    expect(bringsADay(both, (meqL) => `${meqL} meq/L`)).toBe('0.1 meq/L and 2.0 mg/L calcium a day');
    expect(windowWords(null)).toBe('all day');
    expect(windowWords({ startMinute: 22 * 60, endMinute: 6 * 60 + 5 })).toBe('22:00 to 06:05');
  });

  it.each([
    ['22:00', 1320],
    ['06:05', 365],
    ['24:00', null],
    ['', null],
  ])('reads the time %j as %s', (clock, minute) => {
    expect(minuteOf(clock)).toBe(minute);
    if (minute !== null) expect(clockWords(minute)).toBe(clock);
  });
});

describe('what is said of water changes', () => {
  it('when no system has a habit, says what to do', () => {
    expect(words(changesSentence(plansOf([aPlan('A', { plan: null })]), '2026-03-02', { litres }))).toContain(
      'No system has a habit',
    );
  });

  it('when some are due, adds them up', () => {
    const plans = plansOf([aPlan('A', { nextOn: '2026-03-01' }), aPlan('B', { nextOn: '2026-03-02' }), aPlan('C')]);
    expect(words(changesSentence(plans, '2026-03-02', { litres }))).toBe(
      'Due now: A and B, 120 L of new water in all. The next 28 days want 0.0 kg of salt; 20.0 kg is in store.',
    );
  });

  it('when salt runs short, says with which change', () => {
    const short = {
      on: '2026-03-05',
      systemId: 'A',
      systemCode: 'A',
      litres: 60,
      saltG: 2280,
      leftL: 0,
      saltLeftG: -80,
    };
    expect(words(changesSentence(plansOf([aPlan('A')], [short]), '2026-03-02', { litres }))).toBe(
      'Next, Thursday: A, 60 L of new water in all. Salt in store runs out with the change of A (Thursday): order before then.',
    );
  });

  it('names a habit in short', () => {
    expect(habitWords(aPlan('A'))).toBe('6 % every 14 days');
    expect(habitWords(aPlan('A', { plan: null }))).toBe('no habit set');
  });
});
