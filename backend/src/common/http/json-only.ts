import type { RequestHandler } from 'express';
import { UnsupportedMediaTypeError } from '../errors/app-error.js';

/** Bodies are JSON, except below the listed paths (uploads). A form on another site can send no JSON. */
export function jsonOnly(except: readonly string[]): RequestHandler {
  return (request, _response, next) => {
    const hasBody =
      request.get('transfer-encoding') !== undefined || Number(request.get('content-length')) > 0;
    if (!hasBody || request.is('application/json') || except.some((path) => below(request.path, path))) {
      return next();
    }
    next(new UnsupportedMediaTypeError('Send JSON with the header Content-Type: application/json.'));
  };
}

function below(path: string, root: string): boolean {
  return path === root || path.startsWith(`${root}/`);
}
