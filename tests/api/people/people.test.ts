import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { auditLog, users } from '../../../server/db/schema/index.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

function personOf(farm: TestFarm, email: string) {
  const row = farm.db.select().from(users).where(eq(users.email, email)).get();
  if (!row) throw new Error(`${email} is not of this farm.`);
  return row;
}

function change(client: TestClient, person: { id: string; version: number }, body: object) {
  return client.patch(`/api/people/${person.id}`).set('If-Match', `"${person.version}"`).send(body);
}

describe('people of the farm', () => {
  it('when listed page by page, everyone comes once, by name, without secrets', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    const first = await owner.get('/api/people?limit=4');
    const second = await owner.get(`/api/people?limit=4&cursor=${first.body.nextCursor}`);

    const names = [...first.body.items, ...second.body.items].map(({ name }) => name);
    expect(names).toEqual(['Buyer 1', 'Buyer 2', 'Test grower', 'Test owner', 'Test sales', 'Test viewer']);
    expect(first.body.total).toBe(6);
    expect(second.body.nextCursor).toBeNull();
    expect(JSON.stringify(first.body)).not.toContain('argon2');
  });

  it('when searched, finds by a part of name or e-mail, also with signs that databases know', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    expect((await owner.get('/api/people?search=GROW')).body.items).toMatchObject([{ name: 'Test grower' }]);
    expect((await owner.get('/api/people?search=buyer-1@')).body.total).toBe(1);
    expect((await owner.get(`/api/people?search=${encodeURIComponent('%_\'";--')}`)).body.total).toBe(0);
  });

  it('when the cursor is made up, says so', async () => {
    const farm = await startFarm();

    const reply = await (await farm.as('owner')).get('/api/people?cursor=abc');

    expect(reply.status).toBe(400);
    expect(reply.body.fields).toMatchObject([{ path: 'cursor' }]);
  });

  it('when a role changes, it is stored, versioned and written down', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    const grower = personOf(farm, 'grower@example.com');

    const reply = await change(owner, grower, { role: 'sales' });

    expect(reply.body).toMatchObject({ role: 'sales', version: 2 });
    expect(reply.get('ETag')).toBe('"2"');
    expect(personOf(farm, 'grower@example.com').role).toBe('sales');
    const entry = farm.db.select().from(auditLog).where(eq(auditLog.action, 'user.changed')).get();
    expect(entry).toMatchObject({ before: { role: 'grower' }, after: { role: 'sales' }, actorName: 'Test owner' });
  });

  it('when someone becomes a buyer, a store must be named; when a buyer becomes staff, it is let go', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    const grower = personOf(farm, 'grower@example.com');
    const buyer = personOf(farm, 'buyer-0@example.com');

    expect((await change(owner, grower, { role: 'buyer' })).body.fields).toMatchObject([{ path: 'storeId' }]);
    expect((await change(owner, grower, { role: 'buyer', storeId: farm.storeIds[1] })).body).toMatchObject({
      storeName: 'Store 2',
    });
    expect((await change(owner, buyer, { role: 'viewer' })).body).toMatchObject({ storeId: null, storeName: null });
  });

  it('when disabled, the person is signed out and can not sign in; when enabled again, can', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    const client = await farm.as('grower');
    const grower = personOf(farm, 'grower@example.com');

    const disabled = await change(owner, grower, { disabled: true });

    expect(disabled.body.disabledAt).toBe(farm.deps.clock.now());
    expect((await client.get('/api/session')).body.user).toBeNull();
    await expect(farm.as('grower')).rejects.toThrow('sign_in.refused');
    expect((await change(owner, disabled.body, { disabled: false })).body.disabledAt).toBeNull();
    expect((await (await farm.as('grower')).get('/api/session')).body.user.role).toBe('grower');
  });

  it.each([{ disabled: true }, { role: 'grower' }])('when the last owner would go by %o, refuses', async (body) => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    const reply = await change(owner, personOf(farm, 'owner@example.com'), body);

    expect([reply.status, reply.body.code]).toEqual([409, 'rule.refused']);
    expect(personOf(farm, 'owner@example.com')).toMatchObject({ role: 'owner', disabledAt: null, version: 1 });
  });

  it('when there is another owner, one may go; a disabled owner does not count', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    const second = await change(owner, personOf(farm, 'grower@example.com'), { role: 'owner' });
    const gone = await change(owner, second.body, { disabled: true });
    expect(gone.status).toBe(200);

    expect((await change(owner, personOf(farm, 'owner@example.com'), { role: 'viewer' })).status).toBe(409);
  });

  it('when someone else changed the person meanwhile, refuses and shows them as they are', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    const grower = personOf(farm, 'grower@example.com');
    await change(owner, grower, { name: 'Renamed' });

    const reply = await change(owner, grower, { role: 'sales' });

    expect(reply.status).toBe(412);
    expect(reply.body.details.current).toMatchObject({ name: 'Renamed', role: 'grower', version: 2 });
  });

  it.each([
    ['an empty name', { name: ' ' }, 'name'],
    ['a name of 121 characters', { name: 'n'.repeat(121) }, 'name'],
    ['a role of no farm', { role: 'root' }, 'role'],
    ['a password', { passwordHash: 'x' }, 'passwordHash'],
    ['text where yes or no belongs', { disabled: 'yes' }, 'disabled'],
  ])('when sent %s, points at the field', async (_, body, path) => {
    const farm = await startFarm();

    const reply = await change(await farm.as('owner'), personOf(farm, 'grower@example.com'), body);

    expect(reply.status).toBe(400);
    expect(reply.body.fields).toMatchObject([{ path }]);
  });

  it('when the person does not exist, says so', async () => {
    const farm = await startFarm();

    const reply = await change(await farm.as('owner'), { id: '00000000-0000-4000-8000-00000000dead', version: 1 }, {});

    expect(reply.status).toBe(404);
  });
});
