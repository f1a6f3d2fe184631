import { randomUUID } from 'node:crypto';
import type { Session } from '../../shared/contracts/session.ts';
import type { Role } from '../../shared/permissions.ts';

export type Call = (method: 'GET' | 'POST', path: string, body?: unknown) => Promise<unknown>;

/** Calls the API as a demo person of this role, over one kept connection. */
export async function signedIn(url: string, role: Role): Promise<Call> {
  const json = { 'Content-Type': 'application/json' };
  const { demoSignIns } = (await (await fetch(`${url}/api/session`)).json()) as Session;
  const email = demoSignIns.find((person) => person.role === role)?.email;
  const reply = await fetch(`${url}/api/session/demo`, {
    method: 'POST',
    headers: json,
    body: JSON.stringify({ email }),
  });
  const { csrfToken } = (await reply.json()) as Session;
  const cookie = reply.headers
    .getSetCookie()
    .map((each) => each.split(';')[0])
    .join('; ');

  return async (method, path, body) => {
    const answer = await fetch(url + path, {
      method,
      headers: { ...json, Cookie: cookie, 'X-CSRF-Token': csrfToken, 'Idempotency-Key': randomUUID() },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    const text = await answer.text();
    if (!answer.ok) throw new Error(`${method} ${path} answered ${answer.status}: ${text}`);
    return JSON.parse(text) as unknown;
  };
}
