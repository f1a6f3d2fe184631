import { Writable } from 'node:stream';
import { pino } from 'pino';
import supertest from 'supertest';
import { describe, expect, it } from 'vitest';
import { createApp } from '../../../server/app.ts';
import { mailedToken } from '../../support/mail-token.ts';
import { startFarm, TEST_PASSWORD } from '../../support/start-farm.ts';

/** A farm that logs everything into `lines`. */
async function startLoggedFarm() {
  const farm = await startFarm();
  const lines: string[] = [];
  const stream = new Writable({
    write: (chunk: Buffer, _encoding, done) => {
      lines.push(chunk.toString());
      done();
    },
  });
  const { app } = createApp({ ...farm.deps, log: pino({ level: 'debug' }, stream) }, 'the secret of logged sessions');
  return { farm, app, text: () => lines.join('') };
}

describe('the request log', () => {
  it('when people sign in and work, holds neither passwords nor cookies nor tokens', async () => {
    const { farm, app, text } = await startLoggedFarm();
    const agent = supertest.agent(app);

    const reply = await agent.post('/api/session').send({ email: 'owner@example.com', password: TEST_PASSWORD });
    const { csrfToken } = reply.body;
    await agent
      .post('/api/invitations')
      .set('X-CSRF-Token', csrfToken)
      .send({ email: 'rui@example.com', role: 'grower' });
    const token = await mailedToken(farm, 'rui@example.com');
    await agent.get(`/api/invitations/${token}`).set('Referer', `http://farm.example.com/invitation/${token}`);
    await agent.get(`/invitation/${token}`);
    await agent.get(`/reset-password/${token}`);
    await agent.post('/api/invitations/accept').set('X-CSRF-Token', csrfToken).send({ token, name: '', password: '' });

    const cookie = /limestead\.sid=([^;]+)/.exec(reply.get('Set-Cookie')?.[0] ?? '')?.[1] ?? 'no cookie';
    expect(text()).toContain('/api/invitations/[token]');
    for (const secret of [TEST_PASSWORD, csrfToken, token, cookie]) expect(text()).not.toContain(secret);
  });

  it('when a request fails, its number in the answer finds it in the log', async () => {
    const { farm, app, text } = await startLoggedFarm();
    farm.deps.sqlite.close();

    const reply = await supertest(app).get('/api/session');

    expect(reply.status).toBe(500);
    expect(text()).toContain(reply.body.requestId);
    expect(text()).toContain('request failed');
  });
});
