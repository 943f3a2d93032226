import type { Server } from 'node:http';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { Logger } from 'nestjs-pino';
import { AppModule } from './app.module';
import { configureApp } from './common/configure-app';
import { setUpApiDocs } from './common/api-document';
import type { Env } from './config/env.schema';

/** Node's default of five minutes would cut an honest slow upload; the upload route watches for stalls itself. */
const REQUEST_TIME_MAX_MS = 2 * 3600_000;
const HEADERS_TIME_MAX_MS = 60_000;

/** Builds the HTTP process without listening yet. */
export async function createApp(env: Env): Promise<NestExpressApplication> {
  const app = await NestFactory.create<NestExpressApplication>(AppModule.with(env), {
    bufferLogs: true,
    bodyParser: false,
  });
  app.useLogger(app.get(Logger));
  configureApp(app, env);
  setUpApiDocs(app);
  const server: Server = app.getHttpServer();
  server.requestTimeout = REQUEST_TIME_MAX_MS;
  server.headersTimeout = HEADERS_TIME_MAX_MS;
  return app;
}
