import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { survivalCurve, type FollowedPlug } from '../../../shared/domain/survival.ts';
import reference from '../../reference/survival.json' with { type: 'json' };

const followed = fc.array(fc.record({ day: fc.nat(200), lost: fc.boolean() }), { minLength: 1, maxLength: 60 });

describe('survivalCurve', () => {
  it.each(reference.cases)('when given $id, is the curve that R survival has (Freireich et al. 1963)', (given) => {
    const plugs: FollowedPlug[] = given.time.map((day, index) => ({ day, lost: given.status[index] === 1 }));

    const steps = survivalCurve(plugs);

    expect(steps.map(({ day, atRisk, lost }) => [day, atRisk, lost])).toEqual(
      given.table.map(({ t, atRisk, events }) => [t, atRisk, events]),
    );
    steps.forEach(({ survival, standardError, low, high }, index) => {
      const row = given.table[index];
      expect(survival).toBeCloseTo(row?.survival ?? NaN, 12);
      if (survival > 1e-9) expect(standardError).toBeCloseTo(row?.greenwoodSe ?? NaN, 12);
      // At zero R has no band; ours is then zero.
      if (survival > 1e-9) expect([low, high]).toEqual([near(row?.low), near(row?.high)]);
    });
  });

  it('when none was lost, has no step; when all were lost at once, falls to zero', () => {
    expect(survivalCurve([{ day: 30, lost: false }])).toEqual([]);
    expect(survivalCurve([])).toEqual([]);
    expect(survivalCurve([2, 2, 2].map((day) => ({ day, lost: true })))).toEqual([
      { day: 2, atRisk: 3, lost: 3, survival: 0, standardError: null, low: 0, high: 0 },
    ]);
  });

  it('when one leaves alive on the day of a loss, it still counts as at risk on that day', () => {
    const steps = survivalCurve([
      { day: 5, lost: true },
      { day: 5, lost: false },
      { day: 9, lost: false },
      { day: 9, lost: false },
    ]);

    expect(steps).toMatchObject([{ day: 5, atRisk: 4, lost: 1, survival: 0.75 }]);
  });

  it('when plugs are any, the curve only falls, stays within 0 and 1 and inside its band', () => {
    fc.assert(
      fc.property(followed, (plugs) => {
        let before = 1;
        for (const { survival, low, high } of survivalCurve(plugs)) {
          expect(survival).toBeLessThan(before);
          expect(0 <= low && low <= survival && survival <= high && high <= 1).toBe(true);
          before = survival;
        }
      }),
    );
  });

  it('when nobody leaves alive, the last value is the share that lived', () => {
    fc.assert(
      fc.property(fc.array(fc.nat(50), { minLength: 1, maxLength: 40 }), fc.nat(40), (days, alive) => {
        const plugs = [
          ...days.map((day) => ({ day, lost: true })),
          ...Array.from({ length: alive }, () => ({ day: 60, lost: false })),
        ];
        expect(survivalCurve(plugs).at(-1)?.survival).toBeCloseTo(alive / plugs.length, 10);
      }),
    );
  });
});

function near(value: number | null | undefined): unknown {
  return expect.closeTo(value ?? NaN, 10);
}
