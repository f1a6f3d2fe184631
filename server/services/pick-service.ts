import { and, eq, sql } from 'drizzle-orm';
import type { PickDone, PickPlan } from '../../shared/contracts/orders.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { DomainError } from '../../shared/errors.ts';
import { holds, orderLines, orders, picks, plugs, stockMovements } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { findPlug } from '../queries/find-plugs.ts';
import { stockByGrade } from '../queries/listings.ts';
import { orderLinesOf, orderRow, type OrderRow } from '../queries/orders.ts';
import { pickPlan, picksOf, progressOf } from '../queries/pick-plan.ts';
import { matchPlug } from './pick-rules.ts';
import { accountInStock } from './plug-rules.ts';
import { postMovements, reverseGroup, stockAccount } from './stock-ledger.ts';

/**
 * Takes a scanned plug off its rack for an order.
 *
 * @throws {DomainError} `record.not_found` for no plug; `pick.wrong_plug` with the reason; `order.wrong_state`
 */
export function pickPlug(write: Write, orderId: string, code: string): PickDone {
  const order = orderRow(write.tx, orderId);
  assertPicking(order);
  const plug = findPlug(write.tx, code);
  const { line, hold } = matchPlug(write.tx, order, orderLinesOf(write.tx, orderId), plug, write.now);

  const { rows } = postMovements(write, [
    {
      kind: 'pick',
      batchId: plug.batchId,
      plugCode: plug.code,
      from: accountInStock(write, plug),
      to: stockAccount(write, { kind: 'order', orderId }),
      at: write.now,
    },
  ]);
  const [movement] = rows;
  if (!movement) throw new Error('The pick was not posted.');
  if (hold) {
    write.tx
      .update(holds)
      .set({ pieces: hold.pieces - 1 })
      .where(eq(holds.id, hold.id))
      .run();
  }
  const row = write.tx
    .insert(picks)
    .values({
      id: write.newId(),
      orderLineId: line.id,
      plugCode: plug.code,
      movementId: movement.id,
      holdId: hold?.id ?? null,
      at: write.now,
      by: write.actor.name,
    })
    .returning()
    .get();
  startPicking(write, order);
  write.audit({
    action: 'order.plug_picked',
    entity: 'order',
    entityId: orderId,
    before: { rackCode: plug.rackCode, position: plug.position },
    after: { code: plug.code, pickId: row.id },
  });
  return pickDone(write, orderId, row.id, line.id);
}

/**
 * Puts a picked plug back to where it stood, and promises a piece to the order again.
 *
 * @throws {DomainError} `record.not_found`; `order.wrong_state`; `rule.refused` where another plug stands there by now
 */
export function undoPick(write: Write, orderId: string, pickId: string): PickPlan {
  const order = orderRow(write.tx, orderId);
  assertPicking(order);
  const found = write.tx
    .select({ pick: picks, line: orderLines, groupId: stockMovements.groupId, batchId: plugs.batchId })
    .from(picks)
    .innerJoin(orderLines, eq(orderLines.id, picks.orderLineId))
    .innerJoin(stockMovements, eq(stockMovements.id, picks.movementId))
    .innerJoin(plugs, eq(plugs.code, picks.plugCode))
    .where(and(eq(picks.id, pickId), eq(orderLines.orderId, orderId)))
    .get();
  if (!found) throw new DomainError('record.not_found', 'This plug is not in the order.');
  if (found.pick.undoneAt !== null) throw new DomainError('stock.already_reversed', 'This plug was put back already.');

  reverseGroup(write, found.groupId, `Put back from order ${order.number}`);
  write.tx.update(picks).set({ undoneAt: write.now }).where(eq(picks.id, pickId)).run();
  holdAgain(write, found.line, found.batchId, found.pick.holdId);
  write.audit({
    action: 'order.plug_put_back',
    entity: 'order',
    entityId: orderId,
    before: { code: found.pick.plugCode, pickId },
  });
  return pickPlan(write.tx, orderId);
}

/**
 * Promises a piece again: on the batch that was promised before, else on the plug's own, else on any other of the line and
 * grade. After losses none may be free; the order is then short and says so.
 */
function holdAgain(
  write: Write,
  line: typeof orderLines.$inferSelect,
  ownBatchId: string,
  holdId: string | null,
): void {
  const before = holdId === null ? undefined : write.tx.select().from(holds).where(eq(holds.id, holdId)).get();
  const today = dayOf(write.now, farmOf(write.tx).timeZone);
  const others = stockByGrade(
    write.tx,
    today,
    line.lineId,
  )(line.lineId, line.grade)
    .batches.filter(({ available }) => available > 0)
    .map(({ batchId }) => batchId);
  const candidates = [...(before ? [before.batchId] : []), ownBatchId, ...others];
  const batchId = candidates.find((each) => freePieces(write, each) > 0);
  if (batchId === undefined) return;
  write.tx
    .insert(holds)
    .values({ id: write.newId(), orderLineId: line.id, batchId, pieces: 0, createdAt: write.now })
    .onConflictDoNothing()
    .run();
  write.tx
    .update(holds)
    .set({ pieces: sql`${holds.pieces} + 1` })
    .where(and(eq(holds.orderLineId, line.id), eq(holds.batchId, batchId)))
    .run();
}

/** Pieces of a batch on racks beyond what is promised. Below zero after losses. */
function freePieces(write: Write, batchId: string): number {
  const row = write.tx.get<{ free: number }>(sql`
    SELECT coalesce((SELECT sum(b.pieces) FROM stock_balance AS b JOIN stock_account AS a ON a.id = b.account_id
        WHERE b.batch_id = ${batchId} AND a.kind = 'rack'), 0)
      - coalesce((SELECT sum(pieces) FROM hold WHERE batch_id = ${batchId}), 0) AS free`);
  return row.free;
}

function startPicking(write: Write, order: OrderRow): void {
  if (order.state !== 'paid') return;
  write.tx
    .update(orders)
    .set({ state: 'picking', version: order.version + 1 })
    .where(eq(orders.id, order.id))
    .run();
}

function pickDone(write: Write, orderId: string, pickId: string, lineId: string): PickDone {
  const wantedLines = orderLinesOf(write.tx, orderId);
  const pick = picksOf(write.tx, orderId).find(({ id }) => id === pickId);
  const line = wantedLines.find(({ id }) => id === lineId);
  if (!pick || !line) throw new Error('The pick was not recorded.');
  return { pick, line, ...progressOf(wantedLines) };
}

function assertPicking({ state, number }: OrderRow): void {
  if (state === 'paid' || state === 'picking') return;
  const why = {
    placed: 'is not paid yet',
    packed: 'is packed already',
    shipped: 'has been shipped',
    cancelled: 'is cancelled',
  }[state];
  throw new DomainError('order.wrong_state', `Order ${number} ${why}.`);
}
