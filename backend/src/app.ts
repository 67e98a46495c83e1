import { join } from 'node:path';
import type { Type } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import { NestExpressApplication } from '@nestjs/platform-express';
import express, { type RequestHandler } from 'express';
import { AppModule } from './app.module.js';
import { SessionMiddleware } from './auth/session.middleware.js';
import { refuseCrossSite } from './common/http/cross-site.js';
import { jsonOnly } from './common/http/json-only.js';
import { mountOpenApi } from './common/http/openapi.js';
import { requestContext } from './common/http/request-context.js';
import { securityHeaders } from './common/http/security-headers.js';
import { storableText } from './common/http/storable-text.js';
import { webApp } from './common/http/web-app.js';
import { AppLogger } from './common/logging/app-logger.js';
import { ENV } from './config/config.module.js';
import type { Env } from './config/env.js';
import { UPLOADS_PATH, UploadsHandler } from './load-logs/uploads.handler.js';

/** For the all-in-one process, which takes in the demo's logs. */
export { LogIntake } from './load-logs/log-intake.service.js';

/** Contracts allow no reply or request near this size; load logs go another way. */
const BODY_LIMIT = '256kb';
const WEB_APP_FOLDER = join(__dirname, '../../frontend/dist');

/** Makes the HTTP application, not yet listening. The all-in-one process passes a module that adds the worker. */
export async function createApp(
  env: Env,
  root: Type | { module: Type } = AppModule,
): Promise<NestExpressApplication> {
  const app = await NestFactory.create<NestExpressApplication>(root, {
    bodyParser: false,
    logger: new AppLogger(env),
    abortOnError: false,
  });
  return configureApp(app);
}

/** Everything that stands in front of the routes; the tests use it on an application they made themselves. */
export function configureApp(
  app: NestExpressApplication,
  webAppFolder = WEB_APP_FOLDER,
): NestExpressApplication {
  const env = app.get<Env>(ENV);
  const sessions = app.get(SessionMiddleware);
  app.set('trust proxy', env.TRUST_PROXY);
  app.disable('x-powered-by');
  app.setGlobalPrefix('api');
  app.use(requestContext);
  app.use(securityHeaders(env.PUBLIC_URL?.startsWith('https:') ?? false));
  app.use('/api', neverStored, ...sessions.handlers, refuseCrossSite(env.PUBLIC_URL));
  app.use(UPLOADS_PATH, app.get(UploadsHandler).handle);
  app.use('/api', jsonOnly, express.json({ limit: BODY_LIMIT }), storableText);
  mountOpenApi(app);
  app.use(webApp(webAppFolder));
  return app;
}

const neverStored: RequestHandler = (_request, response, next) => {
  response.setHeader('Cache-Control', 'no-store');
  next();
};
