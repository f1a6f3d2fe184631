import { beforeEach, describe, expect, it } from 'vitest';
import { availableByBatch } from '../../../server/queries/availability.ts';
import { batchPieces } from '../../../server/queries/batch-pieces.ts';
import { holds, listings, orderLines, orders } from '../../../server/db/schema/index.ts';
import { rackPlace } from '../../../server/queries/places.ts';
import { releaseStock } from '../../../server/services/withhold-stock.ts';
import { undoCut } from '../../../server/services/undo-stock.ts';
import {
  givenColony,
  givenCut,
  givenLine,
  givenLoss,
  givenRack,
  givenRackIn,
  givenSaleableBatch,
  givenWithheld,
} from '../../support/given-stock.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const DAY = '2026-03-02';

describe('what can be promised', () => {
  let farm: TestFarm;

  beforeEach(async () => {
    farm = await startFarm();
  });

  const available = (day = DAY) => availableByBatch(farm.db, { day });

  it('when a batch is healed and large enough, counts every piece on a rack, in its grade by expected size', () => {
    const { batchId, batchCode } = givenSaleableBatch(farm);

    // 17 weeks at 1.8 mm a week on a start of 25 mm: 55.6 mm, a large frag. Healed after 8 days, and over 15 mm then.
    expect(available()).toEqual([
      expect.objectContaining({
        ...{ batchId, batchCode, grade: 'large', saleable: 10, held: 0, available: 10, readyOn: '2025-11-11' },
        sizeMm: expect.closeTo(55.6, 6),
      }),
    ]);
  });

  it('when a batch has not healed yet, promises none of it, but will on the day that it has', () => {
    givenCut(farm, { cutOn: '2026-02-26' });

    expect(available()).toEqual([]);
    expect(available('2026-03-06')).toMatchObject([{ available: 10, grade: 'frag' }]);
  });

  it('when pieces are still nubs, promises none of them', () => {
    const lineId = givenLine(farm, { startMm: 8, mmPerWeek: 1, healDays: 5 });
    givenSaleableBatch(farm, { colonyId: givenColony(farm, { lineId }), cutOn: '2026-02-02' });

    expect(available()).toEqual([]);
    // 8 mm and 7 more weeks: 15 mm.
    expect(available('2026-03-23')).toMatchObject([{ grade: 'small', available: 10 }]);
  });

  it('when pieces stand in quarantine or on the bench, promises none of them', () => {
    givenSaleableBatch(farm, { target: { kind: 'rack', rackId: givenRackIn(farm, 'quarantine') } });
    givenSaleableBatch(farm, { target: { kind: 'bench' } });

    expect(available()).toEqual([]);
  });

  it('when pieces are lost, promises the rest', () => {
    const { plugs } = givenSaleableBatch(farm);
    givenLoss(
      farm,
      plugs.slice(0, 3).map(({ code }) => code),
    );

    expect(available()).toMatchObject([{ available: 7 }]);
  });

  it('when a cut is taken back, its pieces are gone from everywhere', () => {
    const { cutId, batchId } = givenSaleableBatch(farm);
    farm.write((write) => undoCut(write, cutId, ''));

    expect(available()).toEqual([]);
    expect(batchPieces(farm.db)).toEqual([
      { batchId, onRacks: 0, bench: 0, picked: 0, sellable: 0, withheld: 0, held: 0 },
    ]);
  });

  it.each(['plug', 'batch', 'rack', 'system'] as const)('when the %s is withheld, promises none of it', (scope) => {
    const rackId = givenRack(farm);
    const { batchId, plugs } = givenSaleableBatch(farm, { target: { kind: 'rack', rackId } });
    const systemId = rackPlace(farm.db, rackId).system.id;
    const [first] = plugs;
    const of = {
      plug: { plugCode: first?.code ?? '' },
      batch: { batchId },
      rack: { rackId },
      system: { systemId },
    }[scope];

    const id = givenWithheld(farm, of);

    const left = scope === 'plug' ? [expect.objectContaining({ available: 9 })] : [];
    expect(available()).toEqual(left);
    farm.write((write) => releaseStock(write, id));
    expect(available()).toMatchObject([{ available: 10 }]);
  });

  it('when a piece is withheld in several ways, it counts once', () => {
    const rackId = givenRack(farm);
    const { batchId, plugs } = givenSaleableBatch(farm, { target: { kind: 'rack', rackId } });
    const [first, second] = plugs.map(({ code }) => code);
    givenWithheld(farm, { plugCode: first ?? '' });
    givenWithheld(farm, { plugCode: first ?? '' });
    givenWithheld(farm, { plugCode: second ?? '' });
    expect(batchPieces(farm.db)).toMatchObject([{ sellable: 8, withheld: 2 }]);

    givenWithheld(farm, { rackId });
    givenWithheld(farm, { batchId });
    expect(batchPieces(farm.db)).toMatchObject([{ sellable: 0, withheld: 10, onRacks: 10 }]);
  });

  it('when pieces are promised, counts them as held and offers the rest, never below zero', () => {
    const { batchId, plugs } = givenSaleableBatch(farm);
    givenHold(farm, batchId, 4);
    expect(available()).toMatchObject([{ saleable: 10, held: 4, available: 6 }]);

    givenLoss(
      farm,
      plugs.slice(0, 8).map(({ code }) => code),
    );

    expect(available()).toMatchObject([{ saleable: 2, held: 4, available: 0 }]);
  });

  it('when two batches have stock, the oldest cut comes first, and a line is asked alone', () => {
    const young = givenSaleableBatch(farm, { cutOn: '2025-12-01' });
    const old = givenSaleableBatch(farm, { cutOn: '2025-10-01' });
    const lineId = available().find(({ batchId }) => batchId === young.batchId)?.lineId ?? '';

    expect(available().map(({ batchId }) => batchId)).toEqual([old.batchId, young.batchId]);
    expect(availableByBatch(farm.db, { lineId, day: DAY })).toMatchObject([{ batchId: young.batchId }]);
    expect(availableByBatch(farm.db, { batchIds: [old.batchId], day: DAY })).toMatchObject([{ batchId: old.batchId }]);
  });
});

/** A placed order that holds pieces of a batch. */
function givenHold(farm: TestFarm, batchId: string, pieces: number): void {
  const { lineId } = farm.db.query.batches.findFirst({ where: (b, { eq: is }) => is(b.id, batchId) }).sync() ?? {};
  const id = farm.deps.newId();
  const at = farm.deps.clock.now();
  const grade = 'frag';
  farm.db
    .insert(listings)
    .values({ id, lineId: lineId ?? '', grade, priceMinor: 900, createdAt: at })
    .run();
  farm.db
    .insert(orders)
    .values({
      ...{ id, number: 1, storeId: farm.storeIds[0], state: 'placed', currency: 'EUR', placedAt: at, placedBy: 'Test' },
      ...{ subtotalMinor: 0, taxMinor: 0, totalMinor: 0 },
    })
    .run();
  farm.db
    .insert(orderLines)
    .values({ id, orderId: id, listingId: id, lineId: lineId ?? '', grade, quantity: pieces, priceMinor: 900 })
    .run();
  farm.db.insert(holds).values({ id, orderLineId: id, batchId, pieces, createdAt: at }).run();
}
