import { and, eq, lt } from 'drizzle-orm';
import session, { type SessionData } from 'express-session';
import type { Request, RequestHandler } from 'express';
import type { Deps } from '../deps.ts';
import { sessions } from '../db/schema/index.ts';

declare module 'express-session' {
  interface SessionData {
    userId: string;
    csrfToken: string;
    signedInAt: number;
  }
}

const HOUR = 3_600_000;
/** A session ends after this long without a request, and in any case this long after sign-in. */
export const IDLE_TIMEOUT = 12 * HOUR;
export const ABSOLUTE_TIMEOUT = 7 * 24 * HOUR;

/** Keeps express-session's sessions in the database. */
class DatabaseStore extends session.Store {
  private readonly deps: Deps;

  constructor(deps: Deps) {
    super();
    this.deps = deps;
  }

  override get(sid: string, callback: (error: unknown, data?: SessionData | null) => void): void {
    answer(callback, () => {
      const row = this.deps.db.select().from(sessions).where(eq(sessions.sid, sid)).get();
      const now = this.deps.clock.now();
      const alive = row && row.expiresAt > now && row.createdAt + ABSOLUTE_TIMEOUT > now;
      return alive ? (row.data as unknown as SessionData) : null;
    });
  }

  override set(sid: string, data: SessionData, callback: (error?: unknown) => void = () => undefined): void {
    answer(callback, () => {
      const now = this.deps.clock.now();
      const fields = { userId: data.userId ?? null, data: { ...data }, expiresAt: now + IDLE_TIMEOUT };
      this.deps.db
        .insert(sessions)
        .values({ sid, createdAt: now, ...fields })
        .onConflictDoUpdate({ target: sessions.sid, set: fields })
        .run();
    });
  }

  override touch(sid: string, _data: SessionData, callback: (error?: unknown) => void = () => undefined): void {
    answer(callback, () => {
      const now = this.deps.clock.now();
      this.deps.db
        .update(sessions)
        .set({ expiresAt: now + IDLE_TIMEOUT })
        // Written at most once a minute, so that reading pages does not write to the disk each time.
        .where(and(eq(sessions.sid, sid), lt(sessions.expiresAt, now + IDLE_TIMEOUT - 60_000)))
        .run();
    });
  }

  override destroy(sid: string, callback: (error?: unknown) => void = () => undefined): void {
    answer(callback, () => {
      this.deps.db.delete(sessions).where(eq(sessions.sid, sid)).run();
    });
  }
}

/** An error goes to the callback: thrown, it would leave a request that is being answered hanging. */
function answer<T>(callback: (error: unknown, value?: T) => void, work: () => T): void {
  let value: T;
  try {
    value = work();
  } catch (error) {
    callback(error);
    return;
  }
  callback(null, value);
}

export function sessionMiddleware(deps: Deps, secret: string): RequestHandler {
  return session({
    name: 'limestead.sid',
    secret,
    store: new DatabaseStore(deps),
    resave: false,
    saveUninitialized: false,
    rolling: false,
    cookie: { httpOnly: true, sameSite: 'lax', secure: 'auto', maxAge: ABSOLUTE_TIMEOUT },
  });
}

/** Gives the session a new id and the person, as sign-in must. */
export function startSession(request: Request, userId: string, csrfToken: string, now: number): Promise<void> {
  return new Promise((resolve, reject) => {
    request.session.regenerate((error: unknown) => {
      if (error) {
        reject(error);
        return;
      }
      Object.assign(request.session, { userId, csrfToken, signedInAt: now });
      request.session.save((saveError: unknown) => (saveError ? reject(saveError) : resolve()));
    });
  });
}

export function endSession(request: Request): Promise<void> {
  return new Promise((resolve, reject) => {
    request.session.destroy((error: unknown) => (error ? reject(error) : resolve()));
  });
}

export function deleteExpiredSessions(deps: Deps): void {
  deps.db.delete(sessions).where(lt(sessions.expiresAt, deps.clock.now())).run();
}
