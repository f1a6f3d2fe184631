import { invalidRequest, noSuch } from './api-error.ts';
import { nowSeconds, type Payments } from './context.ts';
import { recordEvent } from './events.ts';
import { newId } from './ids.ts';
import { moneyText } from './money-text.ts';
import type { Cause, LineItem, List, Session } from './objects.ts';
import type { CreateSession, ListSessions } from './params.ts';
import type { StoredSession } from './store.ts';

const SHORTEST_LIFE_S = 30 * 60;
const LONGEST_LIFE_S = 24 * 3600;
const SMALLEST_TOTAL = 50;
const LARGEST_TOTAL = 99_999_999;

/** Opens a checkout of one or more lines that the customer pays on the hosted page. */
export function createSession(payments: Payments, params: CreateSession): Session {
  const lines = params.line_items.map(toLine);
  const currency = oneCurrency(lines);
  const total = lines.reduce((sum, line) => sum + line.amount_total, 0);
  checkTotal(total, currency);

  const id = newId('cs_test', 58);
  const created = nowSeconds(payments);
  const session: Session = {
    id,
    object: 'checkout.session',
    amount_subtotal: total,
    amount_total: total,
    cancel_url: params.cancel_url ?? null,
    client_reference_id: params.client_reference_id ?? null,
    created,
    currency,
    customer: null,
    customer_details: params.customer_email === undefined ? null : customerDetails(params.customer_email, null),
    customer_email: params.customer_email ?? null,
    expires_at: expiryTime(params.expires_at, created),
    livemode: false,
    metadata: params.metadata,
    mode: 'payment',
    payment_intent: null,
    payment_method_types: ['card'],
    payment_status: 'unpaid',
    status: 'open',
    success_url: params.success_url,
    ui_mode: 'hosted_page',
    url: `${payments.publicUrl()}/pay/${id}`,
  };
  payments.store.sessions.set(id, { session, lines, intentData: params.payment_intent_data });
  return session;
}

export function findSession(payments: Payments, id: string): StoredSession {
  const stored = payments.store.sessions.get(id);
  if (stored === undefined) throw noSuch('checkout.session', id, 'session');
  return stored;
}

/** Sessions newest first, a page at a time. */
export function listSessions(payments: Payments, query: ListSessions): List<Session> {
  const matching = [...payments.store.sessions.values()]
    .map(({ session }) => session)
    .filter(
      ({ status, payment_intent }) =>
        (query.status === undefined || status === query.status) &&
        (query.payment_intent === undefined || payment_intent === query.payment_intent),
    )
    .reverse();
  const start = matching.findIndex(({ id }) => id === query.starting_after) + 1;
  const data = matching.slice(start, start + query.limit);
  return { object: 'list', data, has_more: matching.length > start + query.limit, url: '/v1/checkout/sessions' };
}

/** Closes an open session at the merchant's wish. */
export function expireSession(payments: Payments, id: string, cause: Cause): Session {
  const { session } = findSession(payments, id);
  if (session.status !== 'open') {
    throw invalidRequest(
      `Only Checkout Sessions with a status in ["open"] can be expired. This Checkout Session has a status of ${session.status}.`,
    );
  }
  close(payments, session, cause);
  return session;
}

/** Closes every open session whose time is up. */
export function expireDueSessions(payments: Payments): void {
  const due = [...payments.store.sessions.values()]
    .map(({ session }) => session)
    .filter((session) => session.status === 'open' && session.expires_at <= nowSeconds(payments));
  if (due.length === 0) return;

  for (const session of due) close(payments, session, null);
  payments.store.save();
}

export function customerDetails(email: string | null, name: string | null): Session['customer_details'] {
  return {
    address: null,
    business_name: null,
    email,
    individual_name: null,
    name,
    phone: null,
    tax_exempt: 'none',
    tax_ids: [],
  };
}

function close(payments: Payments, session: Session, cause: Cause): void {
  session.status = 'expired';
  session.url = null;
  recordEvent(payments, 'checkout.session.expired', session, cause);
}

function toLine({ quantity, price_data: price }: CreateSession['line_items'][number]): LineItem {
  const amount = price.unit_amount * quantity;
  return {
    id: newId('li'),
    object: 'item',
    amount_discount: 0,
    amount_subtotal: amount,
    amount_tax: 0,
    amount_total: amount,
    currency: price.currency,
    description: price.product_data.name,
    metadata: price.product_data.metadata ?? {},
    price: { id: newId('price'), object: 'price', currency: price.currency, unit_amount: price.unit_amount },
    quantity,
  };
}

function oneCurrency(lines: readonly LineItem[]): string {
  const [currency, ...others] = new Set(lines.map((line) => line.currency));
  if (currency === undefined || others.length > 0) {
    throw invalidRequest('All line items must have the same currency.', { param: 'line_items' });
  }
  return currency;
}

/** The real service converts the smallest total from USD; the stand-in takes the same number in any currency. */
function checkTotal(total: number, currency: string): void {
  if (total < SMALLEST_TOTAL) {
    const smallest = moneyText(SMALLEST_TOTAL, currency);
    throw invalidRequest(`The Checkout Session's total amount must be at least ${smallest}.`, {
      code: 'amount_too_small',
    });
  }
  if (total > LARGEST_TOTAL) {
    const largest = moneyText(LARGEST_TOTAL, currency);
    throw invalidRequest(`The Checkout Session's total amount must be no more than ${largest}.`, {
      code: 'amount_too_large',
    });
  }
}

function expiryTime(asked: number | undefined, created: number): number {
  if (asked === undefined) return created + LONGEST_LIFE_S;
  // A minute of grace on both sides for clocks and for the time the request took.
  if (asked < created + SHORTEST_LIFE_S - 60 || asked > created + LONGEST_LIFE_S + 60) {
    throw invalidRequest('The `expires_at` timestamp must be between 30 minutes and 24 hours from now.', {
      param: 'expires_at',
    });
  }
  return asked;
}
