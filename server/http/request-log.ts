import type { RequestHandler } from 'express';
import { pinoHttp } from 'pino-http';
import type { Deps } from '../deps.ts';

const SECRET_HEADERS = [
  'req.headers.cookie',
  'req.headers.authorization',
  'req.headers["x-csrf-token"]',
  'req.headers.referer',
  'res.headers["set-cookie"]',
];
/** Addresses whose last part lets someone in. */
const TOKEN_IN_PATH = /(\/(?:invitations?|reset-password|calendar)\/)(?!accept\b)[\w-]{20,}/g;

/** One log line a request, without anything that would let its reader in. */
export function requestLog({ log, newId }: Deps): RequestHandler {
  return pinoHttp({
    logger: log,
    genReqId: () => newId(),
    redact: SECRET_HEADERS,
    serializers: {
      req: (request: { url: string; params?: unknown }) => {
        const { params: _params, ...rest } = request;
        return { ...rest, url: withoutTokens(rest.url) };
      },
    },
    autoLogging: { ignore: (request) => request.url?.startsWith('/assets/') ?? false },
  });
}

function withoutTokens(url: string): string {
  return url.replace(TOKEN_IN_PATH, '$1[token]');
}
