import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { MS_PER_DAY } from '../../../shared/domain/days.ts';
import {
  fifo,
  limeForDemand,
  reorderAdvice,
  safetyStock,
  usePerDay,
  type ReorderInputs,
  type SupplyLot,
} from '../../../shared/domain/supplies.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import fifoReference from '../../reference/fifo.json' with { type: 'json' };
import inventory from '../../reference/inventory.json' with { type: 'json' };
import { domainErrorOf } from '../../support/domain-error.ts';

const MICRO = 1_000_000;
const lot = (lotId: string, quantity: number, costMicro: number): SupplyLot => ({ lotId, quantity, costMicro });
const total = (list: readonly { costMicro: number }[]) => list.reduce((sum, { costMicro }) => sum + costMicro, 0);

describe('taking from lots', () => {
  it.each(fifoReference.cases)(
    'costs what first in, first out says: $id',
    ({ moves, outs, endingQuantity, endingValue }) => {
      let lots: SupplyLot[] = [];
      const costs: number[] = [];
      const layers: number[][][] = [];
      for (const [index, { kind, quantity, unitCost = 0 }] of moves.entries()) {
        if (kind === 'in') {
          lots = [...lots, lot(`lot${index}`, quantity, Math.round(quantity * unitCost * MICRO))];
          continue;
        }
        const result = fifo(lots, quantity);
        costs.push(result.costMicro / MICRO);
        layers.push(result.takes.map((take) => [take.quantity, take.costMicro / MICRO / take.quantity]));
        lots = result.rest;
      }
      expect(costs).toEqual(outs.map(({ cost }) => cost));
      expect(layers).toEqual(
        outs.map((out) => out.layers.map(([quantity = 0, cost = 0]) => [quantity, expect.closeTo(cost, 9)])),
      );
      expect(lots.reduce((sum, { quantity }) => sum + quantity, 0)).toBe(endingQuantity);
      expect(total(lots)).toBe(Math.round(endingValue * MICRO));
    },
  );

  it('splits a lot to the micro-unit and leaves the rest with it', () => {
    expect(fifo([lot('a', 3, 100)], 1)).toEqual({
      takes: [lot('a', 1, 33)],
      costMicro: 33,
      rest: [lot('a', 2, 67)],
    });
  });

  it('when three thirds are taken one by one, they add up to the whole lot', () => {
    const first = fifo([lot('a', 3, 100)], 1);
    const second = fifo(first.rest, 1);
    const third = fifo(second.rest, 1);
    expect(first.costMicro + second.costMicro + third.costMicro).toBe(100);
    expect(third.rest).toEqual([]);
  });

  it('when rounding of tenths leaves a hair, takes the lot whole', () => {
    const lots = [lot('a', 0.1 + 0.2, 100)];
    expect(fifo(lots, 0.3)).toMatchObject({ costMicro: 100, rest: [] });
    expect(fifo([lot('a', 0.3, 100)], 0.1 + 0.2)).toMatchObject({ costMicro: 100, rest: [] });
  });

  it('when nothing is taken, nothing changes', () => {
    const lots = [lot('a', 5, 100), lot('b', 5, 200)];
    expect(fifo(lots, 0)).toEqual({ takes: [], costMicro: 0, rest: lots });
  });

  it('when there is too little, refuses and tells what there is', () => {
    const error = domainErrorOf(() => fifo([lot('a', 5, 100)], 5.1));
    expect(error.code).toBe('supply.not_enough');
    expect(error.details).toMatchObject({ wanted: 5.1, onHand: 5 });
    expect(domainErrorOf(() => fifo([], 1)).code).toBe('supply.not_enough');
  });

  it.each([-1, Number.NaN, Number.POSITIVE_INFINITY])('when %d is wanted, refuses', (quantity) => {
    expect(domainErrorOf(() => fifo([lot('a', 5, 100)], quantity)).code).toBe('input.invalid');
  });

  const lots = fc.array(
    fc.record({
      lotId: fc.uuid(),
      quantity: fc.integer({ min: 1, max: 25_000_000 }).map((thousandths) => thousandths / 1000),
      costMicro: fc.integer({ min: 0, max: 1e12 }),
    }),
    { minLength: 1, maxLength: 6 },
  );

  it('conserves cost and amount over any run of takes', () => {
    fc.assert(
      fc.property(lots, fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 12 }), (list, parts) => {
        let rest: SupplyLot[] = list;
        let [taken, cost] = [0, 0];
        for (const part of parts) {
          const quantity = part * rest.reduce((sum, each) => sum + each.quantity, 0);
          const result = fifo(rest, quantity);
          expect(result.costMicro).toBe(total(result.takes));
          taken += result.takes.reduce((sum, each) => sum + each.quantity, 0);
          cost += result.costMicro;
          rest = result.rest;
        }
        expect(cost + total(rest)).toBe(total(list));
        const all = list.reduce((sum, each) => sum + each.quantity, 0);
        const left = rest.reduce((sum, each) => sum + each.quantity, 0);
        expect(Math.abs(taken + left - all)).toBeLessThanOrEqual(1e-9 * all);
        expect(rest.every(({ quantity, costMicro }) => quantity > 0 && costMicro >= 0)).toBe(true);
      }),
    );
  });

  it('opens a later lot only when every earlier one is used up', () => {
    fc.assert(
      fc.property(lots, fc.double({ min: 0, max: 1, noNaN: true }), (list, part) => {
        const { rest, takes } = fifo(list, part * list.reduce((sum, each) => sum + each.quantity, 0));
        const opened = takes.length;
        expect(takes.map(({ lotId }) => lotId)).toEqual(list.slice(0, opened).map(({ lotId }) => lotId));
        expect(list.length - rest.length).toBeGreaterThanOrEqual(opened - 1);
      }),
    );
  });
});

describe('use a day', () => {
  it('is all that was used in the window over its days', () => {
    const uses = [0, 1, 4, 9, 11].map((day) => ({ at: day * MS_PER_DAY, quantity: 30 }));
    expect(usePerDay(uses, 0, 10 * MS_PER_DAY)).toBe(9);
    expect(usePerDay([], 0, 10 * MS_PER_DAY)).toBe(0);
    expect(usePerDay(uses, 5, 5)).toBe(0);
  });
});

describe('reorder point', () => {
  // First case: Taylor, Introduction to Management Science, published with z 1.65; the others from the formula.
  it.each(inventory.reorderPoints.filter(({ z }) => z > 0))('$id', (row) => {
    expect(safetyStock(row)).toBeCloseTo(row.safetyStock, 9);
    const advice = reorderAdvice({ ...row, ...{ onHand: 0, safetyDays: 0, packSize: 1, today: '2026-01-05' } });
    expect(advice.reorderPoint).toBeCloseTo(row.reorderPoint, 9);
    if (row.published) expect(Math.abs(advice.reorderPoint - row.published.reorder_point)).toBeLessThan(0.1);
  });
});

describe('reorder advice', () => {
  // 20 kg of lime at 500 g a day, ten days' lead, five safety days, sacks of 25 kg.
  const lime = (changes: Partial<ReorderInputs> = {}): ReorderInputs => ({
    ...{ onHand: 20_000, usePerDay: 500, leadTimeDays: 10, safetyDays: 5, packSize: 25_000, today: '2026-12-01' },
    ...changes,
  });

  it.each(inventory.stockouts)('names the out day and the last day to order: $id', (row) => {
    const { today, stock, usePerDay: perDay, leadTimeDays } = row;
    const advice = reorderAdvice({
      ...{ onHand: stock, usePerDay: perDay, leadTimeDays, today },
      safetyDays: 0,
      packSize: 1,
    });
    expect(advice.daysLeft).toBeCloseTo(row.daysLeft, 9);
    expect(advice.outDay).toBe(row.outDay);
    expect(advice.orderByDay).toBe(row.orderByDay);
  });

  // 40 days left; order by day 25; reorder at 7.5 kg; to 7.5 + 30 = 37.5 kg: 17.5 kg short, one sack.
  it('is worked from use, lead time and safety days', () => {
    expect(reorderAdvice(lime())).toEqual({
      ...{ daysLeft: 40, outDay: '2027-01-10', orderByDay: '2026-12-26', orderNow: false },
      ...{ orderPacks: 1, orderQuantity: 25_000, reorderPoint: 7500 },
    });
  });

  it('when it is already late, says to order now', () => {
    const advice = reorderAdvice(lime({ onHand: 4000 }));
    expect(advice).toMatchObject({ daysLeft: 8, outDay: '2026-12-09', orderByDay: '2026-12-01', orderNow: true });
    expect(advice.orderPacks).toBe(2);
  });

  it('counts what is on the way for the order, but not for what is there', () => {
    const advice = reorderAdvice(lime({ onHand: 4000, onOrder: 50_000 }));
    expect(advice).toMatchObject({ daysLeft: 8, orderNow: false, orderPacks: 0, orderQuantity: 0 });
    expect(advice.orderByDay).toBe('2027-03-04');
  });

  it('when use varies much, keeps more than the safety days', () => {
    const calm = reorderAdvice(lime({ sdPerDay: 50 }));
    const wild = reorderAdvice(lime({ sdPerDay: 900 }));
    expect(calm.reorderPoint).toBe(7500);
    expect(wild.reorderPoint).toBeCloseTo(5000 + 1.6448536 * 900 * Math.sqrt(10), 2);
    expect(wild.orderByDay && calm.orderByDay && wild.orderByDay < calm.orderByDay).toBe(true);
  });

  it('when nothing is used, there is nothing to order', () => {
    expect(reorderAdvice(lime({ usePerDay: 0 }))).toEqual({
      ...{ daysLeft: null, outDay: null, orderByDay: null, orderNow: false },
      ...{ orderPacks: 0, orderQuantity: 0, reorderPoint: 0 },
    });
  });

  it('when the stock outlasts ten years, names no day', () => {
    expect(reorderAdvice(lime({ usePerDay: 0.001 }))).toMatchObject({
      outDay: null,
      orderByDay: null,
      orderNow: false,
    });
  });

  it('when a count went below zero, nothing is left', () => {
    expect(reorderAdvice(lime({ onHand: -300 }))).toMatchObject({ daysLeft: 0, outDay: '2026-12-01', orderNow: true });
  });

  it.each([
    ['a pack of nothing', { packSize: 0 }],
    ['a negative use', { usePerDay: -1 }],
    ['a use that is no number', { usePerDay: Number.NaN }],
    ['a negative lead time', { leadTimeDays: -1 }],
    ['negative safety days', { safetyDays: -1 }],
  ] satisfies [string, Partial<ReorderInputs>][])('refuses %s', (_, changes) => {
    expect(domainErrorOf(() => reorderAdvice(lime(changes))).code).toBe('domain.out_of_range');
  });

  it('orders whole packs that reach the cover, and never a pack too many', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 50_000 }),
        fc.integer({ min: 1, max: 2000 }),
        fc.integer({ min: 1, max: 25_000 }),
        (onHand, perDay, packSize) => {
          const advice = reorderAdvice(lime({ onHand, usePerDay: perDay, packSize }));
          const target = advice.reorderPoint + perDay * 60;
          expect(Number.isInteger(advice.orderPacks)).toBe(true);
          expect(onHand + advice.orderQuantity).toBeGreaterThanOrEqual(target - 1e-3);
          if (advice.orderPacks > 0) expect(onHand + advice.orderQuantity - packSize).toBeLessThan(target + 1e-3);
        },
      ),
    );
  });

  it.each([
    [14, true],
    [15, true],
    [16, false],
  ])('with %i days left and a reorder point of 15 days, says to order now: %s', (days, orderNow) => {
    expect(reorderAdvice(lime({ onHand: days * 500 })).orderNow).toBe(orderNow);
  });
});

describe('lime for a demand', () => {
  // 1 dKH per 1,000 L takes 13.2 g of pure calcium hydroxide (arithmetic from the molar mass).
  it('of one dKH in a thousand litres is 13.2 g', () => {
    expect(limeForDemand(MEQ_PER_DKH * 1000, 1)).toBeCloseTo(13.2125, 3);
    expect(limeForDemand(MEQ_PER_DKH * 1000, 0.9)).toBeCloseTo(13.2125 / 0.9, 3);
  });

  // A 2,000 L system at 1 dKH a day takes 2.6 kg in 14 weeks.
  it('of fourteen weeks at one dKH a day in 2,000 L is 2.6 kg', () => {
    expect(limeForDemand(MEQ_PER_DKH * 2000 * 98, 1) / 1000).toBeCloseTo(2.6, 1);
  });

  it.each([0, -0.5, 1.1, Number.NaN])('when purity is %d, refuses', (purity) => {
    expect(domainErrorOf(() => limeForDemand(100, purity)).code).toBe('domain.out_of_range');
  });
});
