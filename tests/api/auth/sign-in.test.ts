import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { auditLog, sessions, users } from '../../../server/db/schema/index.ts';
import { startFarm, TEST_PASSWORD } from '../../support/start-farm.ts';

describe('signing in', () => {
  it('when e-mail and password go together, answers with the person, the farm and a token', async () => {
    const farm = await startFarm();

    const reply = await farm
      .anyone()
      .post('/api/session')
      .send({ email: 'Grower@Example.com', password: TEST_PASSWORD });

    expect(reply.status).toBe(200);
    expect(reply.body).toMatchObject({
      user: { name: 'Test grower', email: 'grower@example.com', role: 'grower', storeId: null },
      farm: { name: 'Test Farm', timeZone: 'Europe/Lisbon', currency: 'EUR' },
      needsSetup: false,
      demoSignIns: [],
    });
    expect(reply.body.csrfToken).toMatch(/^[\w-]{43}$/);
    expect(farm.db.select().from(sessions).all()).toHaveLength(1);
    expect(farm.db.select().from(auditLog).all()).toMatchObject([
      { action: 'user.signed_in', actorName: 'Test grower' },
    ]);
  });

  it('when signed in, the cookie is hidden from scripts and from other sites', async () => {
    const farm = await startFarm();

    const reply = await farm
      .anyone()
      .post('/api/session')
      .send({ email: 'owner@example.com', password: TEST_PASSWORD });

    expect(reply.get('Set-Cookie')).toEqual([expect.stringMatching(/^limestead\.sid=.+HttpOnly; SameSite=Lax$/)]);
  });

  it('when a buyer signs in, the store is named', async () => {
    const farm = await startFarm();

    const reply = await (await farm.as('buyer', farm.storeIds[1])).get('/api/session');

    expect(reply.body.user).toMatchObject({ role: 'buyer', storeId: farm.storeIds[1], storeName: 'Store 2' });
  });

  it('when nobody is signed in, says so and gives no token', async () => {
    const farm = await startFarm();

    const reply = await farm.anyone().get('/api/session');

    expect(reply.body).toMatchObject({ user: null, csrfToken: '', needsSetup: false, farm: { name: 'Test Farm' } });
    expect(reply.get('Set-Cookie')).toBeUndefined();
  });

  it('when account is unknown, password wrong or person disabled, the answers are the same', async () => {
    const farm = await startFarm();
    farm.db.update(users).set({ disabledAt: 1 }).where(eq(users.email, 'sales@example.com')).run();

    const replies = [];
    for (const [email, password] of [
      ['nobody@example.com', TEST_PASSWORD],
      ['owner@example.com', 'not the password'],
      ['sales@example.com', TEST_PASSWORD],
    ]) {
      const { status, body } = await farm.anyone().post('/api/session').send({ email, password });
      replies.push({ status, code: body.code, detail: body.detail, fields: body.fields, details: body.details });
    }

    expect(replies[0]).toMatchObject({ status: 401, code: 'sign_in.refused' });
    expect(replies[1]).toEqual(replies[0]);
    expect(replies[2]).toEqual(replies[0]);
    expect(farm.db.select().from(sessions).all()).toEqual([]);
  });

  it('when a signed-in person signs in again, the session gets a new id and the old one ends', async () => {
    const farm = await startFarm();
    const client = await farm.as('grower');
    const before = farm.db.select().from(sessions).all();

    const reply = await client.post('/api/session').send({ email: 'owner@example.com', password: TEST_PASSWORD });

    const after = farm.db.select().from(sessions).all();
    expect(reply.body.user.role).toBe('owner');
    expect(after).toHaveLength(1);
    expect(after[0]?.sid).not.toBe(before[0]?.sid);
    expect(reply.body.csrfToken).not.toBe(client.csrfToken);
  });

  it.each([
    ['no e-mail', { password: 'x' }, 'email'],
    ['not an e-mail', { email: 'owner', password: 'x' }, 'email'],
    ['an empty password', { email: 'owner@example.com', password: '' }, 'password'],
    ['a password of a million characters', { email: 'owner@example.com', password: 'x'.repeat(900_000) }, 'password'],
    ['a number as password', { email: 'owner@example.com', password: 5 }, 'password'],
    ['more than is asked', { email: 'owner@example.com', password: 'x', role: 'owner' }, 'role'],
  ])('when sent %s, points at the field', async (_, body, path) => {
    const farm = await startFarm();

    const reply = await farm.anyone().post('/api/session').send(body);

    expect(reply.status).toBe(400);
    expect(reply.body.fields).toEqual([{ path, message: expect.any(String) }]);
  });
});

describe('signing out', () => {
  it('when signed out, the session is gone and its cookie opens nothing', async () => {
    const farm = await startFarm();
    const client = await farm.as('grower');

    const reply = await client.delete('/api/session');

    expect(reply.body).toEqual({ ok: true });
    expect(farm.db.select().from(sessions).all()).toEqual([]);
    expect((await client.get('/api/session')).body.user).toBeNull();
  });

  it('when signed out everywhere, every device of this person is signed out and no other', async () => {
    const farm = await startFarm();
    const phone = await farm.as('grower');
    const desk = await farm.as('grower');
    const owner = await farm.as('owner');

    await phone.delete('/api/sessions');

    expect((await phone.get('/api/session')).body.user).toBeNull();
    expect((await desk.get('/api/session')).body.user).toBeNull();
    expect((await owner.get('/api/session')).body.user.role).toBe('owner');
  });
});
