import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { addDays, daysBetween } from '../../../shared/domain/days.ts';
import {
  gradeByCode,
  gradeOf,
  GRADES,
  GROWTH_FORMS,
  isHealed,
  saleableDay,
  sizeEstimate,
  type SizeBasis,
} from '../../../shared/domain/growth.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

/** A frag of 28 mm cut on 25 August that grows 1.4 mm a week, 0.2 a day. */
function aFrag(changes: Partial<SizeBasis> = {}): SizeBasis {
  return { startMm: 28, mmPerWeek: 1.4, cutDay: '2026-08-25', ...changes };
}

const basis = fc
  .record({
    startMm: fc.integer({ min: 5, max: 60 }),
    mmPerWeek: fc.integer({ min: 0, max: 50 }).map((tenths) => tenths / 10),
    measured: fc.option(fc.record({ age: fc.integer({ min: 1, max: 300 }), mm: fc.integer({ min: 1, max: 150 }) })),
  })
  .map(({ measured, ...plan }): SizeBasis => {
    const cutDay = '2026-01-05';
    return measured
      ? { ...plan, cutDay, measured: { day: addDays(cutDay, measured.age), mm: measured.mm } }
      : { ...plan, cutDay };
  });

describe('grades', () => {
  // Common practice: nub to 1.5 cm, small frag 1.5–2.5, frag 2.5–4, large frag 4–7, colony 7–12, show above.
  it.each([
    [0, 'nub'],
    [14.9, 'nub'],
    [15, 'small'],
    [24.9, 'small'],
    [25, 'frag'],
    [39.9, 'frag'],
    [40, 'large'],
    [69.9, 'large'],
    [70, 'colony'],
    [119.9, 'colony'],
    [120, 'show'],
    [900, 'show'],
  ])('a piece of %d mm is %s', (sizeMm, code) => {
    expect(gradeOf(sizeMm).code).toBe(code);
  });

  it.each([-0.1, Number.NaN])('when the size is %d, refuses', (sizeMm) => {
    expect(domainErrorOf(() => gradeOf(sizeMm)).code).toBe('domain.out_of_range');
  });

  it('rise from zero, each found by its code', () => {
    const starts = GRADES.map(({ minMm }) => minMm);
    expect(starts).toEqual([...starts].sort((a, b) => a - b));
    expect(starts[0]).toBe(0);
    for (const grade of GRADES) {
      expect(gradeByCode(grade.code)).toBe(grade);
      expect(gradeOf(grade.minMm)).toBe(grade);
    }
  });
});

describe('size on a day', () => {
  it.each([
    ['2026-08-25', 28],
    ['2026-09-01', 29.4],
    ['2026-12-01', 47.6],
    ['2026-08-01', 28],
  ])('by plan on %s is %d mm', (day, mm) => {
    expect(sizeEstimate(aFrag(), day)).toBeCloseTo(mm, 9);
  });

  it.each([
    ['2026-11-03', 36, 'the day it was measured'],
    ['2026-11-10', 37.4, 'a week later'],
    ['2026-09-29', 32, 'half-way to it'],
    ['2026-08-25', 28, 'the cut day'],
  ])('when it was measured at 36 mm, on %s is %d mm (%s)', (day, mm) => {
    const measured = { day: '2026-11-03', mm: 36 };
    expect(sizeEstimate(aFrag({ measured }), day)).toBeCloseTo(mm, 9);
  });

  it('when it was measured on the cut day, starts from that', () => {
    const measured = { day: '2026-08-25', mm: 31 };
    expect(sizeEstimate(aFrag({ measured }), '2026-08-25')).toBe(31);
    expect(sizeEstimate(aFrag({ measured }), '2026-08-20')).toBe(31);
  });

  it('never drops below zero, even where a piece recedes', () => {
    expect(sizeEstimate(aFrag({ mmPerWeek: -5 }), '2027-08-25')).toBe(0);
  });
});

describe('the day a batch is saleable', () => {
  // 28 mm at 0.2 mm a day: 40 mm after 60 days, 24 October.
  it('is when it reaches the size', () => {
    expect(saleableDay(aFrag(), 40, 11)).toBe('2026-10-24');
  });

  it('when it is large enough from the start, is the day it has healed', () => {
    expect(saleableDay(aFrag(), 25, 11)).toBe('2026-09-05');
  });

  it('when a measurement lags behind the plan, moves out', () => {
    const measured = { day: '2026-10-06', mm: 34 };
    expect(saleableDay(aFrag({ measured }), 40, 11)).toBe('2026-11-05');
  });

  it('when a measurement ran ahead, lies on the way to it', () => {
    const measured = { day: '2026-10-04', mm: 48 };
    expect(saleableDay(aFrag({ measured }), 40, 11)).toBe('2026-09-18');
  });

  it.each([0, -1, 0.001])('when it grows %d mm a week, never comes', (mmPerWeek) => {
    expect(saleableDay(aFrag({ mmPerWeek }), 40, 11)).toBeNull();
  });

  it('is the first day on which it is both healed and of the size', () => {
    fc.assert(
      fc.property(basis, fc.constantFrom(25, 40, 70), fc.integer({ min: 0, max: 40 }), (each, minMm, healDays) => {
        const day = saleableDay(each, minMm, healDays);
        if (day === null) return;
        expect(sizeEstimate(each, day)).toBeGreaterThanOrEqual(minMm - 1e-6);
        expect(isHealed(each.cutDay, healDays, day)).toBe(true);
        const before = addDays(day, -1);
        expect(!isHealed(each.cutDay, healDays, before) || sizeEstimate(each, before) < minMm + 1e-6).toBe(true);
      }),
    );
  });

  it('when it never comes, the size is not there ten years on', () => {
    fc.assert(
      fc.property(basis, fc.constantFrom(40, 70), (varied, minMm) => {
        const each = { ...varied, mmPerWeek: 0 };
        fc.pre(saleableDay(each, minMm, 10) === null);
        expect(sizeEstimate(each, addDays(each.measured?.day ?? each.cutDay, 3600))).toBeLessThan(minMm);
      }),
    );
  });
});

describe('healing', () => {
  it.each([
    ['2026-09-04', false],
    ['2026-09-05', true],
    ['2026-08-01', false],
  ])('of eleven days, on %s is done: %s', (day, healed) => {
    expect(isHealed('2026-08-25', 11, day)).toBe(healed);
  });
});

describe('growth forms', () => {
  it.each(GROWTH_FORMS)('$code: starts healed and sells within a year, with plausible figures', (form) => {
    const { startMm, mmPerWeek, healDays, restDays, survival } = form;
    expect(startMm).toBeGreaterThanOrEqual(10);
    expect(startMm).toBeLessThanOrEqual(50);
    expect(healDays).toBeLessThan(restDays);
    expect(survival).toBeGreaterThan(0.5);
    expect(survival).toBeLessThan(1);
    const day = saleableDay({ startMm, mmPerWeek, cutDay: '2026-01-01' }, 25, healDays);
    expect(day && daysBetween('2026-01-01', day)).toBeLessThan(365);
  });

  it('have each code and label once', () => {
    expect(new Set(GROWTH_FORMS.map(({ code }) => code)).size).toBe(GROWTH_FORMS.length);
    expect(new Set(GROWTH_FORMS.map(({ label }) => label)).size).toBe(GROWTH_FORMS.length);
  });
});
