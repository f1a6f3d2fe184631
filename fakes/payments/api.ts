import { Router, urlencoded, type Request, type RequestHandler } from 'express';
import type { z } from 'zod';
import { answerErrors, answerUnknownUrl, ApiError, noSuch } from './api-error.ts';
import type { Payments } from './context.ts';
import { expanded, lineItems } from './expand.ts';
import { answerOnce } from './idempotency.ts';
import { newId } from './ids.ts';
import type { Cause } from './objects.ts';
import { CreateRefund, CreateSession, ListSessions, OnlyExpand, readParams } from './params.ts';
import { createRefund } from './refunds.ts';
import { createSession, expireSession, findSession, listSessions } from './sessions.ts';

interface Call<Params> {
  /** The id in the path, where there is one. */
  id: string;
  params: Params;
  cause: Cause;
}

/** The JSON API under `/v1`, for the SDK. */
export function apiRoutes(payments: Payments, apiKey: string): Router {
  const { store } = payments;
  const api = Router();
  api.use(giveRequestId, requireKey(apiKey), urlencoded({ extended: true, limit: '1mb', parameterLimit: 5000 }));

  const sessions = api.route('/checkout/sessions');
  sessions.post(answer(payments, CreateSession, ({ params }) => createSession(payments, params)));
  sessions.get(answer(payments, ListSessions, ({ params }) => listSessions(payments, params)));
  api.get(
    '/checkout/sessions/:id',
    answer(payments, OnlyExpand, ({ id }) => findSession(payments, id).session),
  );
  api.get(
    '/checkout/sessions/:id/line_items',
    answer(payments, OnlyExpand, ({ id }) => lineItems(store, findSession(payments, id).session.id)),
  );
  api.post(
    '/checkout/sessions/:id/expire',
    answer(payments, OnlyExpand, ({ id, cause }) => expireSession(payments, id, cause)),
  );
  api.get('/payment_intents/:id', answer(payments, OnlyExpand, found('payment_intent', store.intents)));
  api.get('/charges/:id', answer(payments, OnlyExpand, found('charge', store.charges)));
  api.post(
    '/refunds',
    answer(payments, CreateRefund, ({ params, cause }) => createRefund(payments, params, cause)),
  );
  api.get('/refunds/:id', answer(payments, OnlyExpand, found('refund', store.refunds)));
  api.get(
    '/events/:id',
    answer(payments, OnlyExpand, ({ id }) => found('event', store.events)({ id }).event),
  );

  api.use(answerUnknownUrl, answerErrors);
  return api;
}

function found<Item>(kind: string, items: ReadonlyMap<string, Item>): (call: { id: string }) => Item {
  return ({ id }) => {
    const item = items.get(id);
    if (item === undefined) throw noSuch(kind, id, 'id');
    return item;
  };
}

function answer<Schema extends z.ZodType<{ expand: string[] }>>(
  payments: Payments,
  schema: Schema,
  act: (call: Call<z.output<Schema>>) => object,
): RequestHandler {
  return (req, res) => {
    const params = readParams(schema, req.method === 'GET' ? req.query : req.body);
    const key = req.get('Idempotency-Key') ?? null;
    const cause = { id: res.get('Request-Id') ?? '', idempotency_key: key };
    const run = () => expanded(payments.store, act({ id: String(req.params['id']), params, cause }), params.expand);

    if (req.method === 'GET') {
      res.json(run());
      return;
    }
    const { status, body, replayed } = answerOnce(payments.store, key, fingerprint(req), run);
    payments.store.save();
    if (replayed) res.set('Idempotent-Replayed', 'true');
    res.status(status).json(body);
  };
}

function fingerprint(req: Request): string {
  return `${req.method} ${req.originalUrl} ${JSON.stringify(req.body ?? {})}`;
}

const giveRequestId: RequestHandler = (req, res, next) => {
  res.set('Request-Id', newId('req', 14));
  const key = req.get('Idempotency-Key');
  if (key !== undefined) res.set('Idempotency-Key', key);
  next();
};

function requireKey(apiKey: string): RequestHandler {
  return (req, _res, next) => {
    const given = /^Bearer (.+)$/.exec(req.get('Authorization') ?? '')?.[1];
    if (given === apiKey) return next();
    const message =
      given === undefined
        ? 'You did not provide an API key. Provide it in the Authorization header, using Bearer auth.'
        : `Invalid API Key provided: ${given.slice(0, 8)}***`;
    throw new ApiError(401, 'invalid_request_error', message);
  };
}
