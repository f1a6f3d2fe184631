import type { Card, TestCard } from './cards.ts';
import { nowSeconds, type Payments } from './context.ts';
import { recordEvent } from './events.ts';
import { newId } from './ids.ts';
import type { Charge, Intent, Session } from './objects.ts';
import { customerDetails } from './sessions.ts';
import type { StoredSession } from './store.ts';

/**
 * Charges a card for an open session: all of the total, or nothing.
 *
 * @returns why the bank refused, or null when the session is paid
 */
export function paySession(payments: Payments, stored: StoredSession, card: Card): TestCard['decline'] {
  const intent = intentFor(payments, stored);
  const charge = chargeCard(payments, stored.session, intent, card);
  const { decline } = card.card;

  if (decline === null) complete(payments, stored.session, intent, charge, card);
  else noteDecline(payments, intent, charge, decline);
  payments.store.save();
  return decline;
}

/** The first try to pay makes the payment intent; later tries on the same session use it again. */
function intentFor(payments: Payments, { session, intentData }: StoredSession): Intent {
  const existing = session.payment_intent === null ? undefined : payments.store.intents.get(session.payment_intent);
  if (existing !== undefined) return existing;

  const intent: Intent = {
    id: newId('pi'),
    object: 'payment_intent',
    amount: session.amount_total ?? 0,
    amount_capturable: 0,
    amount_received: 0,
    capture_method: 'automatic_async',
    created: nowSeconds(payments),
    currency: session.currency ?? '',
    customer: null,
    description: intentData.description ?? null,
    last_payment_error: null,
    latest_charge: null,
    livemode: false,
    metadata: intentData.metadata,
    payment_method: null,
    payment_method_types: ['card'],
    receipt_email: intentData.receipt_email ?? null,
    status: 'requires_payment_method',
  };
  payments.store.intents.set(intent.id, intent);
  session.payment_intent = intent.id;
  return intent;
}

function chargeCard(payments: Payments, session: Session, intent: Intent, card: Card): Charge {
  const { decline, number, brand } = card.card;
  const paid = decline === null;
  const charge: Charge = {
    id: newId('ch'),
    object: 'charge',
    amount: intent.amount,
    amount_captured: paid ? intent.amount : 0,
    amount_refunded: 0,
    billing_details: { address: null, email: session.customer_email, name: card.name, phone: null },
    captured: paid,
    created: nowSeconds(payments),
    currency: intent.currency,
    customer: null,
    description: intent.description,
    disputed: false,
    failure_code: decline?.code ?? null,
    failure_message: decline?.message ?? null,
    livemode: false,
    metadata: { ...intent.metadata },
    paid,
    payment_intent: intent.id,
    payment_method: newId('pm'),
    payment_method_details: {
      type: 'card',
      card: {
        brand,
        exp_month: card.expMonth,
        exp_year: card.expYear,
        funding: 'credit',
        last4: number.slice(-4),
      },
    },
    receipt_email: intent.receipt_email,
    refunded: false,
    status: paid ? 'succeeded' : 'failed',
  };
  payments.store.charges.set(charge.id, charge);
  intent.latest_charge = charge.id;
  return charge;
}

function complete(payments: Payments, session: Session, intent: Intent, charge: Charge, card: Card): void {
  intent.status = 'succeeded';
  intent.amount_received = intent.amount;
  intent.payment_method = charge.payment_method;
  intent.last_payment_error = null;

  session.status = 'complete';
  session.payment_status = 'paid';
  session.url = null;
  session.customer_details = customerDetails(session.customer_email, card.name);
  recordEvent(payments, 'checkout.session.completed', session, null);
}

function noteDecline(
  payments: Payments,
  intent: Intent,
  charge: Charge,
  decline: NonNullable<TestCard['decline']>,
): void {
  intent.status = 'requires_payment_method';
  intent.last_payment_error = {
    type: 'card_error',
    charge: charge.id,
    code: decline.code,
    decline_code: decline.declineCode,
    message: decline.message,
  };
  recordEvent(payments, 'payment_intent.payment_failed', intent, null);
}
