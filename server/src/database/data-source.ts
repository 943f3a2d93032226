import { DataSource, type DataSourceOptions } from 'typeorm';
import type { Env } from '../config/env.schema';
import { entities } from './entities';
import { migrations } from './migrations';

export type DatabaseEnv = Pick<Env, 'DATABASE_URL' | 'DATABASE_POOL_SIZE' | 'DATABASE_QUERY_TIMEOUT_MS'>;

const CONNECT_TIMEOUT_MS = 3_000;

/** How every process of the server talks to PostgreSQL. The schema comes from migrations alone. */
export function dataSourceOptions(env: DatabaseEnv): DataSourceOptions {
  return {
    type: 'postgres',
    url: env.DATABASE_URL,
    entities,
    migrations,
    migrationsTableName: 'migration',
    migrationsTransactionMode: 'all',
    synchronize: false,
    uuidExtension: 'pgcrypto',
    installExtensions: false,
    logging: false,
    applicationName: 'benchlark',
    extra: {
      max: env.DATABASE_POOL_SIZE,
      // The client's own limit: a frozen server answers no statement_timeout.
      query_timeout: env.DATABASE_QUERY_TIMEOUT_MS,
      connectionTimeoutMillis: CONNECT_TIMEOUT_MS,
      statement_timeout: env.DATABASE_QUERY_TIMEOUT_MS,
      idle_in_transaction_session_timeout: 60_000,
    },
  };
}

export function createDataSource(env: DatabaseEnv): DataSource {
  return new DataSource(dataSourceOptions(env));
}
