import { describe, expect, it } from 'vitest';
import { eq } from 'drizzle-orm';
import { sessions, users } from '../../../server/db/schema/index.ts';
import { deleteExpiredSessions } from '../../../server/http/session.ts';
import { startFarm } from '../../support/start-farm.ts';

const HOUR = 3_600_000;

describe('how a session ends', () => {
  it('when nothing is asked for twelve hours, the session is over', async () => {
    const farm = await startFarm();
    const client = await farm.as('grower');
    farm.wait(12 * HOUR - 1);
    expect((await client.get('/api/session')).body.user).not.toBeNull();

    farm.wait(12 * HOUR);

    expect((await client.get('/api/session')).body.user).toBeNull();
  });

  it('when used all the time, the session is over after seven days all the same', async () => {
    const farm = await startFarm();
    const client = await farm.as('grower');
    for (let hours = 0; hours + 8 < 7 * 24; hours += 8) {
      farm.wait(8 * HOUR);
      expect((await client.get('/api/session')).body.user).not.toBeNull();
    }

    farm.wait(8 * HOUR);

    expect((await client.get('/api/session')).body.user).toBeNull();
  });

  it('when expired sessions are cleared, living ones stay', async () => {
    const farm = await startFarm();
    await farm.as('grower');
    farm.wait(13 * HOUR);
    const owner = await farm.as('owner');

    deleteExpiredSessions(farm.deps);

    expect(farm.db.select().from(sessions).all()).toHaveLength(1);
    expect((await owner.get('/api/session')).body.user.role).toBe('owner');
  });

  it('when a person is disabled or gets another role, it counts from the next request on', async () => {
    const farm = await startFarm();
    const client = await farm.as('owner');
    expect((await client.get('/api/people')).status).toBe(200);

    farm.db.update(users).set({ role: 'grower' }).where(eq(users.email, 'owner@example.com')).run();
    expect((await client.get('/api/people')).status).toBe(403);

    farm.db.update(users).set({ disabledAt: 1 }).where(eq(users.email, 'owner@example.com')).run();
    expect((await client.get('/api/people')).status).toBe(401);
  });
});
