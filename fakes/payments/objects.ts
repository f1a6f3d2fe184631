import type { Stripe } from 'stripe';

/*
 * The part of each object that the stand-in fills in. The shapes are taken from the SDK's own types, so that a field
 * which the real service would spell or type otherwise does not compile.
 */

export type Session = Pick<
  Stripe.Checkout.Session,
  | 'id'
  | 'object'
  | 'amount_subtotal'
  | 'amount_total'
  | 'cancel_url'
  | 'client_reference_id'
  | 'created'
  | 'currency'
  | 'customer'
  | 'customer_details'
  | 'customer_email'
  | 'expires_at'
  | 'livemode'
  | 'metadata'
  | 'mode'
  | 'payment_method_types'
  | 'payment_status'
  | 'status'
  | 'success_url'
  | 'ui_mode'
  | 'url'
> & { payment_intent: string | null };

export type LineItem = Pick<
  Stripe.LineItem,
  | 'id'
  | 'object'
  | 'amount_discount'
  | 'amount_subtotal'
  | 'amount_tax'
  | 'amount_total'
  | 'currency'
  | 'description'
  | 'metadata'
  | 'quantity'
> & { price: Pick<Stripe.Price, 'id' | 'object' | 'currency' | 'unit_amount'> };

export type Intent = Pick<
  Stripe.PaymentIntent,
  | 'id'
  | 'object'
  | 'amount'
  | 'amount_capturable'
  | 'amount_received'
  | 'capture_method'
  | 'created'
  | 'currency'
  | 'customer'
  | 'description'
  | 'last_payment_error'
  | 'livemode'
  | 'metadata'
  | 'payment_method'
  | 'payment_method_types'
  | 'receipt_email'
  | 'status'
> & { latest_charge: string | null };

export type Charge = Pick<
  Stripe.Charge,
  | 'id'
  | 'object'
  | 'amount'
  | 'amount_captured'
  | 'amount_refunded'
  | 'captured'
  | 'created'
  | 'currency'
  | 'customer'
  | 'description'
  | 'disputed'
  | 'failure_code'
  | 'failure_message'
  | 'livemode'
  | 'metadata'
  | 'paid'
  | 'payment_method'
  | 'receipt_email'
  | 'refunded'
  | 'status'
> & {
  payment_intent: string;
  billing_details: { address: null; email: string | null; name: string | null; phone: null };
  payment_method_details: {
    type: 'card';
    card: { brand: string; exp_month: number; exp_year: number; funding: string; last4: string };
  };
};

export type Refund = Pick<
  Stripe.Refund,
  'id' | 'object' | 'amount' | 'created' | 'currency' | 'metadata' | 'reason' | 'receipt_number' | 'status'
> & { charge: string; payment_intent: string };

export interface List<Item> {
  object: 'list';
  data: Item[];
  has_more: boolean;
  url: string;
}

export type EventType =
  | 'checkout.session.completed'
  | 'checkout.session.expired'
  | 'payment_intent.payment_failed'
  | 'charge.refunded'
  | 'refund.updated';

/** The API request that caused an event; null where the clock or a person on the pay page did. */
export type Cause = { id: string; idempotency_key: string | null } | null;

export interface Event {
  id: string;
  object: 'event';
  api_version: string;
  created: number;
  data: { object: Session | Intent | Charge | Refund };
  livemode: false;
  pending_webhooks: number;
  request: Cause;
  type: EventType;
}
