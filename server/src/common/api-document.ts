import type { INestApplication } from '@nestjs/common';
import { DocumentBuilder, SwaggerModule, type OpenAPIObject } from '@nestjs/swagger';

/** Describes every route; `operationId` is the handler's own name, so those must be unique. */
export function createApiDocument(app: INestApplication): OpenAPIObject {
  const config = new DocumentBuilder()
    .setTitle('Benchlark')
    .setDescription('Recordings in, trusted records out.')
    .setVersion('1')
    .addCookieAuth('benchlark')
    .addBearerAuth({ type: 'http', scheme: 'bearer', description: 'An API token made under “me”' })
    .build();
  return SwaggerModule.createDocument(app, config, { operationIdFactory: (_controller, method) => method });
}

export function setUpApiDocs(app: INestApplication): void {
  SwaggerModule.setup('api/docs', app, () => createApiDocument(app), { raw: ['json'] });
}
