import { describe, expect, it } from 'vitest';
import { users } from '../../../server/db/schema/index.ts';
import { startFarm, TEST_PASSWORD } from '../../support/start-farm.ts';

const anInvitation = { email: 'rui@example.com', role: 'grower' };

describe('writes that another page could have forged', () => {
  it.each(['', 'wrong', 'x'.repeat(43)])('when the token is "%s", refuses', async (token) => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    const reply = await owner.post('/api/invitations').set('X-CSRF-Token', token).send(anInvitation);

    expect([reply.status, reply.body.code]).toEqual([403, 'session.csrf']);
    expect((await owner.get('/api/invitations')).body.total).toBe(0);
  });

  it('when the address is written in capitals, refuses without the token all the same', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    const reply = await owner.post('/API/Invitations').set('X-CSRF-Token', '').send(anInvitation);

    expect(reply.body.code).toBe('session.csrf');
  });

  it('when the token is one of another session, refuses', async () => {
    const farm = await startFarm();
    const [owner, other] = [await farm.as('owner'), await farm.as('owner')];

    const reply = await owner.post('/api/invitations').set('X-CSRF-Token', other.csrfToken).send(anInvitation);

    expect(reply.body.code).toBe('session.csrf');
  });

  it.each(['https://elsewhere.example.org', 'null', 'not an origin', 'http://127.0.0.1.elsewhere.example.org'])(
    'when a browser says that the page is of %s, refuses even with the token',
    async (origin) => {
      const farm = await startFarm();
      const owner = await farm.as('owner');

      const reply = await owner.post('/api/invitations').set('Origin', origin).send(anInvitation);

      expect([reply.status, reply.body.code]).toEqual([403, 'session.csrf']);
    },
  );

  it('when the page is our own, takes it', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    const reply = await owner
      .post('/api/invitations')
      .set('Host', 'farm.example.com')
      .set('Origin', 'https://farm.example.com')
      .send(anInvitation);

    expect(reply.status).toBe(201);
  });

  it("when a proxy passes on its own Host, a page of the farm's known address is ours all the same", async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    const reply = await owner
      .post('/api/invitations')
      .set('Host', '127.0.0.1:3000')
      .set('Origin', 'http://farm.example.com')
      .send(anInvitation);

    expect(reply.status).toBe(201);
  });

  it('when another site signs someone in, refuses', async () => {
    const farm = await startFarm();

    const reply = await farm
      .anyone()
      .post('/api/session')
      .set('Origin', 'https://elsewhere.example.org')
      .send({ email: 'owner@example.com', password: TEST_PASSWORD });

    expect(reply.body.code).toBe('session.csrf');
  });

  it('when only read, no token is needed', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    expect((await owner.get('/api/people').set('X-CSRF-Token', '')).status).toBe(200);
    expect(farm.db.select().from(users).all()).toHaveLength(6);
  });
});
