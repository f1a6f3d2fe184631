import { describe, expect, it } from 'vitest';
import supertest from 'supertest';
import { createApp } from '../../../server/app.ts';
import { signInFailures } from '../../../server/db/schema/index.ts';
import { startFarm, TEST_PASSWORD, type TestFarm } from '../../support/start-farm.ts';

const SECOND = 1000;
const MINUTE = 60 * SECOND;

function tryToSignIn(farm: TestFarm, email: string, password = 'not the password') {
  return farm.anyone().post('/api/session').send({ email, password });
}

async function failTimes(farm: TestFarm, times: number, email: string): Promise<void> {
  for (let time = 0; time < times; time += 1) expect((await tryToSignIn(farm, email)).status).toBe(401);
}

describe('slowing down who guesses', () => {
  it.each(['owner@example.com', 'nobody@example.com'])(
    'when %s failed five times, even the right password must wait, longer after each failure',
    async (email) => {
      const farm = await startFarm();
      await failTimes(farm, 5, email);

      const blocked = await tryToSignIn(farm, email, TEST_PASSWORD);
      expect(blocked.status).toBe(429);
      expect(blocked.body).toMatchObject({ code: 'rate.limited', details: { retryAfterSeconds: 5 } });
      expect(blocked.get('Retry-After')).toBe('5');

      farm.wait(5 * SECOND);
      await failTimes(farm, 1, email);
      expect((await tryToSignIn(farm, email)).body.details).toEqual({ retryAfterSeconds: 10 });
      farm.wait(10 * SECOND);
      await failTimes(farm, 1, email);
      expect((await tryToSignIn(farm, email)).body.details).toEqual({ retryAfterSeconds: 20 });
    },
  );

  it('when the wait is over, the right password works and the count starts anew', async () => {
    const farm = await startFarm();
    await failTimes(farm, 5, 'owner@example.com');
    farm.wait(5 * SECOND);

    expect((await tryToSignIn(farm, 'owner@example.com', TEST_PASSWORD)).status).toBe(200);

    await failTimes(farm, 5, 'owner@example.com');
  });

  it('when the failures are a quarter of an hour old, they no longer count', async () => {
    const farm = await startFarm();
    await failTimes(farm, 5, 'owner@example.com');
    farm.wait(15 * MINUTE);

    await failTimes(farm, 5, 'owner@example.com');
  });

  it('when one account is slowed down, others from the same address are not', async () => {
    const farm = await startFarm();
    await failTimes(farm, 5, 'owner@example.com');

    expect((await tryToSignIn(farm, 'grower@example.com', TEST_PASSWORD)).status).toBe(200);
  });

  it('when one address tries many accounts, it must wait whatever account comes next', async () => {
    const farm = await startFarm();
    for (const name of ['owner', 'sales', 'viewer', 'buyer-0', 'buyer-1'])
      await failTimes(farm, 4, `${name}@example.com`);

    expect((await tryToSignIn(farm, 'grower@example.com', TEST_PASSWORD)).status).toBe(429);
  });

  it.each([
    [
      'no proxy stands in front, what a client says of its address does not count',
      0,
      ['203.0.113.1', '203.0.113.2'],
      1,
    ],
    ['a proxy stands in front, the address that it saw counts', 1, ['203.0.113.1', '203.0.113.2'], 2],
    [
      'a client invents an address before the proxy’s, it does not count',
      1,
      ['1.1.1.1, 203.0.113.1', '2.2.2.2, 203.0.113.1'],
      1,
    ],
    ['one IPv6 customer uses many addresses, they count as one', 1, ['2001:db8:1:2::3', '2001:db8:1:2:ffff::9'], 1],
  ])('when %s', async (_, trustProxy, forwarded, networks) => {
    const farm = await startFarm();
    const config = { ...farm.deps.config, trustProxy };
    const { app } = createApp({ ...farm.deps, config }, 'a secret that only this test knows, long enough');
    for (const each of forwarded) {
      await supertest(app)
        .post('/api/session')
        .set('X-Forwarded-For', each)
        .send({ email: 'owner@example.com', password: 'not the password' });
    }

    const subjects = farm.db
      .select()
      .from(signInFailures)
      .all()
      .map(({ subject }) => subject);
    expect(new Set(subjects.filter((subject) => subject.startsWith('address:'))).size).toBe(networks);
  });

  it('when many guesses come at once, no more than five are looked at', async () => {
    const farm = await startFarm();

    const replies = await Promise.all(Array.from({ length: 12 }, () => tryToSignIn(farm, 'owner@example.com')));

    expect(replies.filter(({ status }) => status === 401)).toHaveLength(5);
    expect(replies.filter(({ status }) => status === 429)).toHaveLength(7);
  });

  it('when the current password is guessed by who is signed in, it is slowed down too', async () => {
    const farm = await startFarm();
    const client = await farm.as('grower');
    const guess = () =>
      client.post('/api/account/password').send({ current: 'wrong guess', password: 'nine buckets before noon' });
    for (let time = 0; time < 5; time += 1) expect((await guess()).status).toBe(400);

    expect((await guess()).status).toBe(429);
  });

  it('when one address sends hundreds of requests to guessable routes, it is cut off', async () => {
    const farm = await startFarm();
    const ask = () => farm.anyone().get('/api/invitations/a-link-that-nobody-was-sent');
    for (let round = 0; round < 10; round += 1) {
      const replies = await Promise.all(Array.from({ length: 30 }, ask));
      expect(new Set(replies.map(({ status }) => status))).toEqual(new Set([410]));
    }

    const reply = await ask();

    expect(reply.status).toBe(429);
    expect(reply.body.code).toBe('rate.limited');
    expect((await farm.anyone().get('/api/session')).status).toBe(200);
  });
});
