import type { Request } from 'express';
import type { Role } from '../../shared/permissions.ts';
import type { Actor } from '../db/write.ts';

/** The signed-in person of a request, loaded fresh from the database for each one. */
export interface Caller extends Actor {
  userId: string;
  role: Role;
  email: string;
}

const callers = new WeakMap<Request, Caller>();

export function setCaller(request: Request, caller: Caller): void {
  callers.set(request, caller);
}

export function callerOf(request: Request): Caller | null {
  return callers.get(request) ?? null;
}
