import type { Express, Request, RequestHandler, Response } from 'express';
import type { BodyOf, Endpoint, ParamsOf, QueryOf, ResponseOf } from '../../shared/contracts/endpoint.ts';
import { DomainError } from '../../shared/errors.ts';
import { mayUse } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';
import { inWrite, SYSTEM, type Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import type { FileAnswer } from '../file-answer.ts';
import { callerOf, type Caller } from './caller.ts';
import { answerOnce, requestKey } from './idempotency.ts';
import { parseInput } from './parse-input.ts';
import { receiveUpload, type Upload } from './upload.ts';

/** What a handler gets: the parsed request and who asks. `caller` is null only on public endpoints. */
export interface Input<E extends Endpoint> {
  params: ParamsOf<E>;
  query: QueryOf<E>;
  body: BodyOf<E>;
  caller: E['access'] extends 'public' ? Caller | null : Caller;
  /** Version that the editor saw, on endpoints that edit. */
  ifMatch: E['edits'] extends true ? number : undefined;
  upload: E['upload'] extends object ? Upload : undefined;
}

type Answer<E extends Endpoint> = E['answer'] extends 'file' ? FileAnswer : ResponseOf<E>;

/**
 * Registers endpoints on the Express application. Access is checked before anything else is read; requests and answers
 * are parsed by the endpoint's contract. `read` only reads; `write` runs in one transaction with the audit log and the
 * idempotency record; `act` is for what must wait on something outside and opens its own writes.
 */
export class Api {
  readonly endpoints: Endpoint[] = [];
  private readonly app: Express;
  readonly deps: Deps;

  constructor(app: Express, deps: Deps) {
    this.app = app;
    this.deps = deps;
  }

  read<E extends Endpoint>(endpoint: E, handler: (db: Db, input: Input<E>) => Answer<E>): void {
    this.register(endpoint, (_request, input) => toBody(endpoint, handler(this.deps.db, input)));
  }

  write<E extends Endpoint>(endpoint: E, handler: (write: Write, input: Input<E>) => Answer<E>): void {
    this.register(endpoint, (request, input) =>
      inWrite(this.deps, input.caller ?? SYSTEM, (write) => {
        const key = requestKey(request);
        // Made within the transaction: an answer that breaks its contract leaves nothing written.
        const make = () => toBody(endpoint, handler(write, input));
        if (!endpoint.creates || key === null || !input.caller) return make();
        const identity = {
          key,
          callerId: input.caller.userId,
          route: `${endpoint.method} ${endpoint.path}`,
          content: [input.params, input.query, input.body],
          file: input.upload?.content ?? null,
        };
        return answerOnce(write, identity, 201, make);
      }),
    );
  }

  act<E extends Endpoint>(
    endpoint: E,
    handler: (input: Input<E> & { request: Request; response: Response }) => Promise<Answer<E>> | Answer<E>,
  ): void {
    this.register(endpoint, async (request, input, response) =>
      toBody(endpoint, await handler({ ...input, request, response })),
    );
  }

  private register<E extends Endpoint>(
    endpoint: E,
    run: (request: Request, input: Input<E>, response: Response) => unknown,
  ): void {
    if (!endpoint.access) throw new Error(`${endpoint.path} declares no access.`);
    this.endpoints.push(endpoint);

    const guard: RequestHandler = (request, _response, next) => {
      checkAccess(endpoint, callerOf(request));
      next();
    };
    const answer: RequestHandler = async (request, response) => {
      const input = parseInput(endpoint, request, callerOf(request));
      send(endpoint, response, await run(request, input, response));
    };
    const uploads = endpoint.upload ? [receiveUpload(endpoint.upload)] : [];
    this.app[endpoint.method](endpoint.path, guard, ...uploads, answer);
  }
}

function checkAccess(endpoint: Endpoint, caller: Caller | null): void {
  if (mayUse(caller?.role ?? null, endpoint.access)) return;
  if (!caller) throw new DomainError('session.required', 'Sign in to go on.');
  throw new DomainError('permission.denied', 'Your role does not allow this. Ask the owner of the farm.');
}

/** The answer as its contract says: fields that are not in it are left out, and wrong ones are our mistake. */
function toBody<E extends Endpoint>(endpoint: E, answer: Answer<E>): unknown {
  return endpoint.answer === 'file' ? answer : endpoint.response?.parse(answer);
}

function send(endpoint: Endpoint, response: Response, body: unknown): void {
  if (endpoint.answer === 'file') {
    const file = body as FileAnswer; // handlers of such endpoints return nothing else
    response.setHeader('Content-Type', file.contentType);
    response.setHeader('Content-Disposition', `${file.inline ? 'inline' : 'attachment'}; filename="${file.fileName}"`);
    response.setHeader('Cache-Control', 'no-store');
    response.send(file.content);
    return;
  }
  if (hasVersion(body)) response.setHeader('ETag', `"${body.version}"`);
  response.setHeader('Cache-Control', 'no-store');
  if (body === undefined) response.status(204).end();
  else response.status(endpoint.creates ? 201 : 200).json(body);
}

function hasVersion(body: unknown): body is { version: number } {
  return typeof body === 'object' && body !== null && 'version' in body && typeof body.version === 'number';
}
