import Stripe from 'stripe';
import { describe, expect, it, vi } from 'vitest';
import { signatureHeader } from '../../../fakes/payments/signature.ts';
import vectors from '../../reference/stripe-webhook.json' with { type: 'json' };
import { anOrder, pay, startReceiver, startShop } from './payments-kit.ts';

describe('webhooks', () => {
  it('when a session is paid, the signed event passes the SDK and carries the paid session', async () => {
    const receiver = await startReceiver();
    const { stripe } = await startShop({ webhookUrl: receiver.url });
    const { id, url } = await stripe.checkout.sessions.create(anOrder);

    await pay(url, '4242424242424242');

    await vi.waitFor(() => expect(receiver.events).toHaveLength(1));
    expect(receiver.events[0]).toMatchObject({
      type: 'checkout.session.completed',
      livemode: false,
      data: { object: { id, payment_status: 'paid', metadata: { orderId: 'order-1' } } },
    });
  });

  it('when a card is declined, the failed payment intent is told with its metadata', async () => {
    const receiver = await startReceiver();
    const { stripe } = await startShop({ webhookUrl: receiver.url });
    const { url } = await stripe.checkout.sessions.create(anOrder);

    await pay(url, '4000000000000002');

    await vi.waitFor(() => expect(receiver.events).toHaveLength(1));
    expect(receiver.events[0]).toMatchObject({
      type: 'payment_intent.payment_failed',
      data: { object: { metadata: { orderId: 'order-1' }, last_payment_error: { code: 'card_declined' } } },
    });
  });

  it('when the receiver fails, the same event comes again until it is taken, and is then left alone', async () => {
    const receiver = await startReceiver();
    receiver.nextStatuses.push(500, 503, 302);
    const { payments, stripe } = await startShop({ webhookUrl: receiver.url, retryDelaysMs: [5, 5, 5, 5] });
    const { url } = await stripe.checkout.sessions.create(anOrder);

    await pay(url, '4242424242424242');

    await vi.waitFor(async () => {
      const [stored] = await storedEvents(payments.url);
      expect(stored?.state).toBe('delivered');
    });
    const [stored] = await storedEvents(payments.url);
    expect(stored?.attempts.map(({ status }) => status)).toEqual([500, 503, 302, 200]);
    expect(receiver.events.map(({ id }) => id)).toEqual([stored?.event.id]);
    expect(await stripe.events.retrieve(stored?.event.id ?? '')).toMatchObject({ pending_webhooks: 0 });
  });

  it('when nobody listens, it gives up after the last try and can be sent again by hand', async () => {
    const receiver = await startReceiver();
    const { payments, stripe } = await startShop({ webhookUrl: 'http://127.0.0.1:1/none', retryDelaysMs: [5] });
    const { url } = await stripe.checkout.sessions.create(anOrder);
    await pay(url, '4242424242424242');
    await vi.waitFor(async () => expect((await storedEvents(payments.url))[0]?.state).toBe('given up'));

    payments.sendWebhooksTo(receiver.url);
    const [stored] = await storedEvents(payments.url);
    await fetch(`${payments.url}/_events/${stored?.event.id}/resend`, { method: 'POST' });

    expect(receiver.events.map(({ id }) => id)).toEqual([stored?.event.id]);
    expect((await storedEvents(payments.url))[0]?.attempts).toHaveLength(3);
  });

  it('when a session runs out of time, it expires by itself and the event says so', async () => {
    let now = Date.now();
    const receiver = await startReceiver();
    const { stripe } = await startShop({ webhookUrl: receiver.url, now: () => now });
    const { id, expires_at: expiresAt } = await stripe.checkout.sessions.create(anOrder);

    now = expiresAt * 1000 - 1;
    expect((await stripe.checkout.sessions.retrieve(id)).status).toBe('open');
    now = expiresAt * 1000;
    expect((await stripe.checkout.sessions.retrieve(id)).status).toBe('expired');

    await vi.waitFor(() => expect(receiver.events.map(({ type }) => type)).toEqual(['checkout.session.expired']));
  });

  it('when a browser asks for the events, it gets a page with the attempts', async () => {
    const receiver = await startReceiver();
    const { payments, stripe } = await startShop({ webhookUrl: receiver.url });
    const { id } = await stripe.checkout.sessions.create(anOrder);
    await stripe.checkout.sessions.expire(id);
    await vi.waitFor(async () => expect((await storedEvents(payments.url))[0]?.state).toBe('delivered'));

    const page = await (await fetch(`${payments.url}/_events`, { headers: { Accept: 'text/html' } })).text();

    expect(page).toContain('checkout.session.expired');
    expect(page).toContain('answered 200');
  });
});

describe('webhook signatures', () => {
  const signed = vectors.vectors.filter(({ note }) => note === 'valid' || note.startsWith('UTF-8'));

  it.each(signed)('match the published scheme: $note', ({ payload, secret, timestamp, header }) => {
    expect(signatureHeader(payload, secret, timestamp)).toBe(header);
  });

  it('are those that the SDK makes itself', () => {
    const [payload, secret, timestamp] = ['{"note":"Größe ≥ 2 cm"}', 'whsec_x', 1_790_000_000];

    const bySdk = Stripe.webhooks.generateTestHeaderString({ payload, secret, timestamp });

    expect(signatureHeader(payload, secret, timestamp)).toBe(bySdk);
  });
});

interface StoredEvent {
  event: Stripe.Event;
  state: string;
  attempts: { status: number | null }[];
}

async function storedEvents(url: string): Promise<StoredEvent[]> {
  const reply = await fetch(`${url}/_events`);
  // The stand-in's own JSON; the tests state what they rely on.
  return ((await reply.json()) as { events: StoredEvent[] }).events;
}
