import { asc, eq, sql } from 'drizzle-orm';
import type { BatchPage } from '../../shared/contracts/stock.ts';
import { dayOf, daysBetween, type Day } from '../../shared/domain/days.ts';
import { survivalCurve } from '../../shared/domain/survival.ts';
import type { Role } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';
import { racks, sizeReadings, stockAccounts, stockBalances } from '../db/schema/index.ts';
import { stockOfBatch, toBatch } from './batches.ts';
import { farmOf } from './farm.ts';
import { rackPlace, toRackRef } from './places.ts';
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
    survival: survivalCurve(followedPlugs(db, id, stock.batch.cutOn, today, timeZone)),
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

/** Each plug's age when it was lost or culled, when it left alive, or today. */
function followedPlugs(db: Db, batchId: string, cutOn: Day, today: Day, timeZone: string) {
  const rows = db.all<{ kind: string | null; at: number | null }>(sql`
    SELECT a.kind, (SELECT m.at FROM stock_movement AS m WHERE m.plug_code = p.code ORDER BY m.id DESC LIMIT 1) AS at
    FROM plug AS p LEFT JOIN stock_account AS a ON a.id = p.account_id
    WHERE p.batch_id = ${batchId}`);
  return rows.map(({ kind, at }) => {
    const lost = kind === 'lost' || kind === 'culled';
    const left = lost || LEFT_KINDS.some((each) => each === kind);
    const day = left && at !== null ? dayOf(at, timeZone) : today;
    return { day: Math.max(0, daysBetween(cutOn, day)), lost };
  });
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
