import { and, asc, eq, isNull } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import { payments, refunds } from '../db/schema/index.ts';
import { inWrite, SYSTEM } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { settleRefund } from '../services/refund-service.ts';

type RefundRow = typeof refunds.$inferSelect;

/** Sends refunds that wait; where the payment service does not answer, they wait on. A repeat gives money back once. */
export async function sendRefunds(deps: Deps): Promise<void> {
  const waiting = deps.db
    .select({ refund: refunds, intentId: payments.intentId })
    .from(refunds)
    .innerJoin(payments, eq(payments.id, refunds.paymentId))
    .where(and(eq(refunds.state, 'pending'), isNull(refunds.externalId)))
    .orderBy(asc(refunds.createdAt))
    .limit(20)
    .all();
  for (const { refund, intentId } of waiting) await send(deps, refund, intentId ?? '');
}

async function send(deps: Deps, { id, amountMinor }: RefundRow, intentId: string): Promise<void> {
  try {
    const { externalId, status } = await deps.payments.refund({ intentId, amountMinor, refundId: id });
    settle(deps, id, externalId, status);
  } catch (error) {
    deps.log.warn({ err: error, refund: id }, 'refund not sent');
    if (error instanceof DomainError && error.code === 'rule.refused') settle(deps, id, null, 'failed');
  }
}

function settle(deps: Deps, id: string, externalId: string | null, status: string): void {
  inWrite(deps, SYSTEM, (write) => {
    // Its event may have come before the answer.
    const row = write.tx.select().from(refunds).where(eq(refunds.id, id)).get();
    if (row) settleRefund(write, row, externalId ?? row.externalId, status);
  });
}
