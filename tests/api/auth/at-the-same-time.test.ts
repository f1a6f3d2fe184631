import { describe, expect, it } from 'vitest';
import { eq } from 'drizzle-orm';
import { sessions, users } from '../../../server/db/schema/index.ts';
import { hashPassword } from '../../../server/services/passwords.ts';
import { changePassword } from '../../../server/services/password-service.ts';
import { signIn } from '../../../server/services/auth-service.ts';
import { startFarm, TEST_PASSWORD } from '../../support/start-farm.ts';

const email = 'grower@example.com';
const address = '203.0.113.9';
const isGrower = eq(users.email, email);

describe('while a password is being checked', () => {
  it('when a mailed link sets another, the old one signs no one in', async () => {
    const farm = await startFarm();
    const passwordHash = await hashPassword('nine buckets before noon');

    const attempt = signIn(farm.deps, { email, password: TEST_PASSWORD, address });
    farm.db.update(users).set({ passwordHash }).where(isGrower).run();

    await expect(attempt).rejects.toMatchObject({ code: 'sign_in.refused' });
    expect(farm.db.select().from(sessions).all()).toEqual([]);
  });

  it('when the person is disabled, they are not signed in', async () => {
    const farm = await startFarm();

    const attempt = signIn(farm.deps, { email, password: TEST_PASSWORD, address });
    farm.db.update(users).set({ disabledAt: 1 }).where(isGrower).run();

    await expect(attempt).rejects.toMatchObject({ code: 'sign_in.refused' });
  });

  it('when a mailed link sets another, someone who knew the old one can not change it back', async () => {
    const farm = await startFarm();
    const user = farm.db.select().from(users).where(isGrower).get();
    if (!user) throw new Error('There is no grower.');
    const passwordHash = await hashPassword('nine buckets before noon');

    const caller = { userId: user.id, name: user.name, role: user.role, storeId: null, email };
    const change = changePassword(
      farm.deps,
      caller,
      { current: TEST_PASSWORD, password: 'seven ropes and a weir' },
      address,
    );
    farm.db.update(users).set({ passwordHash }).where(isGrower).run();

    await expect(change).rejects.toMatchObject({ fields: [{ path: 'current' }] });
    expect(farm.db.select().from(users).where(isGrower).get()?.passwordHash).toBe(passwordHash);
  });
});
