import { timingSafeEqual } from 'node:crypto';
import { eq } from 'drizzle-orm';
import type { RequestHandler } from 'express';
import { DomainError } from '../../shared/errors.ts';
import type { Deps } from '../deps.ts';
import { users } from '../db/schema/index.ts';
import { setCaller } from './caller.ts';

const SAFE_METHODS = ['GET', 'HEAD', 'OPTIONS'];

/** Loads the signed-in person, so that a disabled account or a changed role counts at once. */
export function loadCaller({ db }: Deps): RequestHandler {
  return (request, _response, next) => {
    const { userId } = request.session;
    const user = userId ? db.select().from(users).where(eq(users.id, userId)).get() : undefined;
    if (user && user.disabledAt === null) {
      setCaller(request, {
        userId: user.id,
        name: user.name,
        email: user.email,
        role: user.role,
        storeId: user.storeId,
      });
    }
    next();
  };
}

/**
 * Refuses writes that another site's page could have sent: the browser's Origin must be ours, and a signed-in session
 * must send back its token. Without a session there is nothing to ride on but the sign-in itself, which Origin covers.
 */
export function refuseForgedWrites(publicUrl: string): RequestHandler {
  // A proxy may pass on its own Host; the farm's known address is ours in any case.
  const publicHost = new URL(publicUrl).host;
  return (request, _response, next) => {
    if (SAFE_METHODS.includes(request.method)) {
      next();
      return;
    }
    const origin = request.get('Origin');
    if (origin && ![request.get('Host'), publicHost].includes(hostOf(origin) ?? '')) throw forged();
    const { userId, csrfToken } = request.session;
    if (userId && !sameText(csrfToken ?? '', request.get('X-CSRF-Token') ?? '')) throw forged();
    next();
  };
}

/** Sandboxed pages send the origin `null`, which is no one's. */
function hostOf(origin: string): string | null {
  return URL.canParse(origin) ? new URL(origin).host : null;
}

function forged(): DomainError {
  return new DomainError('session.csrf', 'This page is out of date. Reload it and try again.');
}

function sameText(a: string, b: string): boolean {
  return a.length > 0 && a.length === b.length && timingSafeEqual(Buffer.from(a), Buffer.from(b));
}
