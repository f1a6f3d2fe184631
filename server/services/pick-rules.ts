import { and, eq, gt, sql } from 'drizzle-orm';
import type { OrderLine } from '../../shared/contracts/orders.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { gradeByCode, type GradeCode } from '../../shared/domain/growth.ts';
import { ACCOUNTS } from '../../shared/domain/ledger.ts';
import { isSaleable } from '../../shared/domain/line-pace.ts';
import { formatPlugCode } from '../../shared/domain/plug-code.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { batches, holds, lines, orderLines, orders, systems } from '../db/schema/index.ts';
import { batchIn, batchStock, type BatchStock } from '../queries/batch-stock.ts';
import { farmOf } from '../queries/farm.ts';
import type { PlacedPlug } from '../queries/find-plugs.ts';
import { openWithholds } from '../queries/withholds.ts';
import type { OrderRow } from '../queries/orders.ts';

type HoldRow = typeof holds.$inferSelect;

/** The order line that a scanned plug fills, and the promise that it takes the place of. */
export interface PickMatch {
  line: OrderLine;
  hold: HoldRow | null;
}

/**
 * Finds what a scanned plug is for, or says in words why it is the wrong one.
 *
 * @throws {DomainError} `pick.wrong_plug`
 */
export function matchPlug(db: Db, order: OrderRow, wanted: readonly OrderLine[], plug: PlacedPlug, now: number) {
  assertOnRack(db, order, plug);
  const ofLine = wanted.filter(({ lineId }) => lineId === plug.lineId);
  if (ofLine.length === 0) throw otherLine(db, wanted, plug);
  assertForSale(db, plug);

  const stock = stockOf(db, plug, now);
  const promised = ofLine.filter((line) => holdOn(db, line, plug.batchId) !== undefined);
  const fitting = [...promised, ...ofLine.filter((line) => fits(line, stock) && !promised.includes(line))];
  if (fitting.length === 0) throw otherGrade(ofLine, stock);
  const line = fitting.find(({ picked, quantity }) => picked < quantity);
  if (!line) throw complete(fitting);
  return matchHold(db, line, plug, stock);
}

function matchHold(db: Db, line: OrderLine, plug: PlacedPlug, stock: BatchStock): PickMatch {
  const own = holdOn(db, line, plug.batchId);
  if (own) return { line, hold: own };
  const { onRacks } = stock.pieces;
  if (onRacks - stock.pieces.held <= 0) throw promisedToOthers(db, line, plug);
  const hold = db
    .select()
    .from(holds)
    .where(and(eq(holds.orderLineId, line.id), gt(holds.pieces, 0)))
    .orderBy(sql`${holds.pieces} DESC`, holds.id)
    .get();
  return { line, hold: hold ?? null };
}

function assertOnRack(db: Db, order: OrderRow, plug: PlacedPlug): void {
  const shown = formatPlugCode(plug.code);
  if (plug.undoneAt !== null) throw wrong(plug, `${shown} belongs to a cut that was taken back.`);
  if (plug.kind === 'rack') return;
  if (plug.kind === 'order') {
    if (plug.detail === order.id) throw wrong(plug, `${shown} is in this order already.`);
    const other = db.select().from(orders).where(eq(orders.id, plug.detail)).get();
    throw wrong(plug, `${shown} is picked for order ${other?.number ?? 'of another store'}.`);
  }
  if (plug.kind === null || plug.kind === 'cut') {
    throw wrong(plug, `${shown} is not on a rack. Place it first, or take another.`);
  }
  throw wrong(plug, `${shown} has left the stock (${ACCOUNTS[plug.kind].label.toLowerCase()}).`);
}

function assertForSale(db: Db, plug: PlacedPlug): void {
  const [withhold] = openWithholds(db, { ...plug, plugCode: plug.code });
  if (withhold) {
    throw wrong(plug, `${formatPlugCode(plug.code)} is withheld: ${withhold.reason}. Put it back and take another.`);
  }
  const system = db
    .select()
    .from(systems)
    .where(eq(systems.id, plug.systemId ?? ''))
    .get();
  if (system?.kind === 'quarantine') {
    throw wrong(plug, `${formatPlugCode(plug.code)} stands in quarantine (${system.code}). Take another.`);
  }
}

function stockOf(db: Db, plug: PlacedPlug, now: number): BatchStock {
  const [stock] = batchStock(db, batchIn([plug.batchId]), dayOf(now, farmOf(db).timeZone));
  if (!stock) throw new Error(`Batch ${plug.batchId} of plug ${plug.code} has no stock.`);
  return stock;
}

/** A batch promised to the line fits even if it grew into the next grade since; any other must be of the grade now. */
function fits(line: OrderLine, { size }: BatchStock): boolean {
  return isSaleable(size) && size.grade === line.grade;
}

function holdOn(db: Db, line: OrderLine, batchId: string): HoldRow | undefined {
  return db
    .select()
    .from(holds)
    .where(and(eq(holds.orderLineId, line.id), eq(holds.batchId, batchId), gt(holds.pieces, 0)))
    .get();
}

function otherLine(db: Db, wanted: readonly OrderLine[], plug: PlacedPlug): DomainError {
  const line = db.select().from(lines).where(eq(lines.id, plug.lineId)).get();
  const open = wanted.filter(({ picked, quantity }) => picked < quantity);
  const names = (open.length > 0 ? open : wanted).map(({ lineCode }) => lineCode);
  const wants = [...new Set(names)].slice(0, 5).join(', ');
  return wrong(plug, `This is ${line?.code ?? ''} ${line?.tradeName ?? ''}; the order wants ${wants}.`);
}

function otherGrade(ofLine: readonly OrderLine[], { size }: BatchStock): DomainError {
  const wants = [...new Set(ofLine.map(({ grade }) => gradeLabel(grade)))].join(' or ');
  if (!size.healed) return new DomainError('pick.wrong_plug', `This plug is not healed yet; the order wants ${wants}.`);
  return new DomainError('pick.wrong_plug', `This is a ${gradeLabel(size.grade)}; the order wants ${wants}.`);
}

function complete(fitting: readonly OrderLine[]): DomainError {
  const [line] = fitting;
  const pieces = fitting.reduce((sum, { quantity }) => sum + quantity, 0);
  return new DomainError('pick.wrong_plug', `All ${pieces} of ${line?.lineCode ?? ''} are picked. Put this one back.`);
}

function promisedToOthers(db: Db, line: OrderLine, plug: PlacedPlug): DomainError {
  const own = db
    .select({ code: batches.code })
    .from(holds)
    .innerJoin(batches, eq(batches.id, holds.batchId))
    .innerJoin(orderLines, eq(orderLines.id, holds.orderLineId))
    .where(and(eq(orderLines.id, line.id), gt(holds.pieces, 0)))
    .all();
  const instead = own.length > 0 ? ` Take one of ${own.map(({ code }) => code).join(', ')}.` : '';
  return wrong(plug, `All pieces of ${plug.batchCode} are held for other orders.${instead}`);
}

function wrong(plug: PlacedPlug, message: string): DomainError {
  return new DomainError('pick.wrong_plug', message, { details: { code: plug.code } });
}

function gradeLabel(code: GradeCode): string {
  return gradeByCode(code).label.toLowerCase();
}
