import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it, onTestFinished } from 'vitest';
import { anOrder, ORDER_TOTAL, pay, sdkFor, startShop } from './payments-kit.ts';

describe('checkout sessions', () => {
  it('when a session is made, it is open with the total of its lines and has a page', async () => {
    const { payments, stripe } = await startShop();

    const session = await stripe.checkout.sessions.create(anOrder);

    expect(session).toMatchObject({
      object: 'checkout.session',
      status: 'open',
      payment_status: 'unpaid',
      amount_total: ORDER_TOTAL,
      currency: 'usd',
      client_reference_id: 'LS-1047',
      metadata: { orderId: 'order-1' },
      payment_intent: null,
      url: `${payments.url}/pay/${session.id}`,
    });
    expect(session.lastResponse.requestId).toMatch(/^req_/);
    expect(await stripe.checkout.sessions.retrieve(session.id)).toEqual(session);
  });

  it('when lines are asked for, they come with the session and page by page alike', async () => {
    const { stripe } = await startShop();
    const { id } = await stripe.checkout.sessions.create(anOrder);

    const session = await stripe.checkout.sessions.retrieve(id, { expand: ['line_items'] });
    const lines = await stripe.checkout.sessions.listLineItems(id);

    expect(session.line_items?.data.map((line) => [line.description, line.quantity, line.amount_total])).toEqual([
      ['Ember Plate & <co>', 12, 21_600],
      ['Box', 1, 2950],
    ]);
    expect(lines.data).toEqual(session.line_items?.data);
  });

  it('when an order has a hundred lines, all are taken in their order', async () => {
    const { stripe } = await startShop();
    const line_items = Array.from({ length: 100 }, (_, index) => ({
      quantity: 1,
      price_data: { currency: 'eur', unit_amount: 100 + index, product_data: { name: `Line ${index}` } },
    }));

    const { id } = await stripe.checkout.sessions.create({ ...anOrder, line_items });

    const { data } = await stripe.checkout.sessions.listLineItems(id);
    expect(data.map((line) => line.description)).toEqual(line_items.map((line) => line.price_data.product_data.name));
  });

  it('when sessions are listed, they come newest first and can be narrowed by status', async () => {
    const { stripe } = await startShop();
    const first = await stripe.checkout.sessions.create(anOrder);
    const second = await stripe.checkout.sessions.create(anOrder);
    const third = await stripe.checkout.sessions.create(anOrder);
    await stripe.checkout.sessions.expire(first.id);

    const page = await stripe.checkout.sessions.list({ limit: 2 });
    const expired = await stripe.checkout.sessions.list({ status: 'expired' });

    expect(page.data.map(({ id }) => id)).toEqual([third.id, second.id]);
    expect(page.has_more).toBe(true);
    expect(expired.data.map(({ id }) => id)).toEqual([first.id]);
  });
});

describe('refused requests', () => {
  it('when the key is wrong, the SDK throws its authentication error', async () => {
    const { payments } = await startShop();

    await expect(sdkFor(payments, 'sk_test_wrong').checkout.sessions.create(anOrder)).rejects.toMatchObject({
      type: 'StripeAuthenticationError',
      statusCode: 401,
    });
  });

  it('when a session is unknown, the SDK throws an invalid request error that says so', async () => {
    const { stripe } = await startShop();

    await expect(stripe.checkout.sessions.retrieve('cs_test_none')).rejects.toMatchObject({
      type: 'StripeInvalidRequestError',
      statusCode: 404,
      code: 'resource_missing',
    });
  });

  it.each([
    ['a line is missing its price', { line_items: [{ quantity: 1 }] }, 'line_items[0][price_data]'],
    ['the web address is none', { success_url: 'orders/1047' }, 'success_url'],
    ['it would expire within minutes', { expires_at: Math.floor(Date.now() / 1000) + 60 }, 'expires_at'],
    ['a parameter is unknown', { after_expiration: { recovery: { enabled: true } } }, 'after_expiration'],
  ])('when %s, the error names the parameter', async (_case, wrong, param) => {
    const { stripe } = await startShop();

    await expect(stripe.checkout.sessions.create({ ...anOrder, ...wrong })).rejects.toMatchObject({
      type: 'StripeInvalidRequestError',
      param,
    });
  });

  it('when the total is below the smallest that can be charged, it is refused', async () => {
    const { stripe } = await startShop();
    const cheap = {
      quantity: 1,
      price_data: { currency: 'usd', unit_amount: 49, product_data: { name: 'Sticker' } },
    };

    await expect(stripe.checkout.sessions.create({ ...anOrder, line_items: [cheap] })).rejects.toMatchObject({
      code: 'amount_too_small',
    });
  });
});

describe('idempotency', () => {
  it('when the same request comes again under its key, the first answer is replayed and nothing is made', async () => {
    const { stripe } = await startShop();

    const first = await stripe.checkout.sessions.create(anOrder, { idempotencyKey: 'order-1' });
    const again = await stripe.checkout.sessions.create(anOrder, { idempotencyKey: 'order-1' });

    expect(again).toEqual(first);
    expect(again.lastResponse.headers['idempotent-replayed']).toBe('true');
    expect((await stripe.checkout.sessions.list()).data).toHaveLength(1);
  });

  it('when another request comes under a used key, it is an idempotency error', async () => {
    const { stripe } = await startShop();
    await stripe.checkout.sessions.create(anOrder, { idempotencyKey: 'order-1' });

    const other = stripe.checkout.sessions.create(
      { ...anOrder, client_reference_id: 'LS-1048' },
      { idempotencyKey: 'order-1' },
    );

    await expect(other).rejects.toMatchObject({ type: 'StripeIdempotencyError' });
  });
});

describe('restart', () => {
  it('when the stand-in restarts with its data, an open session can still be paid', async () => {
    const dataDir = await mkdtemp(join(tmpdir(), 'payments-'));
    onTestFinished(() => rm(dataDir, { recursive: true }));
    const before = await startShop({ dataDir });
    const { id } = await before.stripe.checkout.sessions.create(anOrder);
    await before.payments.close();

    const after = await startShop({ dataDir });
    await pay(`${after.payments.url}/pay/${id}`, '4242424242424242');

    expect((await after.stripe.checkout.sessions.retrieve(id)).payment_status).toBe('paid');
  });
});
