import { and, eq, isNull, max, ne, sql } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import { batches, colonies, cuts, holds, stockMovements } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { inUndoTime, UNDOABLE_KINDS } from '../queries/stock-acts.ts';
import { reverseGroup } from './stock-ledger.ts';
import { returnSupply } from './supply-return.ts';

/**
 * Undoes a whole act: every piece goes back to where it was.
 *
 * @throws {DomainError} `record.not_found`; `stock.already_reversed`; `rule.refused` after a day (but for the owner) and
 *   for acts of orders; `stock.not_there` where later acts took pieces on
 */
export function undoAct(write: Write, groupId: string, note: string): { pieces: number } {
  const act = write.tx
    .select()
    .from(stockMovements)
    .where(and(eq(stockMovements.groupId, groupId), ne(stockMovements.kind, 'reversal')))
    .get();
  if (!act) throw new DomainError('record.not_found', 'There is nothing to undo.');
  if (!UNDOABLE_KINDS.includes(act.kind)) {
    throw new DomainError('rule.refused', 'Undo this in the order or the count that it belongs to.');
  }
  if (act.kind === 'cut') return undoCut(write, cutOfBatch(write, act.batchId), note);
  assertInTime(write, act.recordedAt);
  const rows = reverseGroup(write, groupId, note);
  write.audit({ action: 'stock.undone', entity: 'stock_act', entityId: groupId, after: { note, pieces: rows.length } });
  return { pieces: rows.length };
}

/**
 * Takes back a cut that was logged by mistake: plugs leave the stock, plugs and glue return to their lots, and the mother
 * counts as rested as before. The codes stay used, because labels may be printed.
 *
 * @throws {DomainError} `record.not_found`; `stock.already_reversed`; `rule.refused` where plugs moved on or are promised
 */
export function undoCut(write: Write, cutId: string, note: string): { pieces: number } {
  const row = write.tx
    .select({ cut: cuts, batch: batches })
    .from(cuts)
    .innerJoin(batches, eq(batches.cutId, cuts.id))
    .where(eq(cuts.id, cutId))
    .get();
  if (!row) throw new DomainError('record.not_found', 'This cut is not known.');
  const { cut, batch } = row;
  if (cut.undoneAt !== null) throw new DomainError('stock.already_reversed', 'This cut was taken back already.');
  assertInTime(write, cut.createdAt);
  assertUntouched(write, batch.id);

  const standing = standingMovements(write, batch.id);
  for (const { groupId } of standing) reverseGroup(write, groupId, note);
  returnSupply(write, 'cut', cut.id, 'Record the plugs as culled instead.');
  write.tx.update(cuts).set({ undoneAt: write.now }).where(eq(cuts.id, cut.id)).run();
  restoreLastCut(write, cut);
  write.audit({ action: 'cut.undone', entity: 'cut', entityId: cut.id, before: cut, after: { note } });
  return { pieces: batch.pieces };
}

function assertInTime({ actor, now }: Write, recordedAt: number): void {
  if (inUndoTime(recordedAt, now, actor.role)) return;
  throw new DomainError('rule.refused', 'This is more than a day old. Ask the owner to undo it.');
}

function cutOfBatch(write: Write, batchId: string): string {
  const batch = write.tx.select().from(batches).where(eq(batches.id, batchId)).get();
  if (!batch) throw new DomainError('record.not_found', 'This batch is not known.');
  return batch.cutId;
}

/** Groups of movements of a batch that are not undone. */
function standingMovements(write: Write, batchId: string): { groupId: string; kind: string }[] {
  return write.tx
    .selectDistinct({ groupId: stockMovements.groupId, kind: stockMovements.kind })
    .from(stockMovements)
    .where(
      and(
        eq(stockMovements.batchId, batchId),
        ne(stockMovements.kind, 'reversal'),
        sql`NOT EXISTS (SELECT 1 FROM stock_movement AS undo WHERE undo.reverses_id = ${stockMovements.id})`,
      ),
    )
    .all();
}

function assertUntouched(write: Write, batchId: string): void {
  if (standingMovements(write, batchId).some(({ kind }) => kind !== 'cut')) {
    throw new DomainError('rule.refused', 'Some of these plugs moved on since. Undo those acts first.');
  }
  const promised = write.tx
    .select({ pieces: sql<number>`coalesce(sum(${holds.pieces}), 0)` })
    .from(holds)
    .where(eq(holds.batchId, batchId))
    .get();
  if (promised && promised.pieces > 0) {
    throw new DomainError('rule.refused', 'Some of these pieces are promised to an order. Change the order first.');
  }
}

function restoreLastCut(write: Write, cut: typeof cuts.$inferSelect): void {
  const earlier = write.tx
    .select({ cutOn: max(cuts.cutOn) })
    .from(cuts)
    .where(and(eq(cuts.colonyId, cut.colonyId), isNull(cuts.undoneAt)))
    .get();
  write.tx
    .update(colonies)
    .set({ lastCutOn: earlier?.cutOn ?? null, version: sql`${colonies.version} + 1` })
    .where(and(eq(colonies.id, cut.colonyId), eq(colonies.lastCutOn, cut.cutOn)))
    .run();
}
