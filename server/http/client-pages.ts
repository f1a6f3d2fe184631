import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import express, { type Express } from 'express';
import { nonceOf } from './security-headers.ts';

const builtClient = fileURLToPath(new URL('../../dist', import.meta.url));

/** Serves the built client: hashed files forever, and its one page, with the response's nonce, for every other path. */
export function serveClient(app: Express, distFolder: string = builtClient): void {
  const indexFile = path.join(distFolder, 'index.html');
  if (!existsSync(indexFile)) return;
  const page = readFileSync(indexFile, 'utf8');

  app.use(
    '/assets',
    express.static(path.join(distFolder, 'assets'), { immutable: true, maxAge: '365d', fallthrough: false }),
  );
  app.use(express.static(distFolder, { index: false, maxAge: '1h' }));
  app.get('/{*path}', (_request, response) => {
    response.setHeader('Cache-Control', 'no-store');
    response.type('html').send(page.replaceAll('__CSP_NONCE__', nonceOf(response)));
  });
}
