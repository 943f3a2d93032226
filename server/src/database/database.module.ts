import { Module } from '@nestjs/common';
import { TypeOrmModule } from '@nestjs/typeorm';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { dataSourceOptions } from './data-source';

@Module({
  imports: [
    TypeOrmModule.forRootAsync({
      inject: [ENV],
      useFactory: (env: Env) => ({ ...dataSourceOptions(env), retryAttempts: 3, retryDelay: 500 }),
    }),
  ],
})
export class DatabaseModule {}
