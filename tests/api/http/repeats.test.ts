import { describe, expect, it } from 'vitest';
import { idempotencyKeys, mailedTokens } from '../../../server/db/schema/index.ts';
import { startFarm, type TestClient } from '../../support/start-farm.ts';
import { givenSystem } from '../../support/given-water.ts';

function invite(client: TestClient, email: string, key: string) {
  return client.post('/api/invitations').set('Idempotency-Key', key).send({ email, role: 'grower' });
}

describe('creating under an Idempotency-Key', () => {
  it('when repeated, gives the first answer and makes nothing more', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    const first = await invite(owner, 'rui@example.com', 'key-1');
    farm.wait(60_000);

    const second = await invite(owner, 'rui@example.com', 'key-1');

    expect([second.status, second.body]).toEqual([first.status, first.body]);
    expect(farm.db.select().from(mailedTokens).all()).toHaveLength(1);
  });

  it('when sent many times at once, makes one', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    const replies = await Promise.all(Array.from({ length: 5 }, () => invite(owner, 'rui@example.com', 'key-1')));

    expect(new Set(replies.map(({ body }) => body.id)).size).toBe(1);
    expect(farm.db.select().from(mailedTokens).all()).toHaveLength(1);
  });

  it('when repeated with another body, refuses', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    await invite(owner, 'rui@example.com', 'key-1');

    const reply = await invite(owner, 'other@example.com', 'key-1');

    expect([reply.status, reply.body.code]).toEqual([422, 'idempotency.mismatch']);
    expect(farm.db.select().from(mailedTokens).all()).toHaveLength(1);
  });

  it('when the first try was refused, the key is free for the next one', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    const refused = await invite(owner, 'grower@example.com', 'key-1');
    expect(refused.status).toBe(409);
    expect(farm.db.select().from(idempotencyKeys).all()).toEqual([]);

    expect((await invite(owner, 'rui@example.com', 'key-1')).status).toBe(201);
  });

  it('when another person uses the same key, it is theirs', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    await invite(owner, 'rui@example.com', 'key-1');
    const { body: people } = await owner.get('/api/people?search=grower');
    const grower = people.items[0];
    await owner.patch(`/api/people/${grower.id}`).set('If-Match', `"${grower.version}"`).send({ role: 'owner' });

    const reply = await invite(await farm.as('grower'), 'dana@example.com', 'key-1');

    expect(reply.body.email).toBe('dana@example.com');
  });
});

describe('what counts as a key and as the same request', () => {
  it.each(['x'.repeat(201), 'two words', 'schlüssel'])('when the key is "%s", asks for a plain one', async (key) => {
    const farm = await startFarm();
    const owner = await farm.as('owner');

    const reply = await invite(owner, 'rui@example.com', key);

    expect([reply.status, reply.body.code]).toEqual([400, 'input.invalid']);
    expect(farm.db.select().from(mailedTokens).all()).toEqual([]);
  });

  it('when another file comes under the key of the first, refuses it instead of giving the first one’s answer', async () => {
    const farm = await startFarm();
    givenSystem(farm, { code: 'B' });
    const grower = await farm.as('grower');
    const request = (path: string, value: number) =>
      grower.post(path).attach('file', Buffer.from(`Date;Time;Tank;Ca mg/L\n2026-03-01;08:00;B;${value}\n`), {
        filename: 'log.csv',
        contentType: 'text/csv',
      });
    const mapping = JSON.stringify((await request('/api/reading-imports/preview', 430)).body.mapping);
    const send = (value: number) =>
      request('/api/reading-imports', value).set('Idempotency-Key', 'key-1').field('mapping', mapping);

    const first = await send(430);
    const [again, other] = [await send(430), await send(440)];

    expect([first.status, again.status, again.body.id]).toEqual([201, 201, first.body.id]);
    expect([other.status, other.body.code]).toEqual([422, 'idempotency.mismatch']);
  });
});

describe('editing under If-Match', () => {
  it.each([undefined, '', '*', '1', '"one"', '"-1"', '"1", "2"'])(
    'when it is %s, asks for a version',
    async (match) => {
      const farm = await startFarm();
      const owner = await farm.as('owner');

      const request = owner.patch('/api/farm');
      const reply = await (match === undefined ? request : request.set('If-Match', match)).send({ name: 'Other' });

      expect([reply.status, reply.body.code]).toEqual([428, 'edit.version_required']);
      expect((await owner.get('/api/farm')).body.name).toBe('Test Farm');
    },
  );

  it('when read, the answer names its version', async () => {
    const farm = await startFarm();

    expect((await (await farm.as('owner')).get('/api/farm')).get('ETag')).toBe('"1"');
  });
});
