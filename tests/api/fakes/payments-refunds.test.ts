import { expect, it, vi } from 'vitest';
import { anOrder, ORDER_TOTAL, pay, startReceiver, startShop, type Shop } from './payments-kit.ts';

it('when an order is refunded in parts, the charge counts them and each is told', async () => {
  const receiver = await startReceiver();
  const { stripe } = await startShop({ webhookUrl: receiver.url });
  const intent = await paidIntent({ stripe });

  const part = await stripe.refunds.create({ payment_intent: intent, amount: 5000, metadata: { claimId: 'claim-1' } });
  const rest = await stripe.refunds.create({ payment_intent: intent, reason: 'requested_by_customer' });

  expect(part).toMatchObject({ status: 'succeeded', amount: 5000, payment_intent: intent });
  expect(rest).toMatchObject({ amount: ORDER_TOTAL - 5000, reason: 'requested_by_customer' });
  expect(await stripe.refunds.retrieve(part.id)).toMatchObject({ metadata: { claimId: 'claim-1' } });
  await vi.waitFor(() => expect(receiver.events).toHaveLength(5));
  expect(receiver.events.map(({ type }) => type).sort()).toEqual([
    'charge.refunded',
    'charge.refunded',
    'checkout.session.completed',
    'refund.updated',
    'refund.updated',
  ]);
  const charges = receiver.events.filter((event) => event.type === 'charge.refunded').map(({ data }) => data.object);
  expect(charges).toContainEqual(expect.objectContaining({ amount_refunded: 5000, refunded: false }));
  expect(charges).toContainEqual(expect.objectContaining({ amount_refunded: ORDER_TOTAL, refunded: true }));
});

it('when a refund is sent twice under one key, money goes back once', async () => {
  const { stripe } = await startShop();
  const intent = await paidIntent({ stripe });
  const refund = () => stripe.refunds.create({ payment_intent: intent, amount: 5000 }, { idempotencyKey: 'claim-1' });

  const [first, second] = [await refund(), await refund()];

  expect(second.id).toBe(first.id);
  const paid = await stripe.paymentIntents.retrieve(intent, { expand: ['latest_charge'] });
  expect(paid.latest_charge).toMatchObject({ amount_refunded: 5000 });
});

it('when more is asked back than is left, it is refused and the charge stays as it was', async () => {
  const { stripe } = await startShop();
  const intent = await paidIntent({ stripe });

  await expect(stripe.refunds.create({ payment_intent: intent, amount: ORDER_TOTAL + 1 })).rejects.toMatchObject({
    type: 'StripeInvalidRequestError',
    param: 'amount',
  });

  await stripe.refunds.create({ payment_intent: intent });
  await expect(stripe.refunds.create({ payment_intent: intent })).rejects.toMatchObject({
    code: 'charge_already_refunded',
  });
});

it('when a payment never succeeded, there is nothing to refund', async () => {
  const { stripe } = await startShop();
  const { id, url } = await stripe.checkout.sessions.create(anOrder);
  await pay(url, '4000000000000002');
  const { payment_intent: intent } = await stripe.checkout.sessions.retrieve(id);

  await expect(stripe.refunds.create({ payment_intent: String(intent) })).rejects.toMatchObject({
    code: 'payment_intent_unexpected_state',
  });
});

async function paidIntent({ stripe }: Pick<Shop, 'stripe'>): Promise<string> {
  const { id, url } = await stripe.checkout.sessions.create(anOrder);
  await pay(url, '4242424242424242');
  return String((await stripe.checkout.sessions.retrieve(id)).payment_intent);
}
