import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import express from 'express';
import supertest from 'supertest';
import { describe, expect, it } from 'vitest';
import { serveClient } from '../../../server/http/client-pages.ts';
import { errorHandler } from '../../../server/http/error-handler.ts';
import { nonce, securityHeaders } from '../../../server/http/security-headers.ts';
import { startFarm } from '../../support/start-farm.ts';

function directives(policy: string): Record<string, string> {
  return Object.fromEntries(
    policy.split(';').map((part) => {
      const [name, ...values] = part.trim().split(' ');
      return [name, values.join(' ')];
    }),
  );
}

describe('security headers', () => {
  it('when anything is asked, the answer forbids inline and foreign code', async () => {
    const farm = await startFarm();

    const reply = await farm.anyone().get('/api/health');

    const policy = directives(reply.get('Content-Security-Policy') ?? '');
    expect(policy['default-src']).toBe("'self'");
    expect(policy['script-src']).toMatch(/^'self' 'nonce-[\w+/]{22}==' 'wasm-unsafe-eval'$/);
    expect(policy['style-src']).toMatch(/^'self' 'nonce-[\w+/]{22}=='$/);
    expect(policy['object-src']).toBe("'none'");
    expect(policy['frame-ancestors']).toBe("'none'");
    expect(policy['base-uri']).toBe("'none'");
    expect(reply.get('X-Content-Type-Options')).toBe('nosniff');
    expect(reply.get('Referrer-Policy')).toBe('same-origin');
    expect(reply.get('X-Powered-By')).toBeUndefined();
  });

  it('when two answers are made, each has a nonce of its own', async () => {
    const farm = await startFarm();
    const ask = async () =>
      /'nonce-([^']+)'/.exec((await farm.anyone().get('/api/health')).get('Content-Security-Policy') ?? '')?.[1];

    const [first, second] = [await ask(), await ask()];

    expect(first).toBeTruthy();
    expect(first).not.toBe(second);
  });

  it('when the API answers, nothing of it is kept by caches', async () => {
    const farm = await startFarm();

    const reply = await (await farm.as('owner')).get('/api/people');

    expect(reply.get('Cache-Control')).toBe('no-store');
  });

  it('when a page of the client is asked for, it carries the nonce of its own answer', async () => {
    const dist = mkdtempSync(path.join(tmpdir(), 'client-'));
    writeFileSync(
      path.join(dist, 'index.html'),
      '<meta content="__CSP_NONCE__"><script nonce="__CSP_NONCE__"></script>',
    );
    mkdirSync(path.join(dist, 'assets'));
    const app = express();
    app.use(nonce, securityHeaders(false));
    serveClient(app, dist);
    app.use(errorHandler);

    const reply = await supertest(app).get('/water/systems');

    const own = /'nonce-([^']+)'/.exec(reply.get('Content-Security-Policy') ?? '')?.[1];
    expect(reply.text).toBe(`<meta content="${own}"><script nonce="${own}"></script>`);
    expect(reply.get('Cache-Control')).toBe('no-store');
    // A page from before an update asks for files that are gone.
    const missing = await supertest(app).get('/assets/missing.js');
    expect([missing.status, missing.body.code]).toEqual([404, 'route.not_found']);
    rmSync(dist, { recursive: true });
  });
});
