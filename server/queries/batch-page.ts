import { asc, eq, sql } from 'drizzle-orm';
import type { BatchPage } from '../../shared/contracts/stock.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { survivalCurve } from '../../shared/domain/survival.ts';
import type { Role } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';
import { racks, sizeReadings, stockAccounts, stockBalances } from '../db/schema/index.ts';
import { stockOfBatch, toBatch } from './batches.ts';
import { farmOf } from './farm.ts';
import { plugFates } from './plug-fates.ts';
import { rackPlace, toRackRef } from './places.ts';
import { saleableForecast } from './saleable-forecast.ts';
import { causeLabel, stockActs } from './stock-acts.ts';
import { openWithholds, toReason } from './withholds.ts';

const MOST_MEASUREMENTS = 200;

type LeftKind = BatchPage['left'][number]['kind'];
const LEFT_KINDS: readonly LeftKind[] = ['sold', 'lost', 'culled', 'recut', 'given'];

/** Everything about one batch. @throws {DomainError} `record.not_found` */
export function batchPage(db: Db, id: string, viewer: { now: number; role: Role }): BatchPage {
  const { timeZone } = farmOf(db);
  const today = dayOf(viewer.now, timeZone);
  const stock = stockOfBatch(db, id, today);
  const { failedPieces, minutes, tool, by, note } = stock.cut;
  return {
    ...toBatch(stock, today),
    ...whereabouts(db, id),
    picked: stock.pieces.picked,
    forecast: saleableForecast(db, stock, today),
    survival: survivalCurve(plugFates(db, sql`b.id = ${id}`, today, timeZone)),
    measurements: measurementsOf(db, id),
    acts: stockActs(db, sql`m.batch_id = ${id}`, viewer),
    withholds: openWithholds(db, { batchId: id }).map(toReason),
    cut: { failedPieces, minutes, tool, by, note },
  };
}

function whereabouts(db: Db, batchId: string): Pick<BatchPage, 'racks' | 'left'> {
  const balances = db
    .select({ kind: stockAccounts.kind, detail: stockAccounts.detail, rackId: racks.id, pieces: stockBalances.pieces })
    .from(stockBalances)
    .innerJoin(stockAccounts, eq(stockAccounts.id, stockBalances.accountId))
    .leftJoin(racks, eq(racks.id, stockAccounts.rackId))
    .where(eq(stockBalances.batchId, batchId))
    .orderBy(asc(racks.code))
    .all()
    .filter(({ pieces }) => pieces > 0);
  return {
    racks: balances.flatMap(({ rackId, pieces }) =>
      rackId === null ? [] : { ...toRackRef(rackPlace(db, rackId)), pieces },
    ),
    left: balances.flatMap(({ kind, detail, pieces }) => {
      const left = LEFT_KINDS.find((each) => each === kind);
      return left ? { kind: left, detail: left === 'lost' ? causeLabel(detail) : '', pieces } : [];
    }),
  };
}

function measurementsOf(db: Db, batchId: string): BatchPage['measurements'] {
  return db
    .select()
    .from(sizeReadings)
    .where(eq(sizeReadings.batchId, batchId))
    .orderBy(asc(sizeReadings.at), asc(sizeReadings.id))
    .all()
    .slice(-MOST_MEASUREMENTS);
}
