import { and, eq, lte } from 'drizzle-orm';
import { orders, payments } from '../db/schema/index.ts';
import { inWrite, SYSTEM } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { expireOrder } from '../services/cancel-order.ts';

/**
 * Frees the stock of orders that were not paid in time. The payment service is asked first: one that was paid in the last
 * moment stays, and its event is on the way.
 */
export async function expireHolds(deps: Deps): Promise<void> {
  const due = deps.db
    .select({ id: orders.id, number: orders.number })
    .from(orders)
    .where(and(eq(orders.state, 'placed'), lte(orders.holdUntil, deps.clock.now())))
    .all();
  for (const { id, number } of due) {
    if (await isPaidOrUnknown(deps, id, number)) continue;
    inWrite(deps, SYSTEM, (write) => expireOrder(write, id));
  }
}

async function isPaidOrUnknown({ db, payments: service, log }: Deps, orderId: string, number: number) {
  const open = db
    .select()
    .from(payments)
    .where(and(eq(payments.orderId, orderId), eq(payments.state, 'open')))
    .all();
  try {
    for (const { sessionId } of open) {
      if ((await service.expireCheckout(sessionId)) === 'complete') return true;
    }
    return false;
  } catch (error) {
    log.warn({ err: error, order: number }, 'could not close a checkout; the order stays for now');
    return true;
  }
}
