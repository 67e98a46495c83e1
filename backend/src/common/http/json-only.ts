import type { RequestHandler } from 'express';
import { UnsupportedMediaTypeError } from '../errors/app-error.js';

/** Bodies are JSON; uploads are taken before this. A form on another site can send no JSON. */
export const jsonOnly: RequestHandler = (request, _response, next) => {
  const hasBody = request.get('transfer-encoding') !== undefined || Number(request.get('content-length')) > 0;
  if (!hasBody || request.is('application/json')) return next();
  next(new UnsupportedMediaTypeError('Send JSON with the header Content-Type: application/json.'));
};
