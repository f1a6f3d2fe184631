import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { auditLog, mailedTokens, users } from '../../../server/db/schema/index.ts';
import { sendDueMails } from '../../../server/jobs/send-due-mails.ts';
import { mailedToken } from '../../support/mail-token.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const DAY = 86_400_000;
const PASSWORD = 'nine buckets before noon';

async function invited(farm: TestFarm, body: object = { email: 'rui@example.com', role: 'grower' }) {
  const owner = await farm.as('owner');
  const reply = await owner.post('/api/invitations').send(body);
  expect(reply.status).toBe(201);
  return { owner, invitation: reply.body };
}

describe('inviting people', () => {
  it('when invited, the person gets a mail, accepts it with a name and a password and is signed in', async () => {
    const farm = await startFarm();
    await invited(farm);
    const token = await mailedToken(farm, 'rui@example.com');
    const client = farm.anyone();

    const info = await client.get(`/api/invitations/${token}`);
    const reply = await client.post('/api/invitations/accept').send({ token, name: 'Rui Salgado', password: PASSWORD });

    expect(info.body).toEqual({ email: 'rui@example.com', role: 'grower', farmName: 'Test Farm', storeName: null });
    expect(reply.body.user).toMatchObject({ name: 'Rui Salgado', email: 'rui@example.com', role: 'grower' });
    expect((await client.get('/api/session')).body.user.name).toBe('Rui Salgado');
    expect(farm.db.select().from(users).where(eq(users.email, 'rui@example.com')).all()).toHaveLength(1);
    const actions = farm.db
      .select()
      .from(auditLog)
      .all()
      .map(({ action, actorName }) => [action, actorName]);
    expect(actions).toContainEqual(['invitation.created', 'Test owner']);
    expect(actions).toContainEqual(['user.created', 'Rui Salgado']);
  });

  it('when a buyer is invited, the mail and the account name the store', async () => {
    const farm = await startFarm();
    await invited(farm, { email: 'shop@example.com', role: 'buyer', storeId: farm.storeIds[1] });
    const token = await mailedToken(farm, 'shop@example.com');

    const reply = await farm
      .anyone()
      .post('/api/invitations/accept')
      .send({ token, name: 'Dana Wick', password: PASSWORD });

    expect(farm.mails[0]?.text).toContain('Store: Store 2');
    expect(reply.body.user).toMatchObject({ role: 'buyer', storeId: farm.storeIds[1], storeName: 'Store 2' });
  });

  it('when the farm has a name with markup, the mail shows it as text', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    await owner.patch('/api/farm').set('If-Match', '"1"').send({ name: '<b>"Reef" & Sons</b>' });
    await owner.post('/api/invitations').send({ email: 'rui@example.com', role: 'sales' });

    await sendDueMails(farm.deps);

    expect(farm.mails[0]?.html).toContain('&lt;b&gt;&quot;Reef&quot; &amp; Sons&lt;/b&gt;');
    expect(farm.mails[0]?.html).not.toContain('<b>');
    expect(farm.mails[0]?.text).toContain('Join <b>"Reef" & Sons</b>');
  });

  it.each([
    ['a buyer without a store', { email: 'x@example.com', role: 'buyer' }, 'storeId'],
    ['a role that does not exist', { email: 'x@example.com', role: 'king' }, 'role'],
    ['a broken e-mail', { email: 'x@', role: 'sales' }, 'email'],
    ['someone who has an account', { email: 'GROWER@example.com', role: 'sales' }, 'email'],
  ])('when asked to invite %s, points at the field and invites nobody', async (_, body, path) => {
    const farm = await startFarm();

    const reply = await (await farm.as('owner')).post('/api/invitations').send(body);

    expect([400, 409]).toContain(reply.status);
    expect(reply.body.fields).toMatchObject([{ path }]);
    expect(farm.db.select().from(mailedTokens).all()).toEqual([]);
  });

  it('when staff is invited with a store, or a buyer of a store that does not exist, points at the store', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    for (const body of [
      { email: 'x@example.com', role: 'sales', storeId: farm.storeIds[0] },
      { email: 'x@example.com', role: 'buyer', storeId: '00000000-0000-4000-8000-00000000dead' },
    ]) {
      const reply = await owner.post('/api/invitations').send(body);
      expect(reply.body.fields).toMatchObject([{ path: 'storeId' }]);
    }
  });

  it('when sent again, the new link works and the old one does not', async () => {
    const farm = await startFarm();
    const { owner, invitation } = await invited(farm);
    const old = await mailedToken(farm, 'rui@example.com');
    farm.wait(6 * DAY);
    const again = await farm.as('owner');

    const reply = await again.post(`/api/invitations/${invitation.id}/resend`);
    const fresh = await mailedToken(farm, 'rui@example.com');
    farm.wait(2 * DAY);

    expect(reply.body.expiresAt).toBe(invitation.expiresAt + 6 * DAY);
    expect((await owner.get(`/api/invitations/${old}`)).status).toBe(410);
    expect((await owner.get(`/api/invitations/${fresh}`)).status).toBe(200);
  });

  it('when taken back, its link is dead and it leaves the list', async () => {
    const farm = await startFarm();
    const { owner, invitation } = await invited(farm);
    const token = await mailedToken(farm, 'rui@example.com');

    expect((await owner.delete(`/api/invitations/${invitation.id}`)).body).toEqual({ ok: true });

    expect((await owner.get(`/api/invitations/${token}`)).status).toBe(410);
    expect((await owner.get('/api/invitations')).body).toMatchObject({ items: [], total: 0 });
    expect((await owner.delete(`/api/invitations/${invitation.id}`)).status).toBe(404);
  });

  it('when seven days old, it is shown as expired and its link refuses', async () => {
    const farm = await startFarm();
    await invited(farm);
    const token = await mailedToken(farm, 'rui@example.com');
    farm.wait(7 * DAY);
    const owner = await farm.as('owner');

    expect((await owner.get('/api/invitations')).body.items).toMatchObject([
      { email: 'rui@example.com', expired: true, createdBy: 'Test owner' },
    ]);
    const reply = await owner.post('/api/invitations/accept').send({ token, name: 'Rui', password: PASSWORD });
    expect(reply.body.code).toBe('token.invalid');
  });

  it('when accepted twice, the second time refuses', async () => {
    const farm = await startFarm();
    await invited(farm);
    const token = await mailedToken(farm, 'rui@example.com');

    const replies = await Promise.all(
      ['Rui', 'Not Rui'].map((name) =>
        farm.anyone().post('/api/invitations/accept').send({ token, name, password: PASSWORD }),
      ),
    );

    expect(replies.map(({ status }) => status).sort()).toEqual([200, 410]);
  });

  it('when the same address is invited anew, only the newest invitation stays open', async () => {
    const farm = await startFarm();
    const { owner } = await invited(farm);
    const old = await mailedToken(farm, 'rui@example.com');

    await owner.post('/api/invitations').send({ email: 'rui@example.com', role: 'sales' });

    expect((await owner.get('/api/invitations')).body.items).toMatchObject([{ role: 'sales' }]);
    expect((await owner.get(`/api/invitations/${old}`)).status).toBe(410);
  });

  it('when sent twice under one Idempotency-Key, invites and mails once', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    const send = () =>
      owner.post('/api/invitations').set('Idempotency-Key', 'k-1').send({ email: 'rui@example.com', role: 'grower' });

    const [first, second] = [await send(), await send()];
    await sendDueMails(farm.deps);

    expect(second.body).toEqual(first.body);
    expect(second.status).toBe(201);
    expect(farm.mails).toHaveLength(1);
  });
});
