import { describe, expect, it } from 'vitest';
import { createApp } from '../../server/app.ts';
import { type Endpoint, pathOf } from '../../shared/contracts/endpoint.ts';
import { type Access, mayUse, PERMISSIONS, type Role, ROLES } from '../../shared/permissions.ts';
import { startFarm, type TestClient } from '../support/start-farm.ts';

const farm = await startFarm();
const { endpoints } = createApp(farm.deps, 'a secret only for listing the endpoints').api;

const nowhere = '00000000-0000-4000-8000-00000000dead';

/** Calls the endpoint with nothing in it: access is checked before anything that was sent is read. */
async function callBare(client: TestClient, endpoint: Endpoint): Promise<{ status: number; code: string }> {
  const names = [...endpoint.path.matchAll(/:([a-zA-Z]+)/g)].map((match) => String(match[1]));
  const path = pathOf(endpoint, Object.fromEntries(names.map((name) => [name, nowhere])));
  const { status, body } = await client[endpoint.method](path);
  return { status, code: String(body?.code ?? '') };
}

function described({ method, path, access }: Endpoint): string {
  return `${method} ${path} (${access})`;
}

/** Signing out would end the very session that asks; its access is that of every `account.own` endpoint. */
const walked = endpoints.filter(({ method, path }) => !(method === 'delete' && /^\/api\/sessions?$/.test(path)));

describe('who may call what', () => {
  it('every endpoint names a permission of the table or says that it is public', () => {
    const wrong = endpoints.filter(({ access }) => access !== 'public' && !(access in PERMISSIONS));

    expect(wrong.map(described)).toEqual([]);
    expect(endpoints.length).toBeGreaterThan(20);
  });

  it('no two endpoints answer at one method and path', () => {
    const places = endpoints.map(({ method, path }) => `${method} ${path}`);

    expect(places).toEqual([...new Set(places)]);
  });

  it('only what must be open to everyone is public', () => {
    const open = endpoints.filter(({ access }) => access === 'public').map(({ method, path }) => `${method} ${path}`);

    expect(open.sort()).toEqual([
      'get /api/calendar/:token.ics',
      'get /api/health',
      'get /api/invitations/:token',
      'get /api/public/plugs/:code',
      'get /api/ready',
      'get /api/session',
      'post /api/invitations/accept',
      'post /api/password-resets',
      'post /api/password-resets/use',
      'post /api/session',
      'post /api/session/demo',
      'post /api/setup',
      'post /api/webhooks/payments',
    ]);
  });

  it('when nobody is signed in, everything but the public asks to sign in', async () => {
    const refused: string[] = [];
    for (const endpoint of endpoints.filter(({ access }) => access !== 'public')) {
      const { status, code } = await callBare(farm.anyone(), endpoint);
      if (status !== 401 || code !== 'session.required') refused.push(`${described(endpoint)}: ${status} ${code}`);
    }

    expect(refused).toEqual([]);
  });

  it.each(ROLES)('when a %s calls, exactly what the permission table allows is let through', async (role) => {
    const client = await farm.as(role);
    const wrong: string[] = [];
    for (const endpoint of walked) {
      const { status, code } = await callBare(client, endpoint);
      const denied = status === 403 && code === 'permission.denied';
      if (denied === mayUse(role, endpoint.access) || status === 401 || status >= 500) {
        wrong.push(`${described(endpoint)}: ${status} ${code}`);
      }
    }

    expect(wrong).toEqual([]);
  });

  it('when signing out, every role may', async () => {
    for (const role of ROLES) expect((await (await farm.as(role)).delete('/api/session')).status).toBe(200);
  });
});

describe('the permission table', () => {
  const grants = (role: Role) => (Object.keys(PERMISSIONS) as Access[]).filter((access) => mayUse(role, access));

  it('lets the owner do all but what belongs to a store', () => {
    expect(Object.keys(PERMISSIONS).filter((access) => !grants('owner').includes(access as Access))).toEqual([
      'shop.read',
      'shop.order',
    ]);
  });

  it('lets a buyer into the shop and the own account only', () => {
    expect(grants('buyer')).toEqual(['account.own', 'shop.read', 'shop.order']);
  });

  it('lets a viewer change nothing', () => {
    expect(grants('viewer').filter((access) => !/\.read$|^account\.own$/.test(access))).toEqual([]);
  });

  it('shows a grower no prices of sales', () => {
    expect(grants('grower').filter((access) => /^(orders|stores|listings|shop)\./.test(access))).toEqual([]);
  });
});
