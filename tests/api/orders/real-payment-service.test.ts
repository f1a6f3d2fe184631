import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { beforeEach, describe, expect, it, onTestFinished, vi } from 'vitest';
import { startPayments, type RunningPayments } from '../../../fakes/payments/server.ts';
import { orders, payments, refunds } from '../../../server/db/schema/index.ts';
import { expireHolds } from '../../../server/jobs/expire-holds.ts';
import { sendRefunds } from '../../../server/jobs/send-refunds.ts';
import { stripePayments } from '../../../server/outside/payment-service.ts';
import type { ShopOrder } from '../../../shared/contracts/shop.ts';
import { givenOffer, givenOrder } from '../../support/given-orders.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

const KEY = 'sk_test_of_this_test';
const SECRET = 'whsec_of_this_test';

describe('with the real SDK, the hosted page and webhooks over the network', () => {
  let service: RunningPayments;
  let farm: TestFarm;
  let buyer: TestClient;
  let order: ShopOrder;

  beforeEach(async () => {
    service = await startPayments({ port: 0, apiKey: KEY, webhookSecret: SECRET, retryDelaysMs: [50] });
    onTestFinished(() => service.close());
    const payment = stripePayments({ secretKey: KEY, webhookSecret: SECRET, apiUrl: service.url });
    // The page lives by the real clock.
    farm = await startFarm({ payments: payment, now: new Date().toISOString() });
    const server = createServer(farm.app as Parameters<typeof createServer>[1]);
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    onTestFinished(() => {
      server.closeAllConnections();
      server.close();
    });
    service.sendWebhooksTo(`http://127.0.0.1:${(server.address() as AddressInfo).port}/api/webhooks/payments`);
    buyer = await farm.as('buyer');
    order = givenOrder(farm, [{ offer: givenOffer(farm, { priceMinor: 1800 }), quantity: 3 }]);
  });

  const pageOf = async () => String((await buyer.post(`/api/shop/orders/${order.id}/pay`).send().expect(200)).body.url);
  const card = (url: string, number: string) =>
    fetch(url, {
      method: 'POST',
      body: new URLSearchParams({ number, expiry: '12 / 39', cvc: '123', name: 'Test Buyer' }),
      redirect: 'manual',
    });
  const shown = async () => (await buyer.get(`/api/shop/orders/${order.id}`).expect(200)).body as ShopOrder;

  it('when the card is good, the buyer is led back and the webhook makes the order paid', async () => {
    const page = await card(await pageOf(), '4242424242424242');

    expect(page.status).toBe(303);
    expect(page.headers.get('Location')).toBe(`http://farm.example.com/shop/orders/${order.id}?payment=returned`);
    await vi.waitFor(async () => expect((await shown()).state).toBe('paid'));
    expect(farm.db.select().from(payments).get()).toMatchObject({ state: 'paid', amountMinor: 5400 });
  });

  it('when the card is declined, the order says why and can be paid with another', async () => {
    const url = await pageOf();
    await card(url, '4000000000000002');
    await vi.waitFor(async () => expect((await shown()).refusal).toContain('declined'));

    await card(await pageOf(), '4242424242424242');

    await vi.waitFor(async () => expect(await shown()).toMatchObject({ state: 'paid', refusal: '' }));
  });

  it('when it is cancelled after payment, the money goes back and the refund is settled', async () => {
    await card(await pageOf(), '4242424242424242');
    await vi.waitFor(async () => expect((await shown()).state).toBe('paid'));
    const sales = await farm.as('sales');
    await sales.post(`/api/orders/${order.id}/cancel`).send({ reason: 'Heater failed' }).expect(200);

    await sendRefunds(farm.deps);

    await vi.waitFor(() =>
      expect(farm.db.select().from(refunds).all()).toMatchObject([{ state: 'succeeded', amountMinor: 5400 }]),
    );
    expect((await shown()).refundedMinor).toBe(5400);
  });

  it('when it is not paid in time, the page is closed and can not be paid any more', async () => {
    const url = await pageOf();
    farm.wait(41 * 60_000);

    await expireHolds(farm.deps);

    expect(farm.db.select().from(orders).get()?.state).toBe('cancelled');
    expect((await card(url, '4242424242424242')).status).toBe(410);
  });

  it('when it was paid just before the hold ended, closing the page finds that out and the order stays', async () => {
    service.sendWebhooksTo(null);
    await card(await pageOf(), '4242424242424242');
    farm.wait(41 * 60_000);

    await expireHolds(farm.deps);

    expect(farm.db.select().from(orders).get()?.state).toBe('placed');
  });
});
