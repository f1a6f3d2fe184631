import { desc, eq, sql } from 'drizzle-orm';
import type { SaltBatch } from '../../shared/contracts/salt-batches.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { items, saltBatches } from '../db/schema/index.ts';

export type SaltBatchRow = typeof saltBatches.$inferSelect;

const MOST_SHOWN = 30;
/** Less than this is what sticks to the drum. */
const EMPTY_L = 0.05;

/** New salt water, what is left first, then the latest. */
export function listSaltBatches(db: Db, now: number): SaltBatch[] {
  const isLeft = sql`(${saltBatches.discardedAt} IS NULL AND ${saltBatches.remainingL} >= ${EMPTY_L})`;
  return db
    .select({ batch: saltBatches, saltName: items.name })
    .from(saltBatches)
    .leftJoin(items, eq(items.id, saltBatches.saltItemId))
    .orderBy(desc(isLeft), desc(saltBatches.at))
    .limit(MOST_SHOWN)
    .all()
    .map(({ batch, saltName }) => toSaltBatch(batch, saltName, now));
}

/** @throws {DomainError} `record.not_found` */
export function showSaltBatch(db: Db, batchId: string, now: number): SaltBatch {
  const batch = saltBatchRow(db, batchId);
  const salt =
    batch.saltItemId === null ? undefined : db.select().from(items).where(eq(items.id, batch.saltItemId)).get();
  return toSaltBatch(batch, salt?.name ?? null, now);
}

/** @throws {DomainError} `record.not_found` */
export function saltBatchRow(db: Db, batchId: string): SaltBatchRow {
  const row = db.select().from(saltBatches).where(eq(saltBatches.id, batchId)).get();
  if (!row) throw new DomainError('record.not_found', 'This new water is not known. Someone may have taken it back.');
  return row;
}

function toSaltBatch(row: SaltBatchRow, saltName: string | null, now: number): SaltBatch {
  const { id, litres, saltG, salinity, alkalinityMeqL, calciumMgL, magnesiumMgL, temperatureC } = row;
  const { at, readyAt, by, note, version } = row;
  return {
    ...{ id, litres, saltName, saltG, salinity, alkalinityMeqL, calciumMgL, magnesiumMgL, temperatureC },
    ...{ at, readyAt, by, note, version, remainingL: row.discardedAt === null ? row.remainingL : 0 },
    state: stateOf(row, now),
  };
}

function stateOf({ discardedAt, remainingL, readyAt }: SaltBatchRow, now: number): SaltBatch['state'] {
  if (discardedAt !== null) return 'discarded';
  if (remainingL < EMPTY_L) return 'used';
  return now < readyAt ? 'mixing' : 'ready';
}
