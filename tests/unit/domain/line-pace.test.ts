import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { addDays } from '../../../shared/domain/days.ts';
import { GROWTH_FORMS } from '../../../shared/domain/growth-forms.ts';
import {
  growthFormByCode,
  isRested,
  isSaleable,
  nextCutFrom,
  outlook,
  paceOf,
} from '../../../shared/domain/line-pace.ts';

const plain = { growthForm: 'massive', startMm: null, mmPerWeek: null, healDays: null };

describe('the pace of a line', () => {
  it('when the line says nothing of its own, its growth form speaks; what it says outweighs the form', () => {
    expect(paceOf(plain)).toEqual({ startMm: 15, mmPerWeek: 0.6, healDays: 21, restDays: 175 });
    expect(paceOf({ ...plain, mmPerWeek: 1.1, healDays: 0 })).toMatchObject({
      startMm: 15,
      mmPerWeek: 1.1,
      healDays: 0,
    });
  });

  it.each(GROWTH_FORMS)('when asked for $code, finds it', ({ code, label }) => {
    expect(growthFormByCode(code).label).toBe(label);
  });

  it('when the form is not known, refuses', () => {
    expect(() => growthFormByCode('tree')).toThrow('Choose a growth form from the list.');
  });
});

describe('the outlook of a piece', () => {
  const basis = { startMm: 12, mmPerWeek: 1, cutDay: '2026-01-05' };

  it('when it is too small and unhealed, says when it is neither', () => {
    expect(outlook(basis, 14, '2026-01-12')).toEqual({
      ...{ mm: 13, mmPerWeek: 1, grade: 'nub', healed: false, healedOn: '2026-01-19' },
      ...{ saleableOn: '2026-01-26', measuredOn: null },
    });
  });

  it('when it was measured, growth goes on from there', () => {
    const measured = { day: '2026-01-19', mm: 20 };

    expect(outlook({ ...basis, measured }, 14, '2026-02-02')).toMatchObject({
      mm: 22,
      grade: 'small',
      measuredOn: '2026-01-19',
    });
  });

  it('when the day of sale is known, it is saleable then and not the day before', () => {
    const range = { startMm: fc.integer({ min: 1, max: 30 }), pace: fc.integer({ min: 1, max: 50 }), heal: fc.nat(60) };
    fc.assert(
      fc.property(fc.record(range), ({ startMm, pace, heal }) => {
        const piece = { startMm, mmPerWeek: pace / 10, cutDay: '2026-01-05' };
        const { saleableOn } = outlook(piece, heal, '2026-01-05');
        if (saleableOn === null) return;
        expect(isSaleable(outlook(piece, heal, saleableOn))).toBe(true);
        if (saleableOn > '2026-01-05') expect(isSaleable(outlook(piece, heal, addDays(saleableOn, -1)))).toBe(false);
      }),
    );
  });
});

describe('the rest of a mother', () => {
  it.each([
    ['2026-03-11', false],
    ['2026-03-12', true],
    ['2025-12-31', false],
  ])('when it was cut on 1 January and rests 70 days, on %s rested is %s', (day, rested) => {
    expect(isRested('2026-01-01', 70, day)).toBe(rested);
    expect(nextCutFrom('2026-01-01', 70)).toBe('2026-03-12');
  });

  it('when it was never cut, it has rested', () => {
    expect(isRested(null, 70, '2026-01-01')).toBe(true);
    expect(nextCutFrom(null, 70)).toBeNull();
  });
});
