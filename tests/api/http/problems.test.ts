import express from 'express';
import { pinoHttp } from 'pino-http';
import supertest from 'supertest';
import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { auditLog } from '../../../server/db/schema/index.ts';
import { Api } from '../../../server/http/api.ts';
import { errorHandler } from '../../../server/http/error-handler.ts';
import { problem } from '../../../shared/contracts/common.ts';
import type { Endpoint } from '../../../shared/contracts/endpoint.ts';
import { healthEndpoints } from '../../../shared/contracts/health.ts';
import { ERROR_STATUS } from '../../../shared/errors.ts';
import { startFarm } from '../../support/start-farm.ts';

describe('error answers', () => {
  it('when something is refused, the answer is problem details with a stable code', async () => {
    const farm = await startFarm();

    const reply = await farm.anyone().get('/api/people');

    expect(reply.status).toBe(401);
    expect(reply.get('Content-Type')).toMatch(/^application\/problem\+json/);
    expect(problem.parse(reply.body)).toMatchObject({
      type: '/problems/session.required',
      title: 'session required',
      status: 401,
      code: 'session.required',
      detail: 'Sign in to go on.',
      fields: [],
      requestId: expect.any(String),
    });
  });

  it('when many fields are wrong, all are named at once', async () => {
    const farm = await startFarm();

    const reply = await farm.anyone().post('/api/setup').send({ farmName: '', email: 'x', surprise: 1 });

    const paths = reply.body.fields.map(({ path }: { path: string }) => path);
    expect(paths.sort()).toEqual(['currency', 'email', 'farmName', 'ownerName', 'password', 'surprise', 'timeZone']);
  });

  it('when the route does not exist, says what was asked for', async () => {
    const farm = await startFarm();

    const reply = await farm.anyone().get('/api/unicorns');

    expect([reply.status, reply.body.code]).toEqual([404, 'route.not_found']);
    expect(reply.body.detail).toContain('GET');
  });

  it('when a body is too large, refuses it unread', async () => {
    const farm = await startFarm();

    const reply = await farm
      .anyone()
      .post('/api/session')
      .send({ email: 'x@example.com', password: 'x'.repeat(1_100_000) });

    expect([reply.status, reply.body.code]).toEqual([413, 'upload.too_large']);
  });

  it.each([
    ['broken JSON', '{"email": "x@example.com", "pass'],
    ['a bare word', 'hello'],
  ])('when sent %s, says that it can not be read and quotes none of it', async (_, body) => {
    const farm = await startFarm();

    const reply = await farm.anyone().post('/api/session').set('Content-Type', 'application/json').send(body);

    expect([reply.status, reply.body.code]).toEqual([400, 'input.invalid']);
    expect(reply.body.detail).not.toContain(body.slice(0, 5));
  });

  it.each([['[]'], ['null'], ['"text"'], ['7'], ['{"__proto__":{"email":"a@example.com"}}']])(
    'when sent %s as body, it is wrong input and not a failure',
    async (body) => {
      const farm = await startFarm();

      const reply = await farm.anyone().post('/api/session').set('Content-Type', 'application/json').send(body);

      expect(reply.status).toBe(400);
    },
  );

  it('when the server itself fails, the answer tells nothing of why, and the log does', async () => {
    const farm = await startFarm();
    farm.deps.sqlite.close();

    const reply = await farm.anyone().get('/api/session');

    expect([reply.status, reply.body.code]).toEqual([500, 'server.failed']);
    expect(JSON.stringify(reply.body)).not.toMatch(/sqlite|database|connection/i);
  });

  it('when the database is gone, the server is up but not ready, and requests of a session end', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    expect((await farm.anyone().get(healthEndpoints.ready.path)).status).toBe(200);
    farm.deps.sqlite.close();

    expect((await farm.anyone().get(healthEndpoints.health.path)).status).toBe(200);
    const ready = await farm.anyone().get(healthEndpoints.ready.path);
    expect([ready.status, ready.body.code]).toEqual([503, 'service.unavailable']);
    expect((await owner.get('/api/people')).status).toBe(500);
  });

  it('when the disk fails while the session is noted at the end of an answer, the request ends all the same', async () => {
    const farm = await startFarm();
    const owner = await farm.as('owner');
    farm.wait(120_000);
    farm.deps.sqlite.exec(
      `CREATE TEMP TRIGGER no_touch BEFORE UPDATE ON session BEGIN SELECT RAISE(FAIL, 'disk I/O error'); END`,
    );

    const reply = await owner.get('/api/farm');

    expect([reply.status, reply.body.name]).toEqual([200, 'Test Farm']);
  });

  it('when an answer breaks its own contract, what led to it is not kept', async () => {
    const farm = await startFarm();
    const app = express();
    app.use(pinoHttp({ logger: farm.deps.log }));
    const endpoint = {
      ...{ method: 'post', path: '/api/broken', access: 'public', summary: 'Answers nonsense' },
      response: z.object({ id: z.uuid() }),
    } as const satisfies Endpoint;
    new Api(app, farm.deps).write(endpoint, (write) => {
      write.audit({ action: 'thing.made', entity: 'thing', entityId: '1' });
      return { id: 'no id' };
    });
    app.use(errorHandler);

    const reply = await supertest(app).post('/api/broken').send();

    expect([reply.status, reply.body.code]).toEqual([500, 'server.failed']);
    expect(farm.db.select().from(auditLog).all()).toEqual([]);
  });

  it('every code has the status of an error', () => {
    for (const status of Object.values(ERROR_STATUS)) expect(status).toBeGreaterThanOrEqual(400);
  });
});
