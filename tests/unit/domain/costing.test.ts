import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  costPerLivingFrag,
  fragDays,
  shareMonth,
  staysOf,
  type Stay,
  type StockChange,
} from '../../../shared/domain/costing.ts';
import { addDays, eachDay, monthOf } from '../../../shared/domain/days.ts';

const change = (day: string, pieces: number, batchId = 'b1', systemId = 'A'): StockChange => ({
  ...{ day, pieces, batchId, systemId },
});
const stay = (from: string, to: string, pieces: number, batchId = 'b1', systemId = 'A'): Stay => ({
  ...{ from, to, pieces, batchId, systemId },
});

describe('stays', () => {
  it('run from one change to the next, and to the end asked for', () => {
    expect(staysOf([change('2026-03-10', 20), change('2026-03-15', -3)], '2026-04-01')).toEqual([
      stay('2026-03-10', '2026-03-15', 20),
      stay('2026-03-15', '2026-04-01', 17),
    ]);
  });

  it('when a batch moves to another system, end here and begin there', () => {
    const moves = [change('2026-03-10', 20), change('2026-03-20', -20), change('2026-03-20', 20, 'b1', 'B')];
    expect(staysOf(moves, '2026-04-01')).toEqual([
      stay('2026-03-10', '2026-03-20', 20),
      stay('2026-03-20', '2026-04-01', 20, 'b1', 'B'),
    ]);
  });

  it('when pieces come and go on one day, count for nothing', () => {
    expect(staysOf([change('2026-03-10', 20), change('2026-03-10', -20)], '2026-04-01')).toEqual([]);
  });

  it('leave out what happens on the end day or after', () => {
    expect(staysOf([change('2026-04-01', 20), change('2026-05-01', 5)], '2026-04-01')).toEqual([]);
  });
});

describe('frag-days', () => {
  // 20 pieces from 25 March to 3 April: 7 days of March, 2 of April.
  it('are counted month by month, the last day not included', () => {
    expect(fragDays([stay('2026-03-25', '2026-04-03', 20)])).toEqual([
      { batchId: 'b1', systemId: 'A', month: '2026-03', fragDays: 140 },
      { batchId: 'b1', systemId: 'A', month: '2026-04', fragDays: 40 },
    ]);
  });

  it('of one batch in one system add up, of others stay apart', () => {
    const rows = fragDays([
      stay('2026-02-01', '2026-02-03', 5),
      stay('2026-02-03', '2026-02-04', 4),
      stay('2026-02-01', '2026-02-02', 9, 'b2'),
      stay('2026-02-01', '2026-02-02', 7, 'b1', 'B'),
    ]);
    expect(rows.map(({ batchId, systemId, fragDays: days }) => [batchId, systemId, days])).toEqual([
      ['b1', 'A', 14],
      ['b2', 'A', 9],
      ['b1', 'B', 7],
    ]);
  });

  it('agree with counting every piece on every day', () => {
    const anyChange = fc.record({
      batchId: fc.constantFrom('b1', 'b2'),
      systemId: fc.constantFrom('A', 'B'),
      day: fc.integer({ min: 0, max: 120 }).map((count) => addDays('2027-12-10', count)),
      pieces: fc.integer({ min: 0, max: 30 }),
    });
    fc.assert(
      fc.property(fc.array(anyChange, { maxLength: 15 }), (changes) => {
        const counted = new Map<string, number>();
        for (const day of eachDay('2027-12-10', '2028-03-31')) {
          for (const { batchId, systemId, day: from, pieces } of changes) {
            if (from > day) continue;
            const key = [monthOf(day), systemId, batchId].join();
            counted.set(key, (counted.get(key) ?? 0) + pieces);
          }
        }
        const rows = fragDays(staysOf(changes, '2028-04-01'));
        expect(new Map(rows.map((row) => [[row.month, row.systemId, row.batchId].join(), row.fragDays]))).toEqual(
          new Map([...counted].filter(([, days]) => days > 0)),
        );
      }),
    );
  });
});

describe('sharing a month', () => {
  it('gives each batch its part by frag-days, to the last micro-unit', () => {
    const batches = [
      { batchId: 'a', fragDays: 300 },
      { batchId: 'b', fragDays: 300 },
      { batchId: 'c', fragDays: 300 },
    ];
    expect(shareMonth(100, batches)).toEqual({
      shares: [
        { batchId: 'a', costMicro: 34 },
        { batchId: 'b', costMicro: 33 },
        { batchId: 'c', costMicro: 33 },
      ],
      unsharedMicro: 0,
    });
  });

  it('when nothing stood in the system, leaves the cost with the farm', () => {
    expect(shareMonth(5_000_000, [])).toEqual({ shares: [], unsharedMicro: 5_000_000 });
    expect(shareMonth(5_000_000, [{ batchId: 'a', fragDays: 0 }])).toEqual({ shares: [], unsharedMicro: 5_000_000 });
  });

  it('never loses or makes a micro-unit', () => {
    const batches = fc.array(fc.record({ batchId: fc.uuid(), fragDays: fc.integer({ min: 0, max: 20_000 }) }), {
      maxLength: 40,
    });
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e13 }), batches, (pool, list) => {
        const { shares, unsharedMicro } = shareMonth(pool, list);
        expect(shares.reduce((sum, { costMicro }) => sum + costMicro, 0) + unsharedMicro).toBe(pool);
        expect(shares.every(({ costMicro }) => Number.isInteger(costMicro) && costMicro >= 0)).toBe(true);
      }),
    );
  });
});

describe('cost of a living frag', () => {
  // At 85 % survival each survivor carries 1.18 of the cost.
  it('has the survivors carry the lost', () => {
    const perCut = 1_000_000;
    expect(costPerLivingFrag(100 * perCut, 85)).toBe(1_176_471);
    expect(costPerLivingFrag(0, 85)).toBe(0);
  });

  // 14,270 over 2,960 graded frags is 4.82 each.
  it('of a farm quarter is its total over its frags', () => {
    expect((costPerLivingFrag(14_270_000_000, 2960) ?? 0) / 1e6).toBeCloseTo(4.82, 2);
  });

  it.each([0, -1])('when %i are left, is not known', (survivors) => {
    expect(costPerLivingFrag(1_000_000, survivors)).toBeNull();
  });
});
