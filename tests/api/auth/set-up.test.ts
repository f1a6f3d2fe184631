import { describe, expect, it } from 'vitest';
import { farms, users } from '../../../server/db/schema/index.ts';
import { startFarm } from '../../support/start-farm.ts';

const aFarm = {
  farmName: 'Quiet Cove Corals',
  timeZone: 'Atlantic/Azores',
  currency: 'EUR',
  ownerName: 'Ines Ribeira',
  email: 'ines@example.com',
  password: 'salt crust on the lid',
};

describe('setting up a farm', () => {
  it('when the farm is empty, makes the farm and its owner and signs them in', async () => {
    const farm = await startFarm({ empty: true });
    const client = farm.anyone();
    expect((await client.get('/api/session')).body).toMatchObject({ needsSetup: true, farm: null, user: null });

    const reply = await client.post('/api/setup').send(aFarm);

    expect(reply.status).toBe(200);
    expect(reply.body).toMatchObject({
      user: { name: 'Ines Ribeira', role: 'owner' },
      farm: { name: 'Quiet Cove Corals', timeZone: 'Atlantic/Azores', currency: 'EUR' },
      needsSetup: false,
    });
    expect(farm.db.select().from(farms).all()).toHaveLength(1);
    expect(farm.db.select().from(users).all()).toMatchObject([
      { email: 'ines@example.com', passwordHash: expect.stringMatching(/^\$argon2id\$v=19\$m=65536,/) },
    ]);
    expect((await client.get('/api/session')).body.user.name).toBe('Ines Ribeira');
  });

  it('when someone can sign in already, refuses and changes nothing', async () => {
    const farm = await startFarm();

    const reply = await farm.anyone().post('/api/setup').send(aFarm);

    expect(reply.status).toBe(409);
    expect(farm.db.select().from(farms).get()?.name).toBe('Test Farm');
  });

  it('when two set up at the same moment, one becomes owner and the other is refused', async () => {
    const farm = await startFarm({ empty: true });

    const replies = await Promise.all([
      farm.anyone().post('/api/setup').send(aFarm),
      farm
        .anyone()
        .post('/api/setup')
        .send({ ...aFarm, farmName: 'Second', email: 'second@example.com' }),
    ]);

    expect(replies.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(farm.db.select().from(users).all()).toHaveLength(1);
  });

  it.each([
    ['a zone that does not exist', { timeZone: 'Moon/Tranquility' }, 'timeZone'],
    ['a currency that does not exist', { currency: 'ZZZ' }, 'currency'],
    ['a farm without a name', { farmName: '   ' }, 'farmName'],
    ['a password with the name of the farm', { password: 'quietcovecorals in may' }, 'password'],
    ['a password that is too short', { password: 'ab3 xq9' }, 'password'],
  ])('when sent %s, points at the field and makes nothing', async (_, change, path) => {
    const farm = await startFarm({ empty: true });

    const reply = await farm
      .anyone()
      .post('/api/setup')
      .send({ ...aFarm, ...change });

    expect(reply.status).toBe(400);
    expect(reply.body.fields).toMatchObject([{ path }]);
    expect(farm.db.select().from(farms).all()).toEqual([]);
    expect(farm.db.select().from(users).all()).toEqual([]);
  });
});
