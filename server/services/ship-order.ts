import { eq, max } from 'drizzle-orm';
import type { InvoiceContent } from '../../shared/contracts/invoices.ts';
import type { OrderPage, ShipOrder } from '../../shared/contracts/orders.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { gradeByCode } from '../../shared/domain/growth.ts';
import { orderAmounts } from '../../shared/domain/order-amounts.ts';
import { DomainError } from '../../shared/errors.ts';
import { invoices, orders } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { findPlugs } from '../queries/find-plugs.ts';
import { showOrder } from '../queries/order-page.ts';
import { orderLinesOf, orderRow, paymentsOf, pickedPlugs, refundsOf, type OrderRow } from '../queries/orders.ts';
import { storeRow } from '../queries/stores.ts';
import { queueMail } from './mail-templates.ts';
import { postMovements, stockAccount } from './stock-ledger.ts';

/** Hands a packed order to the carrier: its plugs are sold and its invoice is issued, in one step. */
export function shipOrder(write: Write, orderId: string, { carrier, tracking }: ShipOrder): OrderPage {
  const before = orderRow(write.tx, orderId);
  if (before.state !== 'packed') {
    throw new DomainError('order.wrong_state', `Order ${before.number} is not packed. Pack it, then ship it.`);
  }
  sellPlugs(write, orderId);
  const order = write.tx
    .update(orders)
    .set({ state: 'shipped', shippedAt: write.now, carrier, tracking, version: before.version + 1 })
    .where(eq(orders.id, orderId))
    .returning()
    .get();
  const invoice = issueInvoice(write, order);
  queueMail(write, 'order-shipped', storeRow(write.tx, order.storeId).email, { orderId });
  write.audit({
    action: 'order.shipped',
    entity: 'order',
    entityId: orderId,
    before: { state: before.state },
    after: { state: 'shipped', carrier, tracking, invoice: invoice.number },
  });
  return showOrder(write.tx, orderId);
}

function sellPlugs(write: Write, orderId: string): void {
  const codes = pickedPlugs(write.tx, orderId).map(({ pick }) => pick.plugCode);
  const [from, to] = [stockAccount(write, { kind: 'order', orderId }), stockAccount(write, { kind: 'sold' })];
  postMovements(
    write,
    findPlugs(write.tx, codes).map(({ code, batchId }) => ({
      kind: 'ship' as const,
      batchId,
      plugCode: code,
      from,
      to,
      at: write.now,
    })),
  );
}

/** Takes the next number; the transaction lets no number be used twice or left out. */
function issueInvoice(write: Write, order: OrderRow): InvoiceContent {
  const last = write.tx
    .select({ number: max(invoices.number) })
    .from(invoices)
    .get()?.number;
  const content = invoiceContent(write, order, (last ?? 0) + 1);
  write.tx
    .insert(invoices)
    .values({
      id: write.newId(),
      number: content.number,
      orderId: order.id,
      issuedOn: content.issuedOn,
      content,
      createdAt: write.now,
    })
    .run();
  return content;
}

function invoiceContent(write: Write, order: OrderRow, number: number): InvoiceContent {
  const farm = farmOf(write.tx);
  const store = storeRow(write.tx, order.storeId);
  const sent = orderLinesOf(write.tx, order.id)
    .map(({ quantity, missing, ...line }) => ({ ...line, quantity: quantity - missing }))
    .filter(({ quantity }) => quantity > 0);
  const taxPercent = order.taxPercent / 100;
  const sum = (amounts: readonly { amountMinor: number; state: string }[], without: string) =>
    amounts.reduce((total, { amountMinor, state }) => (state === without ? total : total + amountMinor), 0);
  const paid = paymentsOf(write.tx, order.id).filter(({ state }) => state === 'paid');
  return {
    number,
    orderNumber: order.number,
    issuedOn: dayOf(write.now, farm.timeZone),
    placedOn: dayOf(order.placedAt, farm.timeZone),
    currency: order.currency,
    farm: { name: farm.name, address: farm.address, email: farm.email, phone: farm.phone },
    store: { code: store.code, name: store.name, address: store.address, email: store.email, phone: store.phone },
    lines: sent.map(({ lineCode, tradeName, grade, quantity, priceMinor, amountMinor }) => ({
      code: lineCode,
      name: tradeName,
      grade: gradeByCode(grade).label,
      quantity,
      priceMinor,
      amountMinor,
    })),
    ...orderAmounts(sent, order.currency, taxPercent),
    taxPercent,
    paidMinor: sum(paid, ''),
    refundedMinor: sum(refundsOf(write.tx, order.id), 'failed'),
    carrier: order.carrier,
    tracking: order.tracking,
  };
}
