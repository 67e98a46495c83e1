import type { RequestHandler } from 'express';
import { CrossSiteError } from '../errors/app-error.js';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses changes asked for by another site's page. Browsers say where a request comes from in Sec-Fetch-Site, older
 * ones (and any over plain HTTP) in Origin; and no page of another site can add our header without being allowed to.
 */
export function refuseCrossSite(publicUrl: string | undefined): RequestHandler {
  return (request, _response, next) => {
    if (SAFE.has(request.method)) return next();
    const site = request.get('sec-fetch-site');
    const origin = request.get('origin');
    const ours = publicUrl ? new URL(publicUrl).origin : `${request.protocol}://${request.get('host')}`;
    const sameSite = site === undefined ? origin === ours : site === 'same-origin';
    if (sameSite && request.get('x-requested-by') === 'stayledger') return next();
    next(new CrossSiteError());
  };
}
