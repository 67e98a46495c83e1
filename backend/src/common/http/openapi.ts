import type { NestExpressApplication } from '@nestjs/platform-express';
import { DocumentBuilder, SwaggerModule, type OpenAPIObject } from '@nestjs/swagger';
import { cleanupOpenApiDoc } from 'nestjs-zod';
import type { RequestHandler } from 'express';
import { principalOf } from '../../auth/principal.js';
import { allowInlineStyles } from './security-headers.js';

/** The OpenAPI document, made from the controllers and their contracts. `x-access` names the rule of each route. */
export function openApiDocument(app: NestExpressApplication): OpenAPIObject {
  const config = new DocumentBuilder()
    .setTitle('Stayledger')
    .setDescription('Recorded rig loads in, replace-by dates out.')
    .setVersion('1')
    .build();
  return cleanupOpenApiDoc(SwaggerModule.createDocument(app, config));
}

const signedInOnly: RequestHandler = (request, _response, next) => {
  principalOf(request);
  next();
};

/** Serves the document and its page to whoever is signed in. Made on first use: it takes a while and few look. */
export function mountOpenApi(app: NestExpressApplication): void {
  app.use('/api/openapi.json', signedInOnly);
  app.use('/api/docs', signedInOnly, allowInlineStyles);
  SwaggerModule.setup('api/docs', app, () => openApiDocument(app), {
    jsonDocumentUrl: 'api/openapi.json',
    yamlDocumentUrl: 'api/docs/openapi.yaml',
    customSiteTitle: 'Stayledger API',
  });
}
