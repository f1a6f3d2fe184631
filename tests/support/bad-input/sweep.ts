import { createServer, request as httpRequest } from 'node:http';
import type { AddressInfo } from 'node:net';
import { createApp } from '../../../server/app.ts';
import { problem, type Problem } from '../../../shared/contracts/common.ts';
import type { Endpoint } from '../../../shared/contracts/endpoint.ts';
import { mayUse, ROLES, type Role } from '../../../shared/permissions.ts';
import { TEST_PASSWORD, type TestFarm } from '../start-farm.ts';

export interface Sent {
  path: string;
  body?: string | Buffer | undefined;
  headers?: Record<string, string>;
}
export interface Reply {
  status: number;
  type: string;
  text: string;
  /** Tables that hold another number of rows than before, by name. */
  changed: string[];
}

/** Tables that a refusal may write to: tries to sign in are counted so that guessing gets slower. */
const COUNTED_REFUSALS = ['sign_in_failure'];
/** Words that only a programmer understands, or that tell how the server is made. */
const UNCLEAR = /sqlite|constraint|undefined|\[object|zod|invalid input|expected|\bnull\b|at \S+ \(|regex|pattern/i;

/** The server on a farm, listening. Each request is undone after it is answered, so all start from the same farm. */
export class Site {
  private readonly cookies = new Map<Role, { cookie: string; token: string }>();
  private readonly farm: TestFarm;
  private readonly tables: string[];
  private readonly rowCounts: () => Record<string, number>;
  private readonly server = createServer();

  constructor(farm: TestFarm) {
    this.farm = farm;
    const { sqlite } = farm.deps;
    this.tables = sqlite.prepare(`SELECT name FROM sqlite_master WHERE type = 'table'`).pluck().all() as string[];
    const counts = this.tables.map((table) => `(SELECT count(*) FROM "${table}") AS "${table}"`);
    const statement = sqlite.prepare(`SELECT ${counts.join(', ')}`);
    this.rowCounts = () => statement.get() as Record<string, number>;
  }

  async open(): Promise<readonly Endpoint[]> {
    await new Promise<void>((resolve) => this.server.listen(0, '127.0.0.1', resolve));
    return this.renew();
  }

  /** Starts the application anew: what it counts in memory, like requests of one address, begins at zero. */
  renew(): readonly Endpoint[] {
    const { app, api } = createApp(this.farm.deps, 'a secret that only this test knows, long enough');
    this.server.removeAllListeners('request').on('request', app);
    return api.endpoints;
  }

  async close(): Promise<void> {
    this.server.closeAllConnections();
    await new Promise((resolve) => this.server.close(resolve));
  }

  /** Sends a request as someone who may, and takes back what it did. */
  async send({ method, access }: Endpoint, { path, body, headers = {} }: Sent): Promise<Reply> {
    const role = access === 'public' ? null : (ROLES.find((each) => mayUse(each, access)) ?? null);
    const session = role && (await this.sessionOf(role));
    const { sqlite } = this.farm.deps;
    sqlite.exec('BEGIN');
    try {
      const before = this.rowCounts();
      const reply = await this.call(method, path, body, {
        ...(session ? { Cookie: session.cookie, 'X-CSRF-Token': session.token } : {}),
        ...headers,
      });
      const after = this.rowCounts();
      return { ...reply, changed: this.tables.filter((table) => before[table] !== after[table]) };
    } finally {
      sqlite.exec('ROLLBACK');
    }
  }

  private async sessionOf(role: Role) {
    const known = this.cookies.get(role);
    if (known) return known;
    const email = role === 'buyer' ? 'buyer-0@example.com' : `${role}@example.com`;
    const body = JSON.stringify({ email, password: TEST_PASSWORD });
    const { cookie, text } = await this.call('post', '/api/session', body, { 'Content-Type': 'application/json' });
    const session = { cookie, token: String((JSON.parse(text) as { csrfToken: string }).csrfToken) };
    this.cookies.set(role, session);
    return session;
  }

  /** Node's own client, since `fetch` would tidy the path before it is sent. */
  private call(method: string, path: string, body: Sent['body'], headers: Record<string, string>) {
    const { port } = this.server.address() as AddressInfo;
    return new Promise<Omit<Reply, 'changed'> & { cookie: string }>((resolve, reject) => {
      const length = body === undefined ? {} : { 'Content-Length': String(Buffer.byteLength(body)) };
      const options = {
        host: '127.0.0.1',
        port,
        path,
        method: method.toUpperCase(),
        headers: { ...length, ...headers },
      };
      const request = httpRequest(options, (response) => {
        const chunks: Buffer[] = [];
        response.on('data', (chunk: Buffer) => chunks.push(chunk));
        response.on('end', () => {
          const cookie = (response.headers['set-cookie'] ?? []).map((each) => String(each.split(';')[0])).join('; ');
          const type = response.headers['content-type'] ?? '';
          resolve({ status: response.statusCode ?? 0, type, text: Buffer.concat(chunks).toString('utf8'), cookie });
        });
      });
      request.on('error', reject);
      request.end(body);
    });
  }
}

/** What is wrong with how the server took this; null where it was accepted, or refused as it should be. */
export function faultOf({ status, type, text, changed }: Reply): string | null {
  if (status >= 500) return `answers ${status}: ${text.slice(0, 200)}`;
  if (status < 400) return null;
  const parsed = problemOf(text);
  if (!parsed || !type.startsWith('application/problem+json')) return `answers ${status} without problem details`;
  if (parsed.status !== status) return `says status ${parsed.status} in the body and ${status} beside it`;
  const messages = [parsed.detail, ...parsed.fields.map(({ message }) => message)];
  const unclear = messages.find((message) => message.length < 8 || UNCLEAR.test(message));
  if (unclear !== undefined) return `says "${unclear}"`;
  const written = changed.filter((table) => !COUNTED_REFUSALS.includes(table));
  return written.length > 0 ? `refuses, but writes to ${written.join(', ')}` : null;
}

export function problemOf(text: string): Problem | null {
  try {
    return problem.parse(JSON.parse(text));
  } catch {
    return null;
  }
}
