import fc from 'fast-check';
import { expect, it } from 'vitest';
import { consumptions, costShares } from '../../../server/db/schema/index.ts';
import { batchCosts } from '../../../server/queries/batch-cost.ts';
import { costOverview } from '../../../server/queries/cost-overview.ts';
import { bringCostsUpToDate } from '../../../server/services/cost-shares.ts';
import { dayOf, monthOf } from '../../../shared/domain/days.ts';
import { givenCut, givenLoss, givenPlaced, givenRack } from '../../support/given-stock.ts';
import { givenGlue, givenItem, givenLot, givenUse } from '../../support/given-supplies.ts';
import { givenSystem, givenTank } from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const DAY = 86_400_000;
const ZONE = 'Europe/Lisbon';
const SYSTEMS = 2;

type Step =
  | { act: 'cut'; system: number; pieces: number }
  | { act: 'move'; plug: number; system: number }
  | { act: 'lose'; plug: number }
  | { act: 'use'; system: number; item: number; amount: number; daysAgo: number }
  | { act: 'wait'; days: number }
  | { act: 'look' };

const system = fc.nat(SYSTEMS - 1);
const step: fc.Arbitrary<Step> = fc.oneof(
  fc.record({ act: fc.constant('cut' as const), system, pieces: fc.integer({ min: 1, max: 4 }) }),
  fc.record({ act: fc.constant('move' as const), plug: fc.nat(40), system }),
  fc.record({ act: fc.constant('lose' as const), plug: fc.nat(40) }),
  fc.record({
    act: fc.constant('use' as const),
    system,
    item: fc.nat(2),
    amount: fc.double({ min: 0.01, max: 40, noNaN: true }),
    daysAgo: fc.nat(25),
  }),
  fc.record({ act: fc.constant('wait' as const), days: fc.integer({ min: 1, max: 12 }) }),
  fc.record({ act: fc.constant('look' as const) }),
);

/** A second, plain account of where each piece was at the end of each day, kept beside the farm. */
class Diary {
  readonly batchOf = new Map<string, string>();
  readonly place = new Map<string, number | null>();
  readonly fragDays = new Map<string, number>();

  endOfDay(day: string): void {
    for (const [code, at] of this.place) {
      if (at === null) continue;
      const key = `${monthOf(day)} ${at} ${this.batchOf.get(code)}`;
      this.fragDays.set(key, (this.fragDays.get(key) ?? 0) + 1);
    }
  }
  living(): string[] {
    return [...this.place].flatMap(([code, at]) => (at === null ? [] : [code]));
  }
}

it('for any history, every unit of cost is at a batch or left with the farm, and shares follow the days that pieces stood', async () => {
  await fc.assert(
    fc.asyncProperty(fc.array(step, { minLength: 5, maxLength: 22 }), async (steps) => {
      const farm = await startFarm({ now: '2026-01-20T10:00:00Z' });
      const { systemIds, diary } = live(farm, steps);
      farm.write(bringCostsUpToDate);

      const shares = farm.db.select().from(costShares).all();
      const uses = farm.db.select().from(consumptions).all();
      const { months } = costOverview(farm.db, farm.deps.clock.now(), ZONE);

      // Nothing is made up and nothing is lost.
      const inBatches = batchCosts(farm.db).reduce((sum, cost) => sum + cost.totalMicro, 0);
      const withFarm = months.reduce((sum, month) => sum + month.unsharedMicro, 0);
      expect(inBatches + withFarm).toBe(uses.reduce((sum, use) => sum + use.costMicro, 0));

      for (const month of months) {
        const own = shares.filter((share) => share.month === month.month && share.systemId === month.systemId);
        expect(own.reduce((sum, share) => sum + share.costMicro, 0)).toBe(month.totalMicro - month.unsharedMicro);
        // All or nothing of a system's month stays with the farm.
        expect([0, month.totalMicro]).toContain(month.unsharedMicro);
      }
      for (const share of shares) {
        const key = `${share.month} ${systemIds.indexOf(share.systemId)} ${share.batchId}`;
        expect(share.fragDays).toBe(diary.fragDays.get(key));
        const pool = shares.filter((other) => samePool(share, other));
        const days = pool.reduce((sum, other) => sum + other.fragDays, 0);
        const cost = pool.reduce((sum, other) => sum + other.costMicro, 0);
        expect(Math.abs(share.costMicro - (cost * share.fragDays) / days)).toBeLessThan(1);
      }
    }),
    { numRuns: 25 },
  );
}, 60_000);

function samePool(a: typeof costShares.$inferSelect, b: typeof costShares.$inferSelect): boolean {
  return a.month === b.month && a.systemId === b.systemId && a.part === b.part;
}

function live(farm: TestFarm, steps: readonly Step[]): { systemIds: string[]; diary: Diary } {
  const systemIds = Array.from({ length: SYSTEMS }, () => givenSystem(farm));
  const racks = systemIds.map((id) => givenRack(farm, { tankId: givenTank(farm, id) }));
  const glueItemId = givenGlue(farm);
  const items = [givenItem(farm), givenItem(farm, { kind: 'vinegar', unit: 'mL', strength: 5 }), glueItemId];
  // Odd amounts and costs, in two lots each, so that shares of lots never come out even.
  for (const itemId of items) {
    givenLot(farm, itemId, { quantity: 37.3, costMinor: 1013 });
    givenLot(farm, itemId, { quantity: 4000, costMinor: 7177 });
  }
  const diary = new Diary();
  for (const each of steps) take(each);
  diary.endOfDay(dayOf(farm.deps.clock.now(), ZONE));
  return { systemIds, diary };

  function take(each: Step): void {
    switch (each.act) {
      case 'cut': {
        const target = { kind: 'rack' as const, rackId: racks[each.system] ?? '' };
        const cut = givenCut(farm, { pieces: each.pieces, glueItemId, gluePerPiece: 0.37, target });
        for (const { code } of cut.plugs) {
          diary.batchOf.set(code, cut.batchId);
          diary.place.set(code, each.system);
        }
        return;
      }
      case 'move': {
        const code = pick(each.plug);
        if (code === undefined || diary.place.get(code) === each.system) return;
        givenPlaced(farm, [code], racks[each.system] ?? '');
        diary.place.set(code, each.system);
        return;
      }
      case 'lose': {
        const code = pick(each.plug);
        if (code === undefined) return;
        givenLoss(farm, [code]);
        diary.place.set(code, null);
        return;
      }
      case 'use': {
        const at = farm.deps.clock.now() - each.daysAgo * DAY;
        const systemId = systemIds[each.system] ?? '';
        givenUse(farm, items[each.item] ?? '', each.amount, { systemId, at });
        return;
      }
      case 'wait':
        for (let day = 0; day < each.days; day += 1) {
          diary.endOfDay(dayOf(farm.deps.clock.now(), ZONE));
          farm.wait(DAY);
        }
        return;
      case 'look':
        // Looking in between must leave no trace in the end result.
        farm.write(bringCostsUpToDate);
    }
  }

  function pick(index: number): string | undefined {
    const living = diary.living();
    return living[index % Math.max(1, living.length)];
  }
}
