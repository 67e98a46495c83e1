import { randomBytes } from 'node:crypto';
import type { Request, RequestHandler, Response } from 'express';
import helmet from 'helmet';

const nonces = new WeakMap<Response, string>();

/** The nonce of this response, for the style elements the page makes itself. */
export function nonceOf(response: Response): string {
  let nonce = nonces.get(response);
  if (nonce === undefined) {
    nonce = randomBytes(18).toString('base64');
    nonces.set(response, nonce);
  }
  return nonce;
}

/** Security headers for every response. Over plain HTTP nothing may demand TLS, or a loopback service is unusable. */
export function securityHeaders(tls: boolean): RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        'default-src': [`'self'`],
        'script-src': [`'self'`],
        'style-src': [`'self'`, (_request, response) => `'nonce-${nonceOf(response as Response)}'`],
        'img-src': [`'self'`, 'data:', 'blob:'],
        'font-src': [`'self'`],
        'connect-src': [`'self'`],
        'object-src': [`'none'`],
        'base-uri': [`'none'`],
        'form-action': [`'self'`],
        'frame-ancestors': [`'none'`],
        ...(tls ? { 'upgrade-insecure-requests': [] } : {}),
      },
    },
    strictTransportSecurity: tls ? { maxAge: 31_536_000 } : false,
    referrerPolicy: { policy: 'same-origin' },
    xFrameOptions: { action: 'deny' },
  });
}

/** The page of the API document brings inline styles of its own and needs a looser rule, for itself alone. */
export function allowInlineStyles(_request: Request, response: Response, next: () => void): void {
  response.setHeader(
    'Content-Security-Policy',
    `default-src 'self'; style-src 'self' 'unsafe-inline'; img-src 'self' data:; object-src 'none'; ` +
      `base-uri 'none'; frame-ancestors 'none'`,
  );
  next();
}
