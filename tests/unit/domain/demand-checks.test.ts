import { describe, expect, it } from 'vitest';
import { demandChecks, type CheckFacts } from '../../../shared/domain/demand-checks.ts';
import type { DemandChange } from '../../../shared/domain/demand/demand-change.ts';

const NOTHING: CheckFacts = {
  ...{ alkalinity: null, calcium: null, nitrateRise: null, change: null },
  ...{ ph: null, saturation: null, salinity: null, steps: [] },
};
const find = (facts: Partial<CheckFacts>) => demandChecks({ ...NOTHING, ...facts });

const ROSE: DemandChange = { direction: 'up', before: 0.3, now: 0.5, expected: 0.32, half: 0.06, since: 0 };

describe('calcium beside alkalinity: 20.04 mg for each meq of skeleton (40.078 g/mol, two eq a mol)', () => {
  const alkalinity = { value: 0.4, sd: 0.005 };

  it('when their ratio is that of skeleton within its error, agrees', () => {
    const [check] = find({ alkalinity, calcium: { value: 8.4, sd: 0.5 } });

    expect(check).toMatchObject({ code: 'calcium_agrees', ratio: 21 });
    // √(0.5² + (21 × 0.005)²) / 0.4 × 1.96.
    expect(check?.code === 'calcium_agrees' && check.half).toBeCloseTo(2.503, 3);
  });

  it('when calcium falls short, tells how much alkalinity goes without it', () => {
    const [check] = find({ alkalinity, calcium: { value: 4.008, sd: 0.3 } });

    expect(check).toMatchObject({ code: 'alkalinity_alone', nitrate: null });
    expect(check?.code === 'alkalinity_alone' && check.withoutCalcium).toBeCloseTo(0.2, 3);
  });

  it('when nitrate rises meanwhile, tells what making it takes: one meq for 62.004 mg', () => {
    const [check] = find({
      ...{ alkalinity, calcium: { value: 4, sd: 0.3 } },
      nitrateRise: { value: 1.24008, sd: 0.1 },
    });

    expect(check?.code === 'alkalinity_alone' && check.nitrate?.takes).toBeCloseTo(0.02, 6);
  });

  it('when nitrate may as well stand still, does not blame it', () => {
    const [check] = find({ alkalinity, calcium: { value: 4, sd: 0.3 }, nitrateRise: { value: 0.2, sd: 0.15 } });

    expect(check).toMatchObject({ code: 'alkalinity_alone', nitrate: null });
  });

  it('when more calcium goes than skeleton needs, says so', () => {
    expect(find({ alkalinity, calcium: { value: 12, sd: 0.5 } })).toMatchObject([{ code: 'calcium_exceeds' }]);
  });

  it.each([
    ['calcium is not tested', { alkalinity }],
    ['their ratio is off by no more than chance does now and then', { alkalinity, calcium: { value: 6.9, sd: 0.5 } }],
    ['calcium is too loosely known', { alkalinity, calcium: { value: 2, sd: 3 } }],
    ['alkalinity demand may be none', { alkalinity: { value: 0.01, sd: 0.01 }, calcium: { value: 0.1, sd: 0.01 } }],
  ])('when %s, says nothing', (_, facts) => {
    expect(find(facts)).toEqual([]);
  });
});

describe('a demand that rose', () => {
  it('with usual pH is told as a change', () => {
    expect(find({ change: ROSE, ph: 8.2, saturation: 4 })).toEqual([{ code: 'changed', ...ROSE }]);
  });

  it('with a high pH may be chalk that forms by itself', () => {
    expect(find({ change: ROSE, ph: 8.5, saturation: 4 })).toEqual([
      { code: 'may_precipitate', before: 0.3, now: 0.5, half: 0.06, ph: 8.5, saturation: null },
    ]);
  });

  it('with a high saturation may be so too', () => {
    expect(find({ change: ROSE, ph: 8.3, saturation: 6.4 })).toMatchObject([
      { code: 'may_precipitate', ph: null, saturation: 6.4 },
    ]);
  });

  it('and a fall at a high pH is a fall', () => {
    expect(find({ change: { ...ROSE, direction: 'down' }, ph: 8.6 })).toMatchObject([{ code: 'changed' }]);
  });

  it('within its error is nothing', () => {
    expect(find({ change: { ...ROSE, direction: 'none' }, ph: 8.6 })).toEqual([]);
  });
});

describe('salinity that moved', () => {
  const salinity = { before: { value: 34, sd: 0.1 }, now: { value: 35, sd: 0.1 }, level: 2.9 };

  it('tells by how much that alone moves the level', () => {
    const [check] = find({ salinity });

    expect(check).toMatchObject({ code: 'salinity_moved', from: 34, to: 35 });
    expect(check?.code === 'salinity_moved' && check.moves).toBeCloseTo(2.9 / 34, 9);
  });

  it('within the error of its tests, or by next to nothing, is not told', () => {
    expect(find({ salinity: { ...salinity, now: { value: 34.2, sd: 0.1 } } })).toEqual([]);
    expect(
      find({ salinity: { ...salinity, now: { value: 34.1, sd: 0.01 }, before: { value: 34, sd: 0.01 } } }),
    ).toEqual([]);
  });
});

it('steps that nobody logged come first', () => {
  expect(find({ steps: [{ at: 5, by: 0.8 }], change: ROSE }).map(({ code }) => code)).toEqual(['stepped', 'changed']);
});
