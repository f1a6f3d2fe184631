import { sql, type SQL } from 'drizzle-orm';
import type { StockAct } from '../../shared/contracts/stock.ts';
import { ACCOUNTS, LOSS_CAUSES, LOSS_SEEN, type AccountKind } from '../../shared/domain/ledger.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import type { Role } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';

/** Acts that stock itself can undo; those of orders and counts are undone where they were made. */
export const UNDOABLE_KINDS: readonly StockAct['kind'][] = ['cut', 'place', 'move', 'loss', 'cull', 'give'];

/** Whether an act recorded then may still be undone by someone of this role: within a day, or at any time by the owner. */
export function inUndoTime(recordedAt: number, now: number, role: Role | 'system'): boolean {
  return role === 'owner' || role === 'system' || now - recordedAt <= MS_PER_DAY;
}

interface ActRow {
  groupId: string;
  kind: StockAct['kind'];
  at: number;
  recordedAt: number;
  by: string;
  pieces: number;
  fromKind: AccountKind;
  toKind: AccountKind;
  fromRack: string | null;
  toRack: string | null;
  position: string | null;
  toDetail: string;
  orderNumber: number | null;
  seen: string;
  note: string;
  undone: number;
  last: number;
}

/**
 * Acts among the movements that a condition on `m` chooses, newest first. The pieces of one act with one origin and one
 * destination are one row.
 */
export function stockActs(db: Db, chosen: SQL, { now, role }: { now: number; role: Role }, limit = 100): StockAct[] {
  const rows = db.all<ActRow>(sql`
    SELECT m.group_id AS groupId, m.kind, min(m.at) AS at, max(m.recorded_at) AS recordedAt, m.by,
      sum(m.pieces) AS pieces, f.kind AS fromKind, t.kind AS toKind, fr.code AS fromRack, tr.code AS toRack,
      CASE WHEN count(*) = 1 THEN max(m.to_position) END AS position, t.detail AS toDetail, o.number AS orderNumber,
      max(m.seen) AS seen, max(m.note) AS note,
      max(EXISTS (SELECT 1 FROM stock_movement AS undo WHERE undo.reverses_id = m.id)) AS undone,
      min(m.id = (SELECT max(later.id) FROM stock_movement AS later WHERE later.plug_code = m.plug_code)) AS last
    FROM stock_movement AS m
    JOIN stock_account AS f ON f.id = m.from_account_id
    JOIN stock_account AS t ON t.id = m.to_account_id
    LEFT JOIN rack AS fr ON fr.id = f.rack_id
    LEFT JOIN rack AS tr ON tr.id = t.rack_id
    LEFT JOIN "order" AS o ON t.kind = 'order' AND o.id = t.detail
    WHERE ${chosen}
    GROUP BY m.group_id, m.kind, m.from_account_id, m.to_account_id
    ORDER BY max(m.id) DESC
    LIMIT ${limit}`);
  return rows.map((row) => ({
    groupId: row.groupId,
    kind: row.kind,
    at: row.at,
    by: row.by,
    pieces: row.pieces,
    from: row.fromRack ?? (row.fromKind === 'cut' ? 'Bench' : ACCOUNTS[row.fromKind].label),
    to: destination(row),
    seen: LOSS_SEEN.find(({ code }) => code === row.seen)?.label ?? row.seen,
    note: row.note,
    undone: row.undone === 1,
    canUndo:
      UNDOABLE_KINDS.includes(row.kind) && row.undone === 0 && row.last === 1 && inUndoTime(row.recordedAt, now, role),
  }));
}

/** What a cause of loss is called. */
export function causeLabel(code: string): string {
  return LOSS_CAUSES.find((each) => each.code === code)?.label ?? code;
}

function destination({ toRack, position, toKind, toDetail, orderNumber }: ActRow): string {
  if (toRack !== null) return position === null ? toRack : `${toRack}, ${position}`;
  if (toKind === 'lost') return `Lost: ${causeLabel(toDetail).toLowerCase()}`;
  if (toKind === 'order' && orderNumber !== null) return `Order ${orderNumber}`;
  return toKind === 'cut' ? 'Bench' : ACCOUNTS[toKind].label;
}
