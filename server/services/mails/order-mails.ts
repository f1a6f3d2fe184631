import { eq } from 'drizzle-orm';
import { z } from 'zod';
import { gradeByCode } from '../../../shared/domain/growth.ts';
import { formatPlugCode } from '../../../shared/domain/plug-code.ts';
import { refunds } from '../../db/schema/index.ts';
import type { Deps } from '../../deps.ts';
import { farmOf } from '../../queries/farm.ts';
import { orderLinesOf, orderRow, pickedPlugs, type OrderRow } from '../../queries/orders.ts';
import type { MailBody } from '../mail-templates.ts';
import { moneyText } from '../money-text.ts';
import { mailBody, type MailContent } from './mail-layout.ts';

const OrderData = z.object({ orderId: z.string() });
const MOST_CODES = 20;

/** What was ordered, and until when it is kept. */
export function orderPlacedMail(deps: Deps, data: Record<string, unknown>): MailBody {
  const order = orderOf(deps, data);
  const farm = farmOf(deps.db);
  return orderMail(deps, {
    subject: `Order ${order.number} is placed`,
    heading: `Order ${order.number} is placed`,
    paragraphs: [
      order.holdUntil === null
        ? 'Thank you for your order.'
        : `Thank you. Your corals are kept until ${clockText(order.holdUntil, farm.timeZone)}. Pay by then to keep them.`,
    ],
    rows: linesOf(deps, order),
    act: { label: order.holdUntil === null ? 'Open the order' : 'Open and pay the order', url: addressOf(deps, order) },
  });
}

export function orderPaidMail(deps: Deps, data: Record<string, unknown>): MailBody {
  const order = orderOf(deps, data);
  return orderMail(deps, {
    subject: `Order ${order.number} is paid`,
    heading: 'Your payment has arrived',
    paragraphs: [`We received ${moneyText(order.totalMinor, order.currency)} and will pick your corals next.`],
    rows: linesOf(deps, order),
    act: { label: 'Open the order', url: addressOf(deps, order) },
  });
}

/** Who carries it, and the codes whose pages tell where each coral comes from. */
export function orderShippedMail(deps: Deps, data: Record<string, unknown>): MailBody {
  const order = orderOf(deps, data);
  const codes = pickedPlugs(deps.db, order.id).map(({ pick }) => formatPlugCode(pick.plugCode));
  const listed = codes.slice(0, MOST_CODES).join(', ');
  const more = codes.length > MOST_CODES ? ` and ${codes.length - MOST_CODES} more` : '';
  const missing = orderLinesOf(deps.db, order.id).filter((line) => line.missing > 0);
  return orderMail(deps, {
    subject: `Order ${order.number} is on its way`,
    heading: 'Your corals are on their way',
    paragraphs: [
      'Open the boxes soon after they arrive. The code on each plug tells the story of its coral: scan it, or open it from your order.',
      ...(missing.length === 0
        ? []
        : [
            `Not in the box, and paid back: ${missing.map((line) => `${line.missing} of ${line.lineCode} ${line.tradeName}`).join(', ')}.`,
          ]),
    ],
    rows: [
      { label: 'Carrier', value: order.carrier },
      ...(order.tracking === '' ? [] : [{ label: 'Tracking', value: order.tracking }]),
      { label: 'Boxes', value: String(order.boxes) },
      { label: 'Plugs', value: `${listed}${more}` },
    ],
    act: { label: 'Open order, plugs and invoice', url: addressOf(deps, order) },
  });
}

export function orderCancelledMail(deps: Deps, data: Record<string, unknown>): MailBody {
  const { refundedMinor } = z.object({ refundedMinor: z.number() }).parse(data);
  const order = orderOf(deps, data);
  return orderMail(deps, {
    subject: `Order ${order.number} is cancelled`,
    heading: `Order ${order.number} is cancelled`,
    paragraphs: [
      `Reason: ${order.cancelReason}`,
      refundedMinor > 0
        ? `${moneyText(refundedMinor, order.currency)} goes back to the card that it was paid with.`
        : 'Nothing was charged.',
    ],
    act: { label: 'Open the order', url: addressOf(deps, order) },
  });
}

export function orderRefundedMail(deps: Deps, data: Record<string, unknown>): MailBody {
  const { refundId } = z.object({ refundId: z.string() }).parse(data);
  const order = orderOf(deps, data);
  const refund = deps.db.select().from(refunds).where(eq(refunds.id, refundId)).get();
  if (!refund) throw new Error(`Refund ${refundId} is not known.`);
  return orderMail(deps, {
    subject: `Money back for order ${order.number}`,
    heading: `${moneyText(refund.amountMinor, order.currency)} is on its way back`,
    paragraphs: ['It goes to the card that the order was paid with. Banks take a few days to show it.'],
    rows: [{ label: 'Reason', value: refund.reason }],
    act: { label: 'Open the order', url: addressOf(deps, order) },
  });
}

function orderMail(deps: Deps, content: Omit<MailContent, 'farmName'>): MailBody {
  return mailBody({ farmName: farmOf(deps.db).name, ...content });
}

function orderOf({ db }: Deps, data: Record<string, unknown>): OrderRow {
  return orderRow(db, OrderData.parse(data).orderId);
}

function addressOf({ config }: Deps, { id }: OrderRow): string {
  return `${config.publicUrl}/shop/orders/${id}`;
}

function linesOf({ db }: Deps, order: OrderRow): { label: string; value: string }[] {
  const { currency } = order;
  return [
    ...orderLinesOf(db, order.id).map(({ lineCode, tradeName, grade, quantity, priceMinor }) => ({
      label: `${quantity} × ${lineCode} ${tradeName}, ${gradeByCode(grade).label.toLowerCase()}`,
      value: moneyText(quantity * priceMinor, currency),
    })),
    ...(order.taxMinor > 0 ? [{ label: 'Tax', value: moneyText(order.taxMinor, currency) }] : []),
    { label: 'Total', value: moneyText(order.totalMinor, currency) },
  ];
}

function clockText(instant: number, timeZone: string): string {
  return new Intl.DateTimeFormat('en-GB', { timeZone, dateStyle: 'medium', timeStyle: 'short' }).format(instant);
}
