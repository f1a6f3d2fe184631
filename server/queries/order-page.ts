import type { OrderPage, Refund } from '../../shared/contracts/orders.ts';
import type { Db } from '../db/client.ts';
import type { payments, refunds } from '../db/schema/index.ts';
import { invoiceOf, orderLinesOf, orderRow, paymentsOf, refundsOf, toOrderFacts } from './orders.ts';
import { storeRow } from './stores.ts';

type PaymentRow = typeof payments.$inferSelect;
type RefundRow = typeof refunds.$inferSelect;

/** Everything of an order, for staff. */
export function showOrder(db: Db, id: string): OrderPage {
  const row = orderRow(db, id);
  const store = storeRow(db, row.storeId);
  const paid = paymentsOf(db, id);
  const given = refundsOf(db, id);
  const invoice = invoiceOf(db, id);
  return {
    ...toOrderFacts(row),
    store: { id: store.id, code: store.code, name: store.name, email: store.email, address: store.address },
    lines: orderLinesOf(db, id),
    payments: paid.map(({ id: paymentId, state, amountMinor, refusal, createdAt, paidAt }) => ({
      ...{ id: paymentId, state, amountMinor, refusal, createdAt, paidAt },
    })),
    refunds: given.map(toRefund),
    refundableMinor: paid.reduce((sum, payment) => sum + leftOf(payment, given), 0),
    invoice: invoice && { number: invoice.number, issuedOn: invoice.issuedOn },
  };
}

/** What of a payment was not given back and is not on its way back. */
export function leftOf({ id, state, amountMinor }: PaymentRow, given: readonly RefundRow[]): number {
  if (state !== 'paid') return 0;
  return given
    .filter((refund) => refund.paymentId === id && refund.state !== 'failed')
    .reduce((left, refund) => left - refund.amountMinor, amountMinor);
}

export function toRefund({ id, amountMinor, reason, state, createdAt, by }: RefundRow): Refund {
  return { id, amountMinor, reason, state, createdAt, by };
}
