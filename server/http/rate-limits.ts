import type { Request, RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { DomainError } from '../../shared/errors.ts';

const WINDOW = 15 * 60_000;
/** High enough for a whole farm behind one address, low enough to stop a program that tries thousands. */
const MAX_REQUESTS = 300;

/**
 * Caps what one network address may send to the routes that anyone can reach with a guess: sign-in, set-up, resets and
 * invitations. Reading who is signed in is not counted.
 */
export function limitGuessing(): RequestHandler {
  return rateLimit({
    windowMs: WINDOW,
    limit: MAX_REQUESTS,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    keyGenerator: networkOf,
    skip: (request) => request.method === 'GET' && request.baseUrl === '/api/session',
    handler: (_request, _response, next) => {
      const retryAfterSeconds = WINDOW / 1000;
      next(
        new DomainError('rate.limited', 'Too many requests from this network. Wait a quarter of an hour.', {
          details: { retryAfterSeconds },
        }),
      );
    },
  });
}

/** The network that a request comes from: one address, or for IPv6 the block that its owner can choose addresses from. */
export function networkOf(request: Request): string {
  return ipKeyGenerator(request.ip ?? '');
}
