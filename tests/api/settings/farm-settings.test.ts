import { describe, expect, it } from 'vitest';
import { auditLog, farms, orders } from '../../../server/db/schema/index.ts';
import { startFarm, type TestClient } from '../../support/start-farm.ts';

function change(client: TestClient, version: number, body: object) {
  return client.patch('/api/farm').set('If-Match', `"${version}"`).send(body);
}

describe('settings of the farm', () => {
  it('when changed, they are stored, versioned and written down', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    const reply = await change(owner, 1, {
      name: 'Quiet Cove Corals',
      timeZone: 'America/Halifax',
      currency: 'CAD',
      address: '4 Tide Lane',
      email: 'Hello@Example.com',
      phone: '+1 555 0100',
      taxPercent: 19.6,
      holdMinutes: 90,
    });

    expect(reply.body).toEqual({
      name: 'Quiet Cove Corals',
      timeZone: 'America/Halifax',
      currency: 'CAD',
      currencyLocked: false,
      address: '4 Tide Lane',
      email: 'hello@example.com',
      phone: '+1 555 0100',
      taxPercent: 19.6,
      holdMinutes: 90,
      version: 2,
    });
    expect((await owner.get('/api/farm')).body).toEqual(reply.body);
    expect(farm.db.select().from(farms).get()?.taxPercent).toBe(1960);
    expect(farm.db.select().from(auditLog).all()).toContainEqual(
      expect.objectContaining({ action: 'farm.changed', before: expect.objectContaining({ name: 'Test Farm' }) }),
    );
  });

  it('when one setting is sent, the others stay', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    const reply = await change(owner, 1, { taxPercent: 0.07 });

    expect(reply.body).toMatchObject({ name: 'Test Farm', currency: 'EUR', taxPercent: 0.07 });
  });

  it('when there are orders, the currency stays and the rest may change', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    farm.db
      .insert(orders)
      .values({
        ...{ id: farm.deps.newId(), number: 1, storeId: farm.storeIds[0], state: 'placed', currency: 'EUR' },
        ...{ subtotalMinor: 100, taxMinor: 0, totalMinor: 100, placedAt: 1, placedBy: 'Buyer 1' },
      })
      .run();

    const refused = await change(owner, 1, { currency: 'USD', name: 'Other' });
    const taken = await change(owner, 1, { currency: 'EUR', name: 'Other' });

    expect(refused.status).toBe(409);
    expect(refused.body.fields).toMatchObject([{ path: 'currency' }]);
    expect(taken.body).toMatchObject({ name: 'Other', currency: 'EUR', currencyLocked: true });
  });

  it('when someone else changed them meanwhile, refuses and shows them as they are', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    await change(owner, 1, { name: 'First' });

    const reply = await change(owner, 1, { name: 'Second' });

    expect(reply.status).toBe(412);
    expect(reply.body.details.current).toMatchObject({ name: 'First', version: 2 });
    expect(farm.db.select().from(farms).get()?.name).toBe('First');
  });

  it.each([
    ['a zone that does not exist', { timeZone: 'Europe/Atlantis' }, 'timeZone'],
    ['a currency that does not exist', { currency: 'QQQ' }, 'currency'],
    ['a currency in small letters', { currency: 'eur' }, 'currency'],
    ['a tax below zero', { taxPercent: -1 }, 'taxPercent'],
    ['a tax above all', { taxPercent: 100.01 }, 'taxPercent'],
    ['a tax with three decimals', { taxPercent: 7.125 }, 'taxPercent'],
    ['a tax in words', { taxPercent: '19' }, 'taxPercent'],
    ['a hold shorter than the payment page', { holdMinutes: 30 }, 'holdMinutes'],
    ['a hold of more than a day', { holdMinutes: 1441 }, 'holdMinutes'],
    ['a hold of half minutes', { holdMinutes: 45.5 }, 'holdMinutes'],
    ['no name', { name: '' }, 'name'],
    ['an address like a book', { address: 'x'.repeat(501) }, 'address'],
    ['a broken e-mail', { email: 'farm' }, 'email'],
    ['a setting that does not exist', { demo: true }, 'demo'],
  ])('when sent %s, points at the field and changes nothing', async (_, body, path) => {
    const farm = await startFarm();

    const reply = await change(await farm.as('owner'), 1, body);

    expect(reply.status).toBe(400);
    expect(reply.body.fields).toMatchObject([{ path }]);
    expect(farm.db.select().from(farms).get()?.version).toBe(1);
  });
});
