import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { mailedTokens, outboxMails, sessions, users } from '../../../server/db/schema/index.ts';
import { sendDueMails } from '../../../server/jobs/send-due-mails.ts';
import { mailedToken } from '../../support/mail-token.ts';
import { startFarm, TEST_PASSWORD } from '../../support/start-farm.ts';

const NEW_PASSWORD = 'nine buckets before noon';
const MINUTE = 60_000;

describe('asking for a new password', () => {
  it('when the account exists or not, answers the same and mails only to the one that does', async () => {
    const farm = await startFarm();

    const known = await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
    const unknown = await farm.anyone().post('/api/password-resets').send({ email: 'nobody@example.com' });
    await sendDueMails(farm.deps);

    expect([known.status, known.body]).toEqual([unknown.status, unknown.body]);
    expect(farm.mails.map(({ to, subject }) => [to, subject])).toEqual([
      ['grower@example.com', 'Set a new password for Test Farm'],
    ]);
  });

  it('when the mail is out, neither the table of links nor the outbox holds the secret', async () => {
    const farm = await startFarm();

    await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
    const token = await mailedToken(farm, 'grower@example.com');

    const kept = JSON.stringify([farm.db.select().from(mailedTokens).all(), farm.db.select().from(outboxMails).all()]);
    expect(kept).not.toContain(token);
  });

  it('when asked many times, sends no more than three links an hour', async () => {
    const farm = await startFarm();

    for (let times = 0; times < 5; times += 1) {
      await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
    }
    await sendDueMails(farm.deps);

    expect(farm.mails).toHaveLength(3);
  });

  it('when the person is disabled, sends nothing', async () => {
    const farm = await startFarm();
    farm.db.update(users).set({ disabledAt: 1 }).where(eq(users.email, 'grower@example.com')).run();

    const reply = await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
    await sendDueMails(farm.deps);

    expect(reply.status).toBe(200);
    expect(farm.mails).toEqual([]);
  });
});

describe('setting a new password by link', () => {
  it('when the link is fresh, the new password works, the old one does not and all devices are signed out', async () => {
    const farm = await startFarm();
    const phone = await farm.as('grower');
    await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
    const token = await mailedToken(farm, 'grower@example.com');

    const reply = await farm.anyone().post('/api/password-resets/use').send({ token, password: NEW_PASSWORD });

    expect(reply.body).toEqual({ ok: true });
    expect(farm.db.select().from(sessions).all()).toEqual([]);
    expect((await phone.get('/api/session')).body.user).toBeNull();
    const signIn = (password: string) =>
      farm.anyone().post('/api/session').send({ email: 'grower@example.com', password });
    expect((await signIn(NEW_PASSWORD)).status).toBe(200);
    expect((await signIn(TEST_PASSWORD)).status).toBe(401);
  });

  it('when the link was used, it and every other open link of the person are dead', async () => {
    const farm = await startFarm();
    await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
    const first = await mailedToken(farm, 'grower@example.com');
    await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
    const second = await mailedToken(farm, 'grower@example.com');
    await farm.anyone().post('/api/password-resets/use').send({ token: second, password: NEW_PASSWORD });

    for (const token of [first, second]) {
      const again = await farm
        .anyone()
        .post('/api/password-resets/use')
        .send({ token, password: 'another one of mine' });
      expect([again.status, again.body.code]).toEqual([410, 'token.invalid']);
    }
  });

  it('when one link is used twice at the same moment, it works once', async () => {
    const farm = await startFarm();
    await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
    const token = await mailedToken(farm, 'grower@example.com');

    const replies = await Promise.all(
      [NEW_PASSWORD, 'a second try of it'].map((password) =>
        farm.anyone().post('/api/password-resets/use').send({ token, password }),
      ),
    );

    expect(replies.map(({ status }) => status).sort()).toEqual([200, 410]);
  });

  it('when the link is an hour old, refuses', async () => {
    const farm = await startFarm();
    await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
    const token = await mailedToken(farm, 'grower@example.com');
    farm.wait(60 * MINUTE);

    const reply = await farm.anyone().post('/api/password-resets/use').send({ token, password: NEW_PASSWORD });

    expect(reply.status).toBe(410);
  });

  it('when the new password is weak, says so at the field and keeps the link', async () => {
    const farm = await startFarm();
    await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
    const token = await mailedToken(farm, 'grower@example.com');

    const weak = await farm.anyone().post('/api/password-resets/use').send({ token, password: 'Passw0rd2026!' });
    const strong = await farm.anyone().post('/api/password-resets/use').send({ token, password: NEW_PASSWORD });

    expect(weak.body.fields).toMatchObject([{ path: 'password' }]);
    expect(strong.status).toBe(200);
  });

  it('when an invitation link is used for it, refuses', async () => {
    const farm = await startFarm();
    await (await farm.as('owner')).post('/api/invitations').send({ email: 'new@example.com', role: 'grower' });
    const token = await mailedToken(farm, 'new@example.com');

    const reply = await farm.anyone().post('/api/password-resets/use').send({ token, password: NEW_PASSWORD });

    expect(reply.status).toBe(410);
  });
});

describe('changing the password', () => {
  it('when the current one is right, other devices are signed out and this one stays', async () => {
    const farm = await startFarm();
    const phone = await farm.as('grower');
    const desk = await farm.as('grower');

    const reply = await desk.post('/api/account/password').send({ current: TEST_PASSWORD, password: NEW_PASSWORD });

    expect(reply.body).toEqual({ ok: true });
    expect((await phone.get('/api/session')).body.user).toBeNull();
    expect((await desk.get('/api/session')).body).toMatchObject({
      user: { role: 'grower' },
      csrfToken: desk.csrfToken,
    });
    expect((await desk.delete('/api/session')).status).toBe(200);
  });

  it.each([
    ['the current one is wrong', { current: 'something else', password: NEW_PASSWORD }, 'current'],
    ['the new one holds the own name', { current: TEST_PASSWORD, password: 'test grower one two' }, 'password'],
    ['the new one holds the own e-mail', { current: TEST_PASSWORD, password: 'my grower@example.com' }, 'password'],
  ])('when %s, points at the field and changes nothing', async (_, body, path) => {
    const farm = await startFarm();
    const client = await farm.as('grower');

    const reply = await client.post('/api/account/password').send(body);

    expect(reply.status).toBe(400);
    expect(reply.body.fields).toMatchObject([{ path }]);
    expect((await client.get('/api/session')).body.user.role).toBe('grower');
  });
});
