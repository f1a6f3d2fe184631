import { invalidRequest, noSuch } from './api-error.ts';
import { nowSeconds, type Payments } from './context.ts';
import { recordEvent } from './events.ts';
import { newId } from './ids.ts';
import { moneyText } from './money-text.ts';
import type { Cause, Charge, Refund } from './objects.ts';
import type { CreateRefund } from './params.ts';

/** Gives back a charge or a part of it; without an amount, all that is left. */
export function createRefund(payments: Payments, params: CreateRefund, cause: Cause): Refund {
  const charge = chargeToRefund(payments, params);
  const amount = refundAmount(charge, params.amount);

  const refund: Refund = {
    id: newId('re'),
    object: 'refund',
    amount,
    charge: charge.id,
    created: nowSeconds(payments),
    currency: charge.currency,
    metadata: params.metadata,
    payment_intent: charge.payment_intent,
    reason: params.reason ?? null,
    receipt_number: null,
    status: 'succeeded',
  };
  payments.store.refunds.set(refund.id, refund);
  charge.amount_refunded += amount;
  charge.refunded = charge.amount_refunded === charge.amount;
  recordEvent(payments, 'charge.refunded', charge, cause);
  recordEvent(payments, 'refund.updated', refund, cause);
  return refund;
}

function chargeToRefund({ store }: Payments, params: CreateRefund): Charge {
  if ((params.charge === undefined) === (params.payment_intent === undefined)) {
    throw invalidRequest('One of the following params should be provided for this request: payment_intent or charge.');
  }
  const intentId = params.payment_intent;
  if (intentId !== undefined && !store.intents.has(intentId)) {
    throw noSuch('payment_intent', intentId, 'payment_intent');
  }
  const chargeId = params.charge ?? store.intents.get(intentId ?? '')?.latest_charge;
  const charge = store.charges.get(chargeId ?? '');
  if (charge === undefined) throw noSuch('charge', chargeId ?? '', 'charge');
  if (!charge.paid) {
    throw invalidRequest(`This PaymentIntent (${charge.payment_intent}) does not have a successful charge to refund.`, {
      code: 'payment_intent_unexpected_state',
    });
  }
  return charge;
}

function refundAmount(charge: Charge, asked: number | undefined): number {
  const left = charge.amount - charge.amount_refunded;
  if (left === 0) {
    throw invalidRequest(`Charge ${charge.id} has already been refunded.`, { code: 'charge_already_refunded' });
  }
  if (asked !== undefined && asked > left) {
    const [askedText, leftText] = [moneyText(asked, charge.currency), moneyText(left, charge.currency)];
    throw invalidRequest(`Refund amount (${askedText}) is greater than unrefunded amount on charge (${leftText})`, {
      param: 'amount',
    });
  }
  return asked ?? left;
}
