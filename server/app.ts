import express, { type Express } from 'express';
import { useFieldMessages } from '../shared/contracts/field-messages.ts';
import { Api } from './http/api.ts';
import { serveClient } from './http/client-pages.ts';
import { errorHandler, unknownRoute } from './http/error-handler.ts';
import { loadCaller, refuseForgedWrites } from './http/guards.ts';
import { openApiDocument } from './http/openapi.ts';
import { limitGuessing } from './http/rate-limits.ts';
import { requestLog } from './http/request-log.ts';
import { nonce, securityHeaders } from './http/security-headers.ts';
import { sessionMiddleware } from './http/session.ts';
import { registerRoutes } from './routes/index.ts';
import { healthRoutes } from './routes/health-routes.ts';
import type { Deps } from './deps.ts';

/** Builds the whole application on what it is given; it does not listen. */
export function createApp(deps: Deps, sessionSecret: string): { app: Express; api: Api } {
  useFieldMessages();
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', deps.config.trustProxy);
  app.set('etag', false);

  app.use(requestLog(deps));
  app.use(nonce, securityHeaders(deps.config.publicUrl.startsWith('https:')));

  // Webhooks are signed over their raw bytes and have no session.
  app.use('/api/webhooks', express.raw({ type: '*/*', limit: '1mb' }));
  app.use(express.json({ limit: '1mb' }));
  app.use(['/api/session', '/api/setup', '/api/password-resets', '/api/invitations', '/api/account'], limitGuessing());
  app.use(['/api/public', '/api/calendar'], limitGuessing());
  app.use('/api', sessionMiddleware(deps, sessionSecret), loadCaller(deps));
  // Routes match in any case, so this must too; a match that ends in a slash would be no prefix for Express.
  app.use(/^\/api(?!\/webhooks\/)/i, refuseForgedWrites(deps.config.publicUrl));

  const api = new Api(app, deps);
  healthRoutes(api);
  registerRoutes(api);
  let openApi: Record<string, unknown> | undefined;
  app.get('/api/openapi.json', (_request, response) => {
    openApi ??= openApiDocument(api.endpoints);
    response.json(openApi);
  });
  app.use('/api', unknownRoute);
  serveClient(app);
  app.use(errorHandler);
  return { app, api };
}
