import 'reflect-metadata';
import { writeFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { AppModule } from './app.module';
import { createApiDocument } from './common/api-document';
import { parseEnv } from './config/env.schema';

export const API_DOCUMENT_PATH = resolve(__dirname, '../openapi.json');

/** The API's description as text, made without a database and without starting any provider. */
export async function describeApi(): Promise<string> {
  const app = await NestFactory.create<NestExpressApplication>(AppModule.with(parseEnv({})), {
    preview: true,
    logger: false,
  });
  app.setGlobalPrefix('api');
  const document = createApiDocument(app);
  return `${JSON.stringify(document, null, 2)}\n`;
}

async function main(): Promise<void> {
  writeFileSync(API_DOCUMENT_PATH, await describeApi());
  process.stdout.write(`Wrote ${API_DOCUMENT_PATH}\n`);
}

if (require.main === module) {
  main().catch((error: unknown) => {
    process.stderr.write(`benchlark: ${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = 1;
  });
}
