import { randomBytes } from 'node:crypto';
import type { RequestHandler, Response } from 'express';
import helmet from 'helmet';

/** A fresh nonce per response, for the theme's style sheet and the page's own script tag. */
export const nonce: RequestHandler = (_request, response, next) => {
  response.locals.nonce = randomBytes(16).toString('base64');
  next();
};

export function nonceOf(response: Response): string {
  return String(response.locals.nonce);
}

/** A strict policy: nothing from elsewhere, nothing inline but by nonce; WASM for the barcode reader. */
export function securityHeaders(https: boolean): RequestHandler {
  const withNonce = (_request: unknown, response: unknown) => `'nonce-${nonceOf(response as Response)}'`;
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'", withNonce, "'wasm-unsafe-eval'"],
        styleSrc: ["'self'", withNonce],
        imgSrc: ["'self'", 'data:', 'blob:'],
        mediaSrc: ["'self'", 'blob:'],
        fontSrc: ["'self'"],
        connectSrc: ["'self'"],
        workerSrc: ["'self'"],
        manifestSrc: ["'self'"],
        objectSrc: ["'none'"],
        baseUri: ["'none'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
        ...(https ? { upgradeInsecureRequests: [] } : {}),
      },
    },
    strictTransportSecurity: https,
    crossOriginEmbedderPolicy: false,
    referrerPolicy: { policy: 'same-origin' },
  });
}
