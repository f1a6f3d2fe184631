import { describe, expect, it } from 'vitest';
import { passesLuhn } from '../../../fakes/payments/cards.ts';
import { anOrder, ORDER_TOTAL, pay, startShop } from './payments-kit.ts';

describe('the hosted payment page', () => {
  it('when opened, says that it is a test and shows lines and total, with names escaped', async () => {
    const { stripe } = await startShop();
    const { url } = await stripe.checkout.sessions.create(anOrder);

    const page = await (await fetch(url ?? '')).text();

    expect(page).toContain('Test payment page, no money moves');
    expect(page).toContain('Ember Plate &amp; &lt;co&gt;');
    expect(page).toContain('$245.50');
    expect(page).toContain('href="http://127.0.0.1:3000/orders/1047"');
    expect(page).not.toContain('<script');
  });

  it('when the good card pays, leads back to the shop and the session is paid with a charge behind it', async () => {
    const { stripe } = await startShop();
    const { id, url } = await stripe.checkout.sessions.create(anOrder);

    const reply = await pay(url, '4242 4242 4242 4242');

    expect(reply.status).toBe(303);
    expect(reply.headers.get('location')).toBe(`http://127.0.0.1:3000/orders/1047?paid=${id}`);
    const session = await stripe.checkout.sessions.retrieve(id, { expand: ['payment_intent.latest_charge'] });
    expect(session).toMatchObject({
      status: 'complete',
      payment_status: 'paid',
      url: null,
      customer_details: { email: 'buyer@example.com', name: 'Test Buyer' },
      payment_intent: {
        status: 'succeeded',
        amount_received: ORDER_TOTAL,
        metadata: { orderId: 'order-1' },
        latest_charge: {
          object: 'charge',
          paid: true,
          amount: ORDER_TOTAL,
          payment_method_details: { card: { brand: 'visa', last4: '4242' } },
        },
      },
    });
  });

  it('when the pay button is pressed twice, the card is charged once and both lead back', async () => {
    const { stripe } = await startShop();
    const { id, url } = await stripe.checkout.sessions.create(anOrder);
    await pay(url, '4242424242424242');
    const { payment_intent: intent } = await stripe.checkout.sessions.retrieve(id);

    const second = await pay(url, '4242424242424242');

    expect(second.status).toBe(303);
    expect((await stripe.checkout.sessions.retrieve(id)).payment_intent).toBe(intent);
  });

  it.each([
    ['4000000000000002', 'generic_decline', 'Your card was declined.'],
    ['4000000000009995', 'insufficient_funds', 'Your card has insufficient funds.'],
  ])('when card %s is refused, says why and a good card can still pay', async (number, declineCode, message) => {
    const { stripe } = await startShop();
    const { id, url } = await stripe.checkout.sessions.create(anOrder);

    const refused = await pay(url, number);

    expect(refused.status).toBe(402);
    expect(await refused.text()).toContain(message);
    const unpaid = await stripe.checkout.sessions.retrieve(id, { expand: ['payment_intent'] });
    expect(unpaid).toMatchObject({
      status: 'open',
      payment_status: 'unpaid',
      payment_intent: { status: 'requires_payment_method', last_payment_error: { decline_code: declineCode } },
    });
    expect((await pay(url, '4242424242424242')).status).toBe(303);
  });

  it.each([
    ['number', '4242424242424241', 'This card number is not valid. Check its digits.'],
    ['number', '4242', 'A card number has 12 to 19 digits. Check for a missing one.'],
    ['number', '5555555555554444', 'This page takes the listed test cards only. Never enter a real card here.'],
    ['expiry', '13 / 39', 'Enter the month and year, such as 08 / 34.'],
    ['expiry', '08/20', 'This date has passed. Use a card that is still good.'],
    ['cvc', '12', 'Enter the three digits of the security code.'],
    ['name', ' ', 'Enter the name on the card.'],
  ])('when the %s is "%s", the field says what to do and nothing is charged', async (field, value, message) => {
    const { stripe } = await startShop();
    const { id, url } = await stripe.checkout.sessions.create(anOrder);

    const reply = await pay(url, '4242424242424242', { [field]: value });

    expect(reply.status).toBe(422);
    const page = await reply.text();
    expect(page).toContain(`id="${field}-error"`);
    expect(page).toContain(message);
    expect((await stripe.checkout.sessions.retrieve(id)).payment_intent).toBeNull();
  });

  it('when a card is in its last month it still pays, and from the next month on it does not', async () => {
    let now = Date.UTC(2026, 7, 31, 23, 59);
    const { stripe } = await startShop({ now: () => now });
    const { url } = await stripe.checkout.sessions.create(anOrder);

    now = Date.UTC(2026, 8, 1, 0, 0);
    const late = await pay(url, '4242424242424242', { expiry: '08/26' });
    now = Date.UTC(2026, 7, 31, 23, 59);
    const inTime = await pay(url, '4242424242424242', { expiry: '08/26' });

    expect(late.status).toBe(422);
    expect(inTime.status).toBe(303);
  });

  it('when a session is unknown or expired, the page says so', async () => {
    const { payments, stripe } = await startShop();
    const { id, url } = await stripe.checkout.sessions.create(anOrder);
    await stripe.checkout.sessions.expire(id);

    expect((await fetch(`${payments.url}/pay/cs_test_none`)).status).toBe(404);
    expect((await fetch(url ?? '')).status).toBe(410);
    expect((await pay(url, '4242424242424242')).status).toBe(410);
  });
});

// Check digits: the worked example of ISO/IEC 7812-1 annex B as commonly printed (7992739871 takes 3), from memory.
it.each(['0', '1', '2', '3', '4', '5', '6', '7', '8', '9'])(
  'check digit %s of 7992739871 is right only if 3',
  (digit) => {
    expect(passesLuhn(`7992739871${digit}`)).toBe(digit === '3');
  },
);
