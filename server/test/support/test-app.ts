import type { Server } from 'node:http';
import type { ModuleMetadata } from '@nestjs/common';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { Test, type TestingModuleBuilder } from '@nestjs/testing';
import { DataSource } from 'typeorm';
import { AppModule } from '../../src/app.module';
import { configureApp } from '../../src/common/configure-app';
import type { Env } from '../../src/config/env.schema';
import { createTestDatabase, testEnv, type TestDatabase } from './test-database';

export interface TestApp {
  readonly app: NestExpressApplication;
  readonly env: Env;
  readonly database: TestDatabase;
  readonly dataSource: DataSource;
  /** Listens on a free loopback port: `supertest(server)`. */
  readonly server: Server;
  /** Stops the app and drops its database. */
  close(): Promise<void>;
}

export interface TestAppOptions {
  /** Environment variables over the tests' own. */
  readonly env?: Record<string, string>;
  /** Further modules, e.g. one with a controller made for the test. */
  readonly imports?: ModuleMetadata['imports'];
  /** A database that another app of the same test uses; it is not dropped then. */
  readonly database?: TestDatabase;
  readonly adapt?: (builder: TestingModuleBuilder) => TestingModuleBuilder;
}

/** Boots the whole application on a database of its own. */
export async function createTestApp(options: TestAppOptions = {}): Promise<TestApp> {
  const database = options.database ?? (await createTestDatabase());
  const env = testEnv(database.url, options.env);
  const builder = Test.createTestingModule({ imports: [AppModule.with(env), ...(options.imports ?? [])] });
  const module = await (options.adapt?.(builder) ?? builder).compile();
  const app = module.createNestApplication<NestExpressApplication>({ bodyParser: false, logger: false });
  configureApp(app, env);
  await app.listen(0, '127.0.0.1');
  return {
    app,
    env,
    database,
    dataSource: app.get(DataSource),
    server: app.getHttpServer(),
    close: async () => {
      await app.close();
      if (!options.database) await database.drop();
    },
  };
}
