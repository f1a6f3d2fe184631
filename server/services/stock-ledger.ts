import { and, eq, isNull, sql } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import type { Write } from '../db/write.ts';
import { plugs, stockAccounts, stockMovements } from '../db/schema/index.ts';

type AccountRow = typeof stockAccounts.$inferSelect;
type MovementRow = typeof stockMovements.$inferSelect;

export type AccountName =
  | { kind: 'rack'; rackId: string }
  | { kind: 'lost'; cause: string }
  | { kind: 'order'; orderId: string }
  | { kind: 'cut' | 'sold' | 'culled' | 'recut' | 'given' | 'count' };

export interface MovementInput {
  kind: Exclude<MovementRow['kind'], 'reversal'>;
  batchId: string;
  /** Set: one labelled plug; its `from` must be where it is. */
  plugCode?: string | null;
  from: AccountRow;
  to: AccountRow;
  toPosition?: string | null;
  pieces?: number;
  seen?: string;
  note?: string;
  at: number;
}

/** The account of this name, made at its first use. */
export function stockAccount(write: Write, name: AccountName): AccountRow {
  const rackId = name.kind === 'rack' ? name.rackId : null;
  const detail = name.kind === 'lost' ? name.cause : name.kind === 'order' ? name.orderId : '';
  const found = write.tx
    .select()
    .from(stockAccounts)
    .where(
      rackId === null
        ? and(eq(stockAccounts.kind, name.kind), eq(stockAccounts.detail, detail), isNull(stockAccounts.rackId))
        : eq(stockAccounts.rackId, rackId),
    )
    .get();
  if (found) return found;
  return write.tx
    .insert(stockAccounts)
    .values({ id: write.newId(), kind: name.kind, rackId, detail })
    .returning()
    .get();
}

/**
 * Posts movements of one act; all of them or, on any error, none. They share a group, by which the act is undone.
 * The database's triggers keep balances and plug places and refuse what breaks the ledger's laws.
 * @returns the group's id and the rows
 */
export function postMovements(
  write: Write,
  movements: readonly MovementInput[],
  groupId: string = write.newId(),
): { groupId: string; rows: MovementRow[] } {
  const rows = movements.map((movement) => {
    const { from, to, plugCode = null, toPosition = null, pieces = 1, seen = '', note = '', ...rest } = movement;
    return write.tx
      .insert(stockMovements)
      .values({
        ...rest,
        groupId,
        plugCode,
        fromAccountId: from.id,
        toAccountId: to.id,
        fromPosition: plugCode === null ? null : positionOf(write, plugCode),
        toPosition,
        pieces,
        seen,
        note,
        by: write.actor.name,
        recordedAt: write.now,
      })
      .returning()
      .get();
  });
  return { groupId, rows };
}

function positionOf(write: Write, plugCode: string): string | null {
  return (
    write.tx.select({ position: plugs.position }).from(plugs).where(eq(plugs.code, plugCode)).get()?.position ?? null
  );
}

/**
 * Undoes a whole act: one mirrored movement for each of the group, newest first.
 * @throws {DomainError} `record.not_found`; `stock.already_reversed`; `stock.not_there` or `stock.not_enough` where later
 *   movements took the pieces on: those must be undone first
 */
export function reverseGroup(write: Write, groupId: string, note: string): MovementRow[] {
  const originals = write.tx
    .select()
    .from(stockMovements)
    .where(and(eq(stockMovements.groupId, groupId), sql`${stockMovements.kind} <> 'reversal'`))
    .orderBy(sql`${stockMovements.id} DESC`)
    .all();
  if (originals.length === 0) throw new DomainError('record.not_found', 'There is nothing to undo.');
  return originals.map((original) => reverse(write, original, note));
}

function reverse(write: Write, original: MovementRow, note: string): MovementRow {
  const already = write.tx.select().from(stockMovements).where(eq(stockMovements.reversesId, original.id)).get();
  if (already) throw new DomainError('stock.already_reversed', 'This was undone already.');
  return write.tx
    .insert(stockMovements)
    .values({
      groupId: original.groupId,
      kind: 'reversal',
      batchId: original.batchId,
      plugCode: original.plugCode,
      fromAccountId: original.toAccountId,
      toAccountId: original.fromAccountId,
      fromPosition: original.toPosition,
      toPosition: original.fromPosition,
      pieces: original.pieces,
      seen: '',
      note,
      at: write.now,
      by: write.actor.name,
      recordedAt: write.now,
      reversesId: original.id,
    })
    .returning()
    .get();
}
