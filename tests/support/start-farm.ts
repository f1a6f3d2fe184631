import { hash } from 'argon2';
import { createHash } from 'node:crypto';
import { pino } from 'pino';
import supertest from 'supertest';
import { createApp } from '../../server/app.ts';
import { readConfig } from '../../server/config.ts';
import { openDatabase } from '../../server/db/client.ts';
import { migrateDatabase } from '../../server/db/migrate.ts';
import { farms, stores, users } from '../../server/db/schema/index.ts';
import { inWrite, SYSTEM, type Write } from '../../server/db/write.ts';
import type { Deps } from '../../server/deps.ts';
import type { Mail } from '../../server/outside/mail-transport.ts';
import type { PaymentService } from '../../server/outside/payment-service.ts';
import type { Role } from '../../shared/permissions.ts';

export const TEST_PASSWORD = 'grey heron over the weir';
/** Cheap parameters, since every test signs people in. */
const passwordHash = await hash(TEST_PASSWORD, { memoryCost: 1024, timeCost: 2 });

export interface TestFarm {
  deps: Deps;
  db: Deps['db'];
  mails: Mail[];
  /** Moves the farm's clock on. */
  wait(ms: number): void;
  /** A client signed in as this role; buyers belong to the store given, or to the first. */
  as(role: Role, storeId?: string): Promise<TestClient>;
  /** A client that is not signed in. */
  anyone(): TestClient;
  write<T>(change: (write: Write) => T): T;
  storeIds: [string, string];
  app: Parameters<typeof supertest>[0];
}

type Method = 'get' | 'post' | 'patch' | 'put' | 'delete';
export type TestClient = Record<Method, (path: string) => supertest.Test> & { csrfToken: string };

/** A farm on an in-memory database with every migration run, a fixed clock and predictable ids. */
export async function startFarm(
  options: { now?: string; payments?: Partial<PaymentService>; empty?: boolean } = {},
): Promise<TestFarm> {
  let now = Date.parse(options.now ?? '2026-03-02T09:00:00Z');
  let ids = 0;
  const mails: Mail[] = [];
  const { db, sqlite } = openDatabase(':memory:');
  await migrateDatabase(sqlite, ':memory:', now);
  const refuse = () => Promise.reject(new Error('No payment service in this test.'));
  const deps: Deps = {
    db,
    sqlite,
    config: readConfig({ NODE_ENV: 'test', LOG_LEVEL: 'silent', PUBLIC_URL: 'http://farm.example.com' }),
    clock: { now: () => now },
    newId: () => uuidFrom(++ids),
    randomInt: (max) =>
      Number.parseInt(createHash('sha256').update(`random ${++ids}`).digest('hex').slice(0, 12), 16) % max,
    payments: {
      createCheckout: refuse,
      expireCheckout: refuse,
      refund: refuse,
      readEvent: () => {
        throw new Error('No payment service in this test.');
      },
      ...options.payments,
    },
    mail: {
      send: (mail) => {
        mails.push(mail);
        return Promise.resolve();
      },
    },
    log: pino({ level: 'silent' }),
  };
  const storeIds: [string, string] = [deps.newId(), deps.newId()];
  if (!options.empty) furnish(deps, storeIds);
  const { app } = createApp(deps, 'a secret that only this test knows, long enough');

  return {
    deps,
    db,
    mails,
    app,
    storeIds,
    wait: (ms) => {
      now += ms;
    },
    write: (change) => inWrite(deps, SYSTEM, change),
    anyone: () => clientOf(supertest.agent(app), ''),
    as: async (role, storeId = storeIds[0]) => {
      const email = role === 'buyer' ? `buyer-${storeIds.indexOf(storeId)}@example.com` : `${role}@example.com`;
      const agent = supertest.agent(app);
      const reply = await agent.post('/api/session').send({ email, password: TEST_PASSWORD });
      if (reply.status !== 200) throw new Error(`Sign-in as ${role} failed: ${JSON.stringify(reply.body)}`);
      return clientOf(agent, String(reply.body.csrfToken));
    },
  };
}

function clientOf(agent: ReturnType<typeof supertest.agent>, csrfToken: string): TestClient {
  const call = (method: Method) => (path: string) => {
    const request = agent[method](path);
    return csrfToken ? request.set('X-CSRF-Token', csrfToken) : request;
  };
  return {
    get: call('get'),
    post: call('post'),
    patch: call('patch'),
    put: call('put'),
    delete: call('delete'),
    csrfToken,
  };
}

/** The farm itself, one person of each role and two stores with a buyer each. */
function furnish(deps: Deps, storeIds: readonly string[]): void {
  const createdAt = deps.clock.now();
  deps.db
    .insert(farms)
    .values({ id: 1, name: 'Test Farm', timeZone: 'Europe/Lisbon', currency: 'EUR', createdAt })
    .run();
  storeIds.forEach((id, index) => {
    deps.db
      .insert(stores)
      .values({
        id,
        code: `S${index + 1}`,
        name: `Store ${index + 1}`,
        email: `store-${index + 1}@example.com`,
        createdAt,
      })
      .run();
    person(`Buyer ${index + 1}`, `buyer-${index}@example.com`, 'buyer', id);
  });
  for (const role of ['owner', 'grower', 'sales', 'viewer'] as const)
    person(`Test ${role}`, `${role}@example.com`, role, null);

  function person(name: string, email: string, role: Role, storeId: string | null): void {
    deps.db.insert(users).values({ id: deps.newId(), email, name, role, storeId, passwordHash, createdAt }).run();
  }
}

function uuidFrom(count: number): string {
  return `00000000-0000-4000-8000-${count.toString(16).padStart(12, '0')}`;
}
