import { and, eq } from 'drizzle-orm';
import { orders, payments } from '../db/schema/index.ts';
import type { Deps } from '../deps.ts';

/** Closes payment pages of cancelled orders. What was paid on one first is given back when its event comes. */
export async function closeCheckouts({ db, payments: service, log }: Deps): Promise<void> {
  const open = db
    .select({ id: payments.id, sessionId: payments.sessionId })
    .from(payments)
    .innerJoin(orders, eq(orders.id, payments.orderId))
    .where(and(eq(payments.state, 'open'), eq(orders.state, 'cancelled')))
    .all();
  for (const { id, sessionId } of open) {
    try {
      if ((await service.expireCheckout(sessionId)) === 'complete') continue;
      db.update(payments)
        .set({ state: 'expired' })
        .where(and(eq(payments.id, id), eq(payments.state, 'open')))
        .run();
    } catch (error) {
      log.warn({ err: error, payment: id }, 'checkout not closed yet');
    }
  }
}
