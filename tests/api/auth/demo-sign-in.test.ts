import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { users } from '../../../server/db/schema/index.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

async function startDemo(demo: boolean): Promise<TestFarm> {
  const farm = await startFarm();
  farm.deps.config.demo = demo;
  farm.db.update(users).set({ demo: true }).where(eq(users.role, 'grower')).run();
  return farm;
}

describe('signing in as a demo person', () => {
  it('when the farm is a demo, its people are offered with what they do, and sign in without a password', async () => {
    const farm = await startDemo(true);
    const client = farm.anyone();

    const offered = await client.get('/api/session');
    const reply = await client.post('/api/session/demo').send({ email: 'grower@example.com' });

    expect(offered.body.demoSignIns).toEqual([
      { name: 'Test grower', email: 'grower@example.com', role: 'grower', does: expect.any(String) },
    ]);
    expect(reply.body.user).toMatchObject({ role: 'grower' });
  });

  it('when the person is not of the demo, refuses', async () => {
    const farm = await startDemo(true);

    const reply = await farm.anyone().post('/api/session/demo').send({ email: 'owner@example.com' });

    expect(reply.status).toBe(404);
  });

  it('when the farm is a real one, offers nobody and refuses', async () => {
    const farm = await startDemo(false);

    expect((await farm.anyone().get('/api/session')).body.demoSignIns).toEqual([]);
    expect((await farm.anyone().post('/api/session/demo').send({ email: 'grower@example.com' })).status).toBe(404);
  });
});
